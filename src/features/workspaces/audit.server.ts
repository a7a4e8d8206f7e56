import type { Transaction } from 'sequelize';
import { AuditEntry } from '@/server/models';

/**
 * Writes one line of the audit log in the transaction of the change that it records.
 * `detail` holds ids and settings, never scores or free text about members.
 */
export async function audit(
  entry: {
    workspaceId: string;
    actorId: string | null;
    action: string;
    targetKind: string;
    targetId: string | null;
    detail?: Record<string, unknown>;
  },
  transaction: Transaction,
): Promise<void> {
  await AuditEntry.create({ ...entry, detail: entry.detail ?? {} }, { transaction });
}
