import { ProblemError, unprocessable } from '@/lib/problem';

/** What can be wrong with a file as such, before its rows are looked at. */
export const fileErrors = {
  tooLarge: (limit: string) =>
    new ProblemError(413, 'too-large', 'That is too large.', `One file may hold ${limit}. Nothing was kept.`),
  empty: (file: string) => unprocessable('empty-file', `The ${file} file is empty.`),
  notText: (file: string, what: string) =>
    unprocessable(
      'not-text',
      `The ${file} file is ${what}, not a text file. Save it as CSV and upload that.`,
    ),
  webPage: (file: string) =>
    unprocessable(
      'not-text',
      `The ${file} file is a web page. Perhaps a sign-in page was saved in its place; download it again.`,
    ),
  oneJson: (file: string) =>
    unprocessable(
      'one-json',
      `The ${file} file is one JSON document. Write one object on each line (JSON Lines).`,
    ),
  otherXml: (file: string) =>
    unprocessable('other-xml', `The ${file} file is XML, but neither GEXF nor GraphML.`),
  badXml: (file: string, line: number) =>
    unprocessable('bad-xml', `The ${file} file is not well-formed XML; see line ${line}.`),
  entities: (file: string) =>
    unprocessable(
      'xml-entities',
      `The ${file} file declares entities of its own. They are not read, for safety; save it without them.`,
    ),
  noGraph: (file: string) =>
    unprocessable('no-graph', `The ${file} file is XML that ends before any member or tie.`),
  noRows: (file: string) => unprocessable('no-rows', `The ${file} file has a header but no rows.`),
  longField: (file: string, line: number) =>
    unprocessable(
      'long-field',
      `Near line ${line} of the ${file} file a field does not end. Look for a quotation mark that is not closed.`,
    ),
  tooManyKeys: (file: string, limit: number) =>
    unprocessable('too-many-columns', `The ${file} file has more than ${limit} columns.`),
  truncated: (file: string) =>
    unprocessable('truncated', `The ${file} file is damaged: it ends in the middle. Upload it again.`),
};
