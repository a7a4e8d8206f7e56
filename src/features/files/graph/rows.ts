import type { RowSink } from '../files';
import type { GraphColumn, GraphEdge, GraphHandler, GraphNode } from './dialect';

/** What the first pass over a graph file learns: its columns, and which of the usual fields occur. */
export interface GraphShape {
  readonly nodeColumns: GraphColumn[];
  readonly edgeColumns: GraphColumn[];
  nodes: number;
  edges: number;
  labels: boolean;
  weights: boolean;
  kinds: boolean;
}

export const emptyShape = (): GraphShape => ({
  nodeColumns: [],
  edgeColumns: [],
  nodes: 0,
  edges: 0,
  labels: false,
  weights: false,
  kinds: false,
});

/** First pass. */
export const shapeHandler = (shape: GraphShape): GraphHandler => ({
  column: (column) => void (column.of === 'node' ? shape.nodeColumns : shape.edgeColumns).push(column),
  node: ({ label }) => {
    shape.nodes++;
    shape.labels ||= label !== null;
  },
  edge: ({ weight, kind }) => {
    shape.edges++;
    shape.weights ||= weight !== null;
    shape.kinds ||= kind !== null;
  },
  odd: () => void shape.edges++,
});

/** Titles with a number behind those that stand there already. */
function headersOf(fixed: readonly string[], columns: readonly GraphColumn[]): string[] {
  const taken = new Set<string>();
  return [...fixed, ...columns.map((one) => one.title.trim() || one.key)].map((title) => {
    let name = title;
    for (let n = 2; taken.has(name); n++) name = `${title} (${n})`;
    taken.add(name);
    return name;
  });
}

const valuesOf = (columns: readonly GraphColumn[], values: ReadonlyMap<string, string>): string[] =>
  columns.map((one) => values.get(one.key) ?? one.fallback ?? '');

const nothing = (): void => undefined;

/** Members of a graph file as rows: id, label, declared attributes. */
export function nodeRows(shape: GraphShape, sink: RowSink): GraphHandler {
  sink.header(headersOf(['id', ...(shape.labels ? ['label'] : [])], shape.nodeColumns));
  return {
    column: nothing,
    edge: nothing,
    odd: nothing,
    node: ({ id, label, values, line }: GraphNode) =>
      sink.row([id, ...(shape.labels ? [label ?? ''] : []), ...valuesOf(shape.nodeColumns, values)], line),
  };
}

/** Ties of a graph file as rows: source, target, weight (1 where an edge has none), kind, declared attributes. */
export function edgeRows(shape: GraphShape, sink: RowSink): GraphHandler {
  const { weights, kinds, edgeColumns } = shape;
  const fixed = ['source', 'target', ...(weights ? ['weight'] : []), ...(kinds ? ['kind'] : [])];
  sink.header(headersOf(fixed, edgeColumns));
  return {
    column: nothing,
    node: nothing,
    odd: (line, what) => sink.broken(line, '', what),
    edge: ({ source, target, weight, kind, values, line }: GraphEdge) =>
      sink.row(
        [
          source,
          target,
          ...(weights ? [weight ?? '1'] : []),
          ...(kinds ? [kind ?? ''] : []),
          ...valuesOf(edgeColumns, values),
        ],
        line,
      ),
  };
}
