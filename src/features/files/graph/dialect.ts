/** One element as a graph reader sees it: local name, attributes by local name. */
export interface Tag {
  readonly name: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly line: number;
}

export interface GraphNode {
  readonly id: string;
  readonly label: string | null;
  /** By key of the column. */
  readonly values: ReadonlyMap<string, string>;
  readonly line: number;
}
export interface GraphEdge {
  readonly source: string;
  readonly target: string;
  readonly weight: string | null;
  readonly kind: string | null;
  readonly values: ReadonlyMap<string, string>;
  readonly line: number;
}
/** A declared column of nodes or edges. */
export interface GraphColumn {
  readonly of: 'node' | 'edge';
  readonly key: string;
  readonly title: string;
  readonly fallback: string | null;
}

/** What a dialect makes of a file, in the order of the file. */
export interface GraphHandler {
  column(column: GraphColumn): void;
  node(node: GraphNode): void;
  edge(edge: GraphEdge): void;
  /** Something between more or fewer than two members. */
  odd(line: number, what: string): void;
}

/** One XML language for graphs. */
export interface Dialect {
  open(tag: Tag): void;
  close(name: string, text: string): void;
}
