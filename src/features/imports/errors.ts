import { ProblemError, unprocessable } from '@/lib/problem';

/** Error codes of imports, with their words. */
export const importErrors = {
  notMultipart: () =>
    new ProblemError(
      415,
      'not-multipart',
      'Wrong content type.',
      'Send multipart/form-data with a file part named ties.',
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
      `There is no part named ${name.slice(0, 60)}. Use ties, members and options.`,
    ),
  brokenUpload: () =>
    new ProblemError(400, 'broken-upload', 'The upload ended early.', 'Nothing was kept. Send it again.'),
  tooLarge: (limit: string) =>
    new ProblemError(413, 'too-large', 'That is too large.', `One file may hold ${limit}. Nothing was kept.`),
  empty: (file: string) => unprocessable('empty-file', `The ${file} file is empty.`),
  notText: (file: string) =>
    unprocessable('not-text', `The ${file} file is not a text file. Save it as CSV and upload that.`),
  noRows: (file: string) => unprocessable('no-rows', `The ${file} file has a header but no rows.`),
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
  longField: (file: string, line: number) =>
    unprocessable(
      'long-field',
      `Near line ${line} of the ${file} file a field does not end. Look for a quotation mark that is not closed.`,
    ),
  truncated: (file: string) =>
    unprocessable('truncated', `The ${file} file is damaged: it ends in the middle. Upload it again.`),
  noTiesLeft: () =>
    unprocessable(
      'no-ties-left',
      'No usable tie is left in the ties file. The list of refused rows says why.',
    ),
};
