import type { Dialect, GraphHandler, Tag } from './dialect';

interface Open {
  kind: 'node' | 'edge';
  tag: Tag;
  values: Map<string, string>;
}

/** GEXF 1.2 and 1.3 (https://gexf.net/schema.html): nodes and edges with declared attributes. */
export function gexf(handler: GraphHandler): Dialect {
  let of: 'node' | 'edge' = 'node';
  let declared: { key: string; title: string; fallback: string | null } | null = null;
  // Nodes may stand within nodes.
  const open: Open[] = [];
  const finish = ({ kind, tag, values }: Open): void => {
    const { attributes, line } = tag;
    if (kind === 'node')
      handler.node({ id: attributes.id ?? '', label: attributes.label ?? null, values, line });
    else
      handler.edge({
        source: attributes.source ?? '',
        target: attributes.target ?? '',
        weight: attributes.weight ?? null,
        kind: attributes.kind ?? null,
        values,
        line,
      });
  };
  return {
    open(tag) {
      const { name, attributes } = tag;
      if (name === 'attributes') of = attributes.class === 'edge' ? 'edge' : 'node';
      else if (name === 'attribute')
        declared = {
          key: attributes.id ?? '',
          title: attributes.title ?? attributes.id ?? '',
          fallback: null,
        };
      else if (name === 'node' || name === 'edge') open.push({ kind: name, tag, values: new Map() });
      else if (name === 'attvalue')
        // `id` instead of `for` is the spelling of GEXF 1.0.
        open.at(-1)?.values.set(attributes.for ?? attributes.id ?? '', attributes.value ?? '');
    },
    close(name, text) {
      if (name === 'default' && declared) declared.fallback = text.trim();
      else if (name === 'attribute' && declared) {
        handler.column({ of, ...declared });
        declared = null;
      } else if (name === 'node' || name === 'edge') {
        const ended = open.pop();
        if (ended) finish(ended);
      }
    },
  };
}
