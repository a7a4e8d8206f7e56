import { PassThrough } from 'node:stream';
import Excel from 'exceljs';
import { breathe, TURN, type Encoder, type Table } from './table';

/** What a sheet can hold (ECMA-376): more rows go on to another one. */
const SHEET_ROWS = 1_048_576;
const SHARE_OF_FIRST = { state: 'frozen', ySplit: 1 } as const;

/** A workbook: numbers as numbers, text as text, so that nothing typed by a member is ever run as a formula. */
export const xlsx: Encoder = async function* (table) {
  const out = new PassThrough();
  const filling = fill(table, out).catch((error: unknown) => {
    out.destroy(error instanceof Error ? error : new Error('The workbook could not be written.'));
  });
  yield* out as AsyncIterable<Uint8Array>;
  await filling;
};

async function fill({ columns, chunks, cells }: Table, out: PassThrough): Promise<void> {
  const workbook = new Excel.stream.xlsx.WorkbookWriter({ stream: out, useStyles: true });
  let sheets = 0;
  const newSheet = () => {
    sheets++;
    const sheet = workbook.addWorksheet(sheets === 1 ? 'Members' : `Members ${sheets}`, {
      views: [SHARE_OF_FIRST],
    });
    sheet.columns = columns.map(({ name, type }) => ({
      width: type === 'number' ? 12 : Math.max(14, name.length),
    }));
    const head = sheet.addRow(columns.map(({ name }) => name));
    head.font = { bold: true };
    head.commit();
    return sheet;
  };
  let sheet = newSheet();
  let used = 1;
  for await (const rows of chunks) {
    for (let from = 0; from < rows.length; from += TURN) {
      for (const row of rows.slice(from, from + TURN)) {
        if (used === SHEET_ROWS) {
          sheet.commit();
          sheet = newSheet();
          used = 1;
        }
        sheet.addRow(cells(row)).commit();
        used++;
      }
      await breathe();
    }
  }
  sheet.commit();
  await workbook.commit();
}
