import type { Dialect, GraphHandler, Tag } from './dialect';

interface Open {
  kind: 'node' | 'edge' | 'hyperedge';
  tag: Tag;
  values: Map<string, string>;
}

/** GraphML (http://graphml.graphdrawing.org/specification.html): nodes, edges, keys and their data. */
export function graphml(handler: GraphHandler): Dialect {
  let declared: { of: string; key: string; title: string; fallback: string | null } | null = null;
  let dataKey = '';
  const open: Open[] = [];
  const finish = ({ kind, tag, values }: Open): void => {
    const { attributes, line } = tag;
    if (kind === 'node') handler.node({ id: attributes.id ?? '', label: null, values, line });
    else if (kind === 'hyperedge') handler.odd(line, 'A hyperedge ties more than two members.');
    else
      handler.edge({
        source: attributes.source ?? '',
        target: attributes.target ?? '',
        weight: null,
        kind: null,
        values,
        line,
      });
  };
  return {
    open(tag) {
      const { name, attributes } = tag;
      if (name === 'key')
        declared = {
          of: attributes.for ?? 'all',
          key: attributes.id ?? '',
          title: attributes['attr.name'] ?? attributes.id ?? '',
          fallback: null,
        };
      else if (name === 'node' || name === 'edge' || name === 'hyperedge')
        open.push({ kind: name, tag, values: new Map() });
      else if (name === 'data') dataKey = attributes.key ?? '';
    },
    close(name, text) {
      if (name === 'default' && declared) declared.fallback = text.trim();
      else if (name === 'key' && declared) {
        const { of, ...column } = declared;
        for (const kind of ['node', 'edge'] as const)
          if (of === kind || of === 'all') handler.column({ of: kind, ...column });
        declared = null;
      } else if (name === 'data') open.at(-1)?.values.set(dataKey, text.trim());
      else if (name === 'node' || name === 'edge' || name === 'hyperedge') {
        const ended = open.pop();
        if (ended) finish(ended);
      }
    },
  };
}
