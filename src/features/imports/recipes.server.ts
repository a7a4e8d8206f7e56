import { Op } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { forbidden, notFound } from '@/lib/problem';
import { Import, ImportRecipe, Snapshot } from '@/server/models';
import { communityFor } from '@/features/network/index.server';
import { authorise, workspaceIds } from '@/features/workspaces/index.server';
import { importOptionsSchema, type ImportOptions } from './imports';
import type { RecipeChange, RecipeInput, RecipeView } from './recipes';

/** What belongs to one import alone is no part of a recipe. */
function lasting(options: ImportOptions): Record<string, unknown> {
  const { takenOn: _takenOn, label: _label, base: _base, ...rest } = options;
  return rest;
}

const present = (row: ImportRecipe, actor: Actor): RecipeView => ({
  id: row.id,
  name: row.name,
  options: importOptionsSchema.parse(row.options),
  shared: row.shared,
  mine: row.createdBy === actor.userId,
  updatedAt: row.updatedAt.toISOString(),
});

/** Recipes that this person may use, and the choices of the community's last accepted import. */
export async function listRecipes(
  actor: Actor,
  communityId: string,
): Promise<{ items: RecipeView[]; latest: { takenOn: string; options: ImportOptions } | null }> {
  const { community } = await communityFor(actor, communityId, 'analysis.make');
  const rows = await ImportRecipe.findAll({
    where: {
      workspaceId: community.workspaceId,
      communityId,
      [Op.or]: [{ shared: true }, { createdBy: actor.userId }],
    },
    order: [['name', 'ASC']],
  });
  const last = await Import.findOne({
    where: { communityId, state: 'accepted' },
    order: [['finishedAt', 'DESC']],
  });
  const snapshot = last?.snapshotId ? await Snapshot.findByPk(last.snapshotId) : null;
  const options = importOptionsSchema.safeParse(last?.options);
  return {
    items: rows.map((row) => present(row, actor)),
    latest: snapshot && options.success ? { takenOn: snapshot.takenOn, options: options.data } : null,
  };
}

export async function createRecipe(
  actor: Actor,
  communityId: string,
  { name, options, shared }: RecipeInput,
): Promise<RecipeView> {
  const { community } = await communityFor(actor, communityId, 'analysis.make');
  const row = await ImportRecipe.create({
    workspaceId: community.workspaceId,
    communityId,
    name,
    options: lasting(options),
    shared,
    createdBy: actor.userId,
  });
  return present(row, actor);
}

/** @throws ProblemError 404 where the recipe is not there or not to be seen, 403 where it is another person's */
async function ownRecipe(actor: Actor, id: string): Promise<ImportRecipe> {
  const row = await ImportRecipe.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!row) throw notFound();
  await authorise(actor, row.workspaceId, 'analysis.make');
  if (row.createdBy === actor.userId) return row;
  if (!row.shared) throw notFound();
  throw forbidden('Only the person who made this recipe changes it. Save one of your own from it.');
}

export async function changeRecipe(actor: Actor, id: string, change: RecipeChange): Promise<RecipeView> {
  const row = await ownRecipe(actor, id);
  await row.update({
    ...(change.name === undefined ? {} : { name: change.name }),
    ...(change.shared === undefined ? {} : { shared: change.shared }),
    ...(change.options === undefined ? {} : { options: lasting(change.options) }),
    updatedAt: new Date(),
  });
  return present(row, actor);
}

export async function deleteRecipe(actor: Actor, id: string): Promise<void> {
  await (await ownRecipe(actor, id)).destroy();
}
