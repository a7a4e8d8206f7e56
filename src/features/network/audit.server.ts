import type { Actor } from '@/lib/actor';
import { sequelize, type Snapshot } from '@/server/models';
import { audit } from '@/features/workspaces/index.server';

/** Logs that somebody took data of a snapshot away, before the first byte leaves. */
export const auditExport = (actor: Actor, snapshot: Snapshot, what: string): Promise<void> =>
  sequelize.transaction((transaction) =>
    audit(
      {
        workspaceId: snapshot.workspaceId,
        actorId: actor.userId,
        action: 'export.network',
        targetKind: 'snapshot',
        targetId: snapshot.id,
        detail: { what },
      },
      transaction,
    ),
  );
