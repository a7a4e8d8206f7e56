import { recipeOperations } from '@/features/imports';
import { createRecipe, listRecipes } from '@/features/imports/index.server';
import { serve } from '@/server/http';

export const GET = serve(recipeOperations.list, (actor, { params }) => listRecipes(actor, params.community));
export const POST = serve(recipeOperations.create, (actor, { params, body }) =>
  createRecipe(actor, params.community, body),
);
