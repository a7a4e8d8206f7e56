import { createHash } from 'node:crypto';
import { PassThrough, Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import busboy from 'busboy';
import { validate } from '@/server/http';
import { deleteObject, putObject } from '@/server/storage';
import { newId, type ImportFile } from '@/server/models';
import { ProblemError } from '@/lib/problem';
import { fileErrors } from '@/features/files';
import { importErrors } from './errors';
import { importOptionsSchema, ROLES, type ImportOptions } from './imports';
import { importLimits } from './limits.server';

export interface Upload {
  readonly importId: string;
  readonly files: ImportFile[];
  readonly options: ImportOptions;
  /** The same for the same files and options. */
  readonly fingerprint: string;
}

const OPTIONS_BYTES = 65_536;

/** Streams one part to storage while counting and hashing it. */
async function storePart(
  stream: Readable & { truncated?: boolean },
  role: ImportFile['role'],
  name: string,
  importId: string,
): Promise<ImportFile> {
  const key = `imports/${importId}/${role}`;
  const hash = createHash('sha256');
  let bytes = 0;
  const through = new PassThrough();
  stream.on('data', (chunk: Buffer) => {
    hash.update(chunk);
    bytes += chunk.length;
  });
  stream.on('error', (error) => through.destroy(error));
  stream.pipe(through);
  await putObject(key, through);
  return { role, name: name.slice(0, 200), key, bytes, sha256: hash.digest('hex') };
}

function parseOptions(text: string | null): ImportOptions {
  if (text === null || text.trim() === '') return importOptionsSchema.parse({});
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    throw new ProblemError(400, 'malformed', 'Please check what was sent.', 'options is not JSON.', [
      { path: 'options', message: 'Not JSON.' },
    ]);
  }
  return validate(importOptionsSchema, value, 'options');
}

/**
 * Receives a multipart upload: file parts go straight to object storage, so memory stays flat whatever their size.
 * Nothing is kept of an upload that fails or is broken off.
 * @throws ProblemError 400, 413, 415
 */
export async function receiveUpload(request: Request): Promise<Upload> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^multipart\/form-data/i.test(type) || !request.body) throw importErrors.notMultipart();
  const importId = newId();
  const limits = importLimits();
  const stored: Promise<ImportFile>[] = [];
  const roles = new Set<string>();
  let optionsText: string | null = null;
  let problem: ProblemError | null = null;
  const body = Readable.fromWeb(request.body as ReadableStream);
  try {
    const parser = busboy({
      headers: { 'content-type': type },
      limits: { fileSize: limits.fileBytes, files: 4, fields: 5, fieldSize: OPTIONS_BYTES },
    });
    await new Promise<void>((resolve, reject) => {
      parser.on('file', (part, stream, info) => {
        const role = ROLES.find((one) => one === part);
        const again = role !== undefined && roles.has(role);
        if (!role || again) {
          problem ??= importErrors.unknownPart(part);
          stream.resume();
          return;
        }
        roles.add(role);
        stream.on('limit', () => {
          problem ??= fileErrors.tooLarge(`${Math.floor(limits.fileBytes / 1024 / 1024)} MB`);
        });
        const file = storePart(stream, role, info.filename || `${role}.csv`, importId);
        // Awaited below; until then a failure must not count as unhandled.
        file.catch(() => undefined);
        stored.push(file);
      });
      parser.on('field', (name, value, info) => {
        if (name !== 'options') problem ??= importErrors.unknownPart(name);
        else if (info.valueTruncated) problem ??= fileErrors.tooLarge('64 KB of options');
        else optionsText = value;
      });

      parser.on('close', resolve);
      parser.on('error', reject);
      body.on('error', reject);
      body.pipe(parser);
    }).catch(() => {
      problem ??= importErrors.brokenUpload();
    });
    const files = await Promise.all(stored).catch(() => {
      throw problem ?? importErrors.brokenUpload();
    });
    if (problem) throw problem as ProblemError;
    if (!files.some((file) => file.role === 'ties')) throw importErrors.noTies();
    const options = parseOptions(optionsText);
    const marks = files.map((file) => `${file.role}:${file.sha256}`).sort();
    const fingerprint = createHash('sha256')
      .update(JSON.stringify([marks, options]))
      .digest('hex');
    return { importId, files, options, fingerprint };
  } catch (error) {
    await Promise.allSettled(stored);
    await Promise.allSettled(ROLES.map((role) => deleteObject(`imports/${importId}/${role}`)));
    throw error;
  }
}
