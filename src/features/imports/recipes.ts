import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';
import { importOptionsSchema } from './imports';

export const recipeSchema = z
  .object({
    id: z.string(),
    name: z.string(),
    options: importOptionsSchema,
    /** Whether everyone who imports in the workspace sees it. */
    shared: z.boolean(),
    mine: z.boolean(),
    updatedAt: z.string(),
  })
  .meta({ id: 'ImportRecipe' });
export type RecipeView = z.infer<typeof recipeSchema>;

const recipeBody = z.object({
  name: z.string().trim().min(1).max(120),
  options: importOptionsSchema,
  shared: z.boolean().default(false),
});
export type RecipeInput = z.output<typeof recipeBody>;
const recipeChange = z.object({
  name: z.string().trim().min(1).max(120).optional(),
  options: importOptionsSchema.optional(),
  shared: z.boolean().optional(),
});
export type RecipeChange = z.output<typeof recipeChange>;

const one = z.object({ recipe: idSchema });
const community = z.object({ community: idSchema });
const shared = { tag: 'Imports', access: 'person' } as const;

export const recipeOperations = {
  list: operation({
    ...shared,
    id: 'listRecipes',
    method: 'get',
    path: '/api/v1/communities/{community}/recipes',
    summary:
      'Recipes for imports of a community: your own and shared ones, and the choices of its last import',
    params: community,
    status: 200,
    response: z.object({
      items: z.array(recipeSchema),
      latest: z.object({ takenOn: z.string(), options: importOptionsSchema }).nullable(),
    }),
  }),
  create: operation({
    ...shared,
    id: 'createRecipe',
    method: 'post',
    path: '/api/v1/communities/{community}/recipes',
    summary: 'Keep choices about an import under a name',
    params: community,
    body: recipeBody,
    status: 201,
    response: recipeSchema,
  }),
  change: operation({
    ...shared,
    id: 'changeRecipe',
    method: 'patch',
    path: '/api/v1/recipes/{recipe}',
    summary: 'Rename, share or change a recipe of your own',
    params: one,
    body: recipeChange,
    status: 200,
    response: recipeSchema,
  }),
  remove: operation({
    ...shared,
    id: 'deleteRecipe',
    method: 'delete',
    path: '/api/v1/recipes/{recipe}',
    summary: 'Delete a recipe of your own; imports made with it stay',
    params: one,
    status: 204,
  }),
};
