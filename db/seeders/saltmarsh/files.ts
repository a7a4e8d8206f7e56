import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { generateSaltmarsh } from './generate';

export const TIES_FILE = 'saltmarsh-ties.csv';
export const MEMBERS_FILE = 'saltmarsh-members.csv';

/** Writes the two files of the last snapshot, for someone who wants to try an import. */
export function writeSaltmarshFiles(directory: string, seed?: number): { ties: string; members: string } {
  const { tiesCsv, membersCsv } = generateSaltmarsh(seed).snapshots.at(-1)!;
  const paths = { ties: join(directory, TIES_FILE), members: join(directory, MEMBERS_FILE) };
  mkdirSync(directory, { recursive: true });
  writeFileSync(paths.ties, tiesCsv);
  writeFileSync(paths.members, membersCsv);
  return paths;
}
