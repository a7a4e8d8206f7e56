import { people } from './0001-people';
import { communities } from './0002-communities';
import { analysis } from './0003-analysis';
import { operations } from './0004-operations';
import { localPermutations } from './0005-local-permutations';
import { importReports } from './0006-import-reports';
import type { Migration } from './types';

/** Every migration, in order. A plain list rather than a folder scan, so that a bundle carries them too. */
export const migrations: readonly Migration[] = [
  people,
  communities,
  analysis,
  operations,
  localPermutations,
  importReports,
];
