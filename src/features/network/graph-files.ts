/** Open formats for a network with attributes: GEXF 1.3 and GraphML 1.0, as text in pieces. */
export type GraphFormat = 'gexf' | 'graphml';

export interface GraphAttribute {
  readonly name: string;
  readonly type: 'number' | 'label';
}

export interface GraphMember {
  readonly id: string;
  readonly name: string | null;
  /** One value for each attribute; null where blank. */
  readonly values: readonly (number | string | null)[];
}

export interface GraphTie {
  readonly from: string;
  readonly to: string;
  readonly weight: number;
  readonly kind: string | null;
}

export interface GraphWriter {
  head(takenOn: string): string;
  member(member: GraphMember): string;
  /** Between the last member and the first tie. */
  middle: string;
  tie(tie: GraphTie, number: number): string;
  foot: string;
}

/** What XML 1.0 has no form for: most control characters and halves of surrogate pairs. They are left out. */
const FORBIDDEN = /[^\t\n\r\u0020-\ud7ff\ue000-\ufffd\u{10000}-\u{10ffff}]/gu;
const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  '\t': '&#9;',
  '\n': '&#10;',
  '\r': '&#13;',
};

/** Text for use within an element or a quoted attribute. */
export const escapeXml = (text: string): string =>
  text.replace(FORBIDDEN, '').replace(/[&<>"\t\n\r]/g, (one) => ENTITIES[one]!);

const HEAD = '<?xml version="1.0" encoding="UTF-8"?>\n';

/** GEXF 1.3: members with their attributes as attvalues, ties with weight and, where known, kind. */
const gexf = (attributes: readonly GraphAttribute[]): GraphWriter => {
  // The name itself is the id, as most readers call the value by it.
  const ids = attributes.map(({ name }) => escapeXml(name));
  return {
    head: (takenOn) =>
      `${HEAD}<gexf xmlns="http://gexf.net/1.3" version="1.3">\n<meta lastmodifieddate="${takenOn}"><creator>Thrum</creator></meta>\n` +
      `<graph defaultedgetype="undirected" mode="static">\n<attributes class="node">\n${attributes
        .map(
          ({ name, type }) =>
            `<attribute id="${escapeXml(name)}" title="${escapeXml(name)}" type="${type === 'number' ? 'double' : 'string'}"/>\n`,
        )
        .join(
          '',
        )}</attributes>\n<attributes class="edge"><attribute id="kind" title="kind" type="string"/></attributes>\n<nodes>\n`,
    member: ({ id, name, values }) => {
      const filled = values
        .map((value, a) =>
          value === null ? '' : `<attvalue for="${ids[a]}" value="${escapeXml(String(value))}"/>`,
        )
        .join('');
      return `<node id="${escapeXml(id)}" label="${escapeXml(name ?? id)}">${filled ? `<attvalues>${filled}</attvalues>` : ''}</node>\n`;
    },
    middle: '</nodes>\n<edges>\n',
    tie: ({ from, to, weight, kind }, number) =>
      `<edge id="${number}" source="${escapeXml(from)}" target="${escapeXml(to)}" weight="${weight}">${
        kind === null ? '' : `<attvalues><attvalue for="kind" value="${escapeXml(kind)}"/></attvalues>`
      }</edge>\n`,
    foot: '</edges>\n</graph>\n</gexf>\n',
  };
};

/** GraphML 1.0: every attribute a key, ties with `weight` and, where known, `kind`. */
const graphml = (attributes: readonly GraphAttribute[]): GraphWriter => ({
  head: () =>
    `${HEAD}<graphml xmlns="http://graphml.graphdrawing.org/xmlns">\n<key id="label" for="node" attr.name="label" attr.type="string"/>\n${attributes
      .map(
        ({ name, type }, a) =>
          `<key id="a${a}" for="node" attr.name="${escapeXml(name)}" attr.type="${type === 'number' ? 'double' : 'string'}"/>\n`,
      )
      .join(
        '',
      )}<key id="weight" for="edge" attr.name="weight" attr.type="double"/>\n<key id="kind" for="edge" attr.name="kind" attr.type="string"/>\n<graph edgedefault="undirected">\n`,
  member: ({ id, name, values }) =>
    `<node id="${escapeXml(id)}"><data key="label">${escapeXml(name ?? id)}</data>${values
      .map((value, a) => (value === null ? '' : `<data key="a${a}">${escapeXml(String(value))}</data>`))
      .join('')}</node>\n`,
  middle: '',
  tie: ({ from, to, weight, kind }, number) =>
    `<edge id="e${number}" source="${escapeXml(from)}" target="${escapeXml(to)}"><data key="weight">${weight}</data>${
      kind === null ? '' : `<data key="kind">${escapeXml(kind)}</data>`
    }</edge>\n`,
  foot: '</graph>\n</graphml>\n',
});

/** The writer of a format for a network with these attributes. */
export const graphWriters: Readonly<
  Record<GraphFormat, (attributes: readonly GraphAttribute[]) => GraphWriter>
> = { gexf, graphml };
