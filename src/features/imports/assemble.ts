import type { AttributeColumn } from './attributes';
import type { CombinedTies } from './combine';
import { importErrors } from './errors';

export interface EarlierMembers {
  readonly names: readonly (string | null)[];
  readonly attributes: readonly AttributeColumn[];
}

/** Everything that becomes a snapshot; arrays run in member order. */
export interface Assembled {
  readonly ids: string[];
  readonly names: (string | null)[];
  readonly ties: CombinedTies;
  readonly attributes: AttributeColumn[];
  /** Members of the file that were left out, and members met in the ties alone. */
  readonly leftOut: { readonly file: number; readonly earlier: number; readonly ties: number };
  /** Attributes that nobody who is left has. */
  readonly emptied: string[];
}

/** One value a member from one a row. */
function spread(
  column: AttributeColumn,
  places: Int32Array,
  n: number,
  before: AttributeColumn | undefined,
): AttributeColumn {
  if (before && before.type !== column.type)
    throw importErrors.changedType(column.name, before.type, column.type);
  if (column.labels) {
    const labels = new Array<string | null>(n).fill(null);
    before?.labels?.forEach((label, i) => (labels[i] = label));
    places.forEach((place, row) => (labels[place] = column.labels![row] ?? labels[place]!));
    return { ...column, labels };
  }
  const values = new Float64Array(n).fill(NaN);
  before?.values.forEach((value, i) => (values[i] = value));
  places.forEach((place, row) => {
    if (!Number.isNaN(column.values[row]!)) values[place] = column.values[row]!;
  });
  return { ...column, values };
}

const padded = (column: AttributeColumn, n: number): AttributeColumn =>
  spread({ ...column, values: new Float64Array(), labels: column.labels && [] }, new Int32Array(), n, column);

/** Keeps only some of the members. */
function pick(column: AttributeColumn, kept: readonly number[]): AttributeColumn {
  return column.labels
    ? { ...column, labels: kept.map((i) => column.labels![i]!) }
    : { ...column, values: Float64Array.from(kept, (i) => column.values[i]!) };
}

/**
 * Puts members, ties and attributes together: what the files say, over what the earlier snapshot said where there is
 * one; members without a tie are left out if so chosen.
 * @param places of the rows of the members file
 */
export function assemble(input: {
  ids: readonly string[];
  names: readonly (string | null)[];
  places: Int32Array;
  attributes: readonly AttributeColumn[];
  ties: CombinedTies;
  earlier: EarlierMembers | null;
  loners: 'keep' | 'leave-out';
}): Assembled {
  const { ids, places, ties, earlier } = input;
  const n = ids.length;
  const names = new Array<string | null>(n).fill(null);
  earlier?.names.forEach((name, i) => (names[i] = name));
  places.forEach((place, row) => (names[place] = input.names[row] ?? names[place]!));
  const before = new Map(earlier?.attributes.map((one) => [one.name, one]));
  const own = new Map(input.attributes.map((one) => [one.name, one]));
  // Attributes of the earlier snapshot keep their place, and the file's own choices about them win.
  const order = [...new Set([...before.keys(), ...own.keys()])];
  const attributes = order.map((name) =>
    own.has(name) ? spread(own.get(name)!, places, n, before.get(name)) : padded(before.get(name)!, n),
  );
  const whole = {
    ids: [...ids],
    names,
    ties,
    attributes,
    leftOut: { file: 0, earlier: 0, ties: 0 },
    emptied: [],
  };
  if (input.loners === 'keep') return whole;
  const tied = new Uint8Array(n);
  for (const ends of [ties.sources, ties.targets]) for (const end of ends) tied[end] = 1;
  const kept = whole.ids.map((_, i) => i).filter((i) => tied[i] === 1);
  const next = new Int32Array(n).fill(-1);
  kept.forEach((i, at) => (next[i] = at));
  const inFile = new Uint8Array(n);
  for (const place of places) inFile[place] = 1;
  const leftOut = { file: 0, earlier: 0, ties: 0 };
  for (let i = 0; i < n; i++) {
    if (tied[i] === 1) continue;
    if (inFile[i] === 1) leftOut.file++;
    else if (i < (earlier?.names.length ?? 0)) leftOut.earlier++;
    else leftOut.ties++;
  }
  const picked = attributes.map((one) => pick(one, kept));
  return {
    ids: kept.map((i) => ids[i]!),
    names: kept.map((i) => names[i]!),
    ties: {
      ...ties,
      sources: ties.sources.map((end) => next[end]!),
      targets: ties.targets.map((end) => next[end]!),
    },
    attributes: picked.filter(hasValues),
    leftOut,
    emptied: picked.filter((one) => !hasValues(one)).map((one) => one.name),
  };
}

const hasValues = ({ labels, values }: AttributeColumn): boolean =>
  labels ? labels.some((label) => label !== null) : values.some((value) => !Number.isNaN(value));
