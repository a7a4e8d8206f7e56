import { ProblemError, unprocessable } from '@/lib/problem';

/** Error codes of imports, with their words. */
export const importErrors = {
  notMultipart: () =>
    new ProblemError(
      415,
      'not-multipart',
      'Wrong content type.',
      'Send multipart/form-data with a file part named ties, or JSON with the ids of finished uploads.',
    ),
  noTies: () =>
    new ProblemError(
      400,
      'no-ties-file',
      'The ties file is missing.',
      'Add a file part named ties, with a source and a target column.',
      [{ path: 'ties', message: 'Missing' }],
    ),
  unknownPart: (name: string) =>
    new ProblemError(
      400,
      'unknown-part',
      'Please check what was sent.',
      `There is no part named ${name.slice(0, 60)}. Use ties, members, mapping and options.`,
    ),
  brokenUpload: () =>
    new ProblemError(400, 'broken-upload', 'The upload ended early.', 'Nothing was kept. Send it again.'),
  tooLarge: (limit: string) =>
    new ProblemError(413, 'too-large', 'That is too large.', `One file may hold ${limit}. Nothing was kept.`),
  noColumn: (file: string, column: string, headers: readonly string[]) =>
    unprocessable(
      'missing-column',
      `The ${file} file has no column for ${column}. Its columns are: ${headers.slice(0, 20).join(', ')}.`,
    ),
  duplicateHeader: (file: string, header: string) =>
    unprocessable(
      'duplicate-column',
      `The ${file} file has two columns named “${header.slice(0, 60)}”. Rename one.`,
    ),
  tooManyColumns: (file: string, limit: number) =>
    unprocessable('too-many-columns', `The ${file} file has more than ${limit} columns.`),
  tooManyRows: (file: string, limit: number) =>
    unprocessable('too-many-rows', `The ${file} file has more than ${limit.toLocaleString('en-GB')} rows.`),
  noBase: () =>
    unprocessable(
      'no-base',
      'There is no earlier snapshot that these changes could be added to. Load everything once first.',
    ),
  changedType: (name: string, before: string, now: string) =>
    unprocessable(
      'changed-type',
      `“${name.slice(0, 60)}” was a ${before} in the earlier snapshot and is a ${now} in this file. Choose its type, or load everything anew.`,
    ),
  noTiesLeft: () =>
    unprocessable(
      'no-ties-left',
      'No usable tie is left in the ties file. The list of refused rows says why.',
    ),
};
