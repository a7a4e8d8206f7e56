import { fileErrors } from './errors';
import { DelimitedReader } from './delimited';
import type { Layout, RowSink, TextReader } from './files';
import { GraphReader } from './graph/xml';
import { edgeRows, emptyShape, nodeRows, shapeHandler, type GraphShape } from './graph/rows';
import { JsonLineKeys, JsonLineReader } from './json-lines';

/** What must be known of a whole file before its rows can be read. */
export interface Columns {
  /** Keys of JSON Lines, in the order met. */
  readonly keys: readonly string[];
  readonly graph: GraphShape;
}
export const NO_COLUMNS: Columns = { keys: [], graph: emptyShape() };

/** The first pass over a file whose columns are not in its first row; null where they are. */
export function columnsReader(
  layout: Layout,
  file: string,
  mostColumns: number,
): (TextReader & { columns(): Columns }) | null {
  if (layout.format === 'delimited') return null;
  if (layout.format === 'json-lines') {
    const reader = new JsonLineKeys(file, mostColumns);
    return {
      write: (text) => reader.write(text),
      end: () => reader.end(),
      columns: () => ({ ...NO_COLUMNS, keys: [...reader.keys] }),
    };
  }
  const graph = emptyShape();
  const reader = new GraphReader(file, shapeHandler(graph));
  return {
    write: (text) => reader.write(text),
    end: () => {
      reader.end();
      if (graph.nodes + graph.edges === 0) throw fileErrors.noGraph(file);
    },
    columns: () => ({ keys: [], graph }),
  };
}

/** Opens the rows of a file: of its ties, or of its members. A table has the same rows for either. */
export function rowReader(
  layout: Layout,
  columns: Columns,
  side: 'ties' | 'members',
  file: string,
  sink: RowSink,
): TextReader {
  if (layout.format === 'delimited') return new DelimitedReader(file, layout, sink);
  if (layout.format === 'json-lines') return new JsonLineReader(file, columns.keys, sink);
  return new GraphReader(file, (side === 'ties' ? edgeRows : nodeRows)(columns.graph, sink));
}
