import type { Migration } from './types';

/** Local Moran's p by conditional permutation, beside the one of the moments; null in readings taken before. */
export const localPermutations: Migration = {
  name: '0005-local-permutations',
  up: `ALTER TABLE reading_members ADD COLUMN local_permutation_p double precision;`,
};
