import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { deleteObject } from '@/server/storage';
import { Import, Job, sequelize } from '@/server/models';
import { enqueue } from '@/server/queue';
import { audit } from '@/features/workspaces/index.server';
import { communityFor } from '@/features/network/index.server';
import type { Upload } from './upload.server';

/** States in which the same upload again is the same import. */
const STANDING = ['received', 'checking', 'review', 'accepted'] as const;

/**
 * Records an upload and queues its job. The same files and options for the same community, while that import
 * stands, answer with it instead of a second one.
 */
export async function makeImport(
  actor: Actor,
  communityId: string,
  upload: Upload,
): Promise<{ row: Import; job: Job; repeated: boolean }> {
  const { community } = await communityFor(actor, communityId, 'analysis.make');
  const made = await sequelize.transaction(async (transaction) => {
    // Two equal uploads at the same moment wait for each other here.
    await sequelize.query('SELECT pg_advisory_xact_lock(hashtext($1))', {
      bind: [`${communityId}${upload.fingerprint}`],
      type: QueryTypes.SELECT,
      transaction,
    });
    const earlier = await Import.findOne({
      where: { communityId, fingerprint: upload.fingerprint, state: [...STANDING] },
      transaction,
    });
    const earlierJob =
      earlier && (await Job.findOne({ where: { targetId: earlier.id, kind: 'import' }, transaction }));
    if (earlier && earlierJob) return { row: earlier, job: earlierJob, repeated: true };
    const row = await Import.create(
      {
        id: upload.importId,
        workspaceId: community.workspaceId,
        communityId,
        state: 'received',
        options: { ...upload.options },
        files: upload.files,
        fingerprint: upload.fingerprint,
        createdBy: actor.userId,
      },
      { transaction },
    );
    const job = await enqueue(
      { kind: 'import', targetId: row.id, workspaceId: community.workspaceId, createdBy: actor.userId },
      transaction,
    );
    await audit(
      {
        workspaceId: community.workspaceId,
        actorId: actor.userId,
        action: 'import.upload',
        targetKind: 'import',
        targetId: row.id,
        detail: { files: upload.files.map(({ role, bytes }) => ({ role, bytes })) },
      },
      transaction,
    );
    return { row, job, repeated: false };
  });
  if (made.repeated)
    await Promise.all(upload.files.map((file) => deleteObject(file.key).catch(() => undefined)));
  return made;
}
