import type { Actor } from '@/lib/actor';
import { unprocessable } from '@/lib/problem';
import { VERSION } from '@/lib/version';
import { Reading, sequelize, type Attribute, type Job } from '@/server/models';
import { enqueue } from '@/server/queue';
import { attributesOf, snapshotFor } from '@/features/network/index.server';
import { audit } from '@/features/workspaces/index.server';
import type { MakeReading } from './readings';

function numeric(attributes: readonly Attribute[], asked: string, part: string): Attribute {
  const found = attributes.find((one) => one.id === asked) ?? attributes.find((one) => one.name === asked);
  if (!found)
    throw unprocessable('unknown-attribute', `This snapshot has no attribute “${asked}”.`, [
      { path: part, message: 'Not an attribute of this snapshot.' },
    ]);
  if (found.type !== 'number')
    throw unprocessable('not-numeric', `“${found.name}” holds labels; a reading needs numbers.`, [
      { path: part, message: 'Not a numeric attribute.' },
    ]);
  return found;
}

/** The counts behind the scores: those asked for, those that the import named, or none. */
function countsOf(
  attributes: readonly Attribute[],
  attribute: Attribute,
  asked: MakeReading['weights'],
): Attribute | null {
  if (asked === null) return null;
  if (asked !== undefined) return numeric(attributes, asked, 'weights');
  return (
    attributes.find((one) => one.type === 'number' && one.name === attribute.countOf) ??
    attributes.find((one) => one.type === 'number' && one.id === attribute.countOf) ??
    null
  );
}

/**
 * Writes the reading and its job together.
 * @throws ProblemError 404 for outsiders, 403 where the role takes no readings, 422 for an attribute that cannot be read.
 */
export async function makeReading(
  actor: Actor,
  snapshotId: string,
  input: MakeReading,
): Promise<{ reading: Reading; job: Job }> {
  const { snapshot, access } = await snapshotFor(actor, snapshotId, 'analysis.make');
  const attributes = await attributesOf(snapshot.id);
  const attribute = numeric(attributes, input.attribute, 'attribute');
  const counts = countsOf(attributes, attribute, input.weights);
  return sequelize.transaction(async (transaction) => {
    const reading = await Reading.create(
      {
        workspaceId: snapshot.workspaceId,
        communityId: snapshot.communityId,
        snapshotId: snapshot.id,
        attributeId: attribute.id,
        attribute: attribute.name,
        filter: { ...input.filter },
        laplacian: input.laplacian,
        options: {
          permutations: input.permutations,
          weights: counts?.name ?? null,
          weightsId: counts?.id ?? null,
          neighbourFloor: access.workspace.neighbourFloor,
        },
        seed: input.seed,
        version: VERSION,
        createdBy: actor.userId,
      },
      { transaction },
    );
    await audit(
      {
        workspaceId: snapshot.workspaceId,
        actorId: actor.userId,
        action: 'reading.make',
        targetKind: 'reading',
        targetId: reading.id,
        detail: { snapshotId: snapshot.id, attributeId: attribute.id, filter: input.filter.kind },
      },
      transaction,
    );
    const job = await enqueue(
      { kind: 'reading', targetId: reading.id, workspaceId: snapshot.workspaceId, createdBy: actor.userId },
      transaction,
    );
    return { reading, job };
  });
}
