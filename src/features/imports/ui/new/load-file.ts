import { isGraph, isGzip, readSample, type ReadSettings, type Sample } from '@/features/files';
import { ProblemError } from '@/lib/problem';
import { guessRole } from '../../guess';
import type { ImportLimits } from '../../imports';

/** Bytes of a file, unpacked, that are read for the preview. */
const SAMPLE = 1024 * 1024;

export type Role = 'ties' | 'members' | 'mapping' | 'graph' | 'none';

/** A file that was chosen: its first part as it will be read, or why it cannot be. */
export interface LoadedFile {
  readonly key: string;
  readonly file: File;
  readonly bytes: Uint8Array;
  /** Whether the first part is all of it. */
  readonly whole: boolean;
  readonly role: Role;
  readonly settings: ReadSettings;
  readonly sample: Sample | null;
  readonly problem: string | null;
}

async function firstBytes(file: File): Promise<{ bytes: Uint8Array; whole: boolean }> {
  const head = new Uint8Array(await file.slice(0, SAMPLE).arrayBuffer());
  if (!isGzip(head)) return { bytes: head, whole: file.size <= SAMPLE };
  const reader = file.stream().pipeThrough(new DecompressionStream('gzip')).getReader();
  const pieces: Uint8Array[] = [];
  let length = 0;
  let whole = false;
  while (length < SAMPLE) {
    const piece = await reader.read();
    if (piece.done) {
      whole = true;
      break;
    }
    pieces.push(piece.value);
    length += piece.value.length;
  }
  void reader.cancel();
  const bytes = new Uint8Array(length);
  let at = 0;
  for (const piece of pieces) {
    bytes.set(piece, at);
    at += piece.length;
  }
  return { bytes, whole };
}

/** Reads the first part again, with other settings. */
export function reread(loaded: LoadedFile, settings: ReadSettings, limits: ImportLimits): LoadedFile {
  const what = loaded.role === 'none' || loaded.role === 'graph' ? 'chosen' : loaded.role;
  try {
    const sample = readSample(loaded.bytes, what, settings, loaded.whole, limits.columns);
    return { ...loaded, settings, sample, problem: null };
  } catch (error) {
    if (!(error instanceof ProblemError)) throw error;
    return { ...loaded, settings, sample: null, problem: error.detail };
  }
}

function roleOf(file: File, sample: Sample | null): Role {
  if (sample && isGraph(sample.layout.format)) return 'graph';
  if (sample && sample.table.headers.length > 0) return guessRole(sample.table.headers);
  return /member|people|attribute/i.test(file.name) ? 'members' : 'ties';
}

/** Reads the first part of a file, and guesses what it is for. */
export async function loadFile(file: File, limits: ImportLimits): Promise<LoadedFile> {
  const start: LoadedFile = {
    key: crypto.randomUUID(),
    file,
    bytes: new Uint8Array(),
    whole: true,
    role: 'none',
    settings: {},
    sample: null,
    problem: null,
  };
  if (file.size > limits.fileBytes)
    return {
      ...start,
      problem: `${file.name} is larger than ${Math.floor(limits.fileBytes / 1024 / 1024)} MB.`,
    };
  const read = await firstBytes(file).catch(() => null);
  if (!read)
    return {
      ...start,
      problem: `${file.name} could not be unpacked. It may be damaged, or only part of a file.`,
    };
  const loaded = reread({ ...start, ...read }, {}, limits);
  return { ...loaded, role: roleOf(file, loaded.sample) };
}
