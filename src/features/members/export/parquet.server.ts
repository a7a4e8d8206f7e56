import { ByteWriter, ParquetWriter } from 'hyparquet-writer';
import { breathe, type Encoder } from './table';

/** Apache Parquet: 64-bit floats and UTF-8 text, blanks as nulls, a row group for each chunk. */
export const parquet: Encoder = async function* ({ columns, chunks, cells }) {
  const writer = new ByteWriter();
  const file = new ParquetWriter({
    writer,
    createdBy: 'Thrum',
    schema: [
      { name: 'root', num_children: columns.length },
      ...columns.map(({ name, type }) =>
        type === 'number'
          ? ({ name, type: 'DOUBLE', repetition_type: 'OPTIONAL' } as const)
          : ({ name, type: 'BYTE_ARRAY', converted_type: 'UTF8', repetition_type: 'OPTIONAL' } as const),
      ),
    ],
  });
  for await (const rows of chunks) {
    const table = rows.map(cells);
    await file.write({
      columnData: columns.map(({ name }, at) => ({ name, data: table.map((row) => row[at] ?? null) })),
      rowGroupSize: rows.length,
    });
    await breathe();
  }
  await file.finish();
  yield writer.getBytes();
};
