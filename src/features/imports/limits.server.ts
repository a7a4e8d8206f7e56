import { config } from '@/server/config';
import { FIXED_LIMITS, type ImportLimits } from './imports';

const MEGABYTE = 1024 * 1024;

/** What an import may hold on this installation; README, "Variables". */
export function importLimits(): ImportLimits {
  const { IMPORT_FILE_MB, IMPORT_TEXT_MB, IMPORT_TIE_ROWS, IMPORT_MEMBER_ROWS, IMPORT_COLUMNS } = config();
  return {
    ...FIXED_LIMITS,
    fileBytes: IMPORT_FILE_MB * MEGABYTE,
    textBytes: IMPORT_TEXT_MB * MEGABYTE,
    tieRows: IMPORT_TIE_ROWS,
    memberRows: IMPORT_MEMBER_ROWS,
    columns: IMPORT_COLUMNS,
  };
}
