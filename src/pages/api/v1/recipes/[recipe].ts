import { recipeOperations } from '@/features/imports';
import { changeRecipe, deleteRecipe } from '@/features/imports/index.server';
import { serve } from '@/server/http';

export const PATCH = serve(recipeOperations.change, (actor, { params, body }) =>
  changeRecipe(actor, params.recipe, body),
);
export const DELETE = serve(recipeOperations.remove, async (actor, { params }) => {
  await deleteRecipe(actor, params.recipe);
  return null;
});
