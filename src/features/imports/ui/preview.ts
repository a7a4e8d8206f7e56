import Papa from 'papaparse';
import { guessDelimiter, guessRole } from '../guess';

const SAMPLE = 64 * 1024;
const ROWS = 8;

export interface Preview {
  readonly role: 'ties' | 'members';
  readonly headers: string[];
  readonly rows: string[][];
  /** Why the first rows cannot be shown, in words; the upload itself may still be fine (gzip). */
  readonly note: string | null;
}

/** Reads the first rows of a file in the browser, as the server will read them. */
export async function previewOf(file: File): Promise<Preview> {
  const bytes = new Uint8Array(await file.slice(0, SAMPLE).arrayBuffer());
  const empty = { headers: [], rows: [] };
  const named = /member|people|attribute/i.test(file.name) ? 'members' : 'ties';
  if (bytes.length === 0) return { ...empty, role: named, note: 'This file is empty.' };
  if (bytes[0] === 0x1f && bytes[1] === 0x8b)
    return { ...empty, role: named, note: 'Compressed; columns are guessed when it is read.' };
  const encoding =
    bytes[0] === 0xff && bytes[1] === 0xfe
      ? 'utf-16le'
      : bytes[0] === 0xfe && bytes[1] === 0xff
        ? 'utf-16be'
        : 'utf-8';
  const text = new TextDecoder(encoding).decode(bytes);
  if (text.includes('\0')) return { ...empty, role: named, note: 'This is not a text file.' };
  const { data } = Papa.parse<string[]>(text, {
    delimiter: guessDelimiter(text),
    preview: ROWS + 1,
    skipEmptyLines: true,
  });
  const [headers = [], ...rows] = data;
  return {
    role: guessRole(headers.map((one) => one.trim())),
    headers: headers.map((one) => one.trim()),
    rows,
    note: null,
  };
}
