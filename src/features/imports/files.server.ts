import { Import, sequelize, Snapshot } from '@/server/models';
import { deleteObject } from '@/server/storage';

/** Removes what an interrupted run left of an import. */
export async function removeHalf(importId: string): Promise<void> {
  await Snapshot.destroy({ where: { importId, state: 'pending' } });
  await sequelize.query('DELETE FROM import_problems WHERE import_id = $1', { bind: [importId] });
}

/** Removes the files of an import from storage; what fails is left to the sweep. */
export const dropFiles = async (row: Import): Promise<void> => {
  await Promise.all(row.files.map((file) => deleteObject(file.key).catch(() => undefined)));
};
