import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { buildNetwork } from '@/numerics/network';
import type { Network } from '@/numerics/types';

/** One expected value of a reference file; `compare` and `tolerance` say how it is met. */
export interface Expected {
  readonly value: unknown;
  readonly tolerance: number | null;
  readonly compare: string;
  readonly computed_with: readonly string[];
  readonly formula?: string;
}

export interface Reference {
  readonly name: string;
  /** Citation of the data. */
  readonly source: string;
  readonly n: number;
  readonly m: number;
  readonly ids: readonly string[];
  readonly edges: readonly (readonly [number, number, number])[];
  readonly signals: Readonly<Record<string, readonly (number | string | null)[]>>;
  readonly known_outliers: Readonly<Record<string, unknown>>;
  readonly expected: Readonly<Record<string, Expected>>;
  readonly network: Network;
}

const folder = fileURLToPath(new URL('./data/', import.meta.url));

/** Names of all reference folders, sorted. */
export const referenceNames: readonly string[] = readdirSync(folder, { withFileTypes: true })
  .filter((entry) => entry.isDirectory())
  .map((entry) => entry.name)
  .sort();

/** Reads one folder: the file as it is, and its network built from the listed edges. */
export function loadReference(name: string): Reference {
  const file = JSON.parse(readFileSync(`${folder}${name}/reference.json`, 'utf8')) as Omit<
    Reference,
    'network'
  >;
  const network = buildNetwork(
    file.n,
    Int32Array.from(file.edges, (edge) => edge[0]),
    Int32Array.from(file.edges, (edge) => edge[1]),
    Float64Array.from(file.edges, (edge) => edge[2]),
  );
  return { ...file, network };
}

/** A numeric signal in the order of `ids`; NaN where the value is missing. */
export function numericSignal(reference: Reference, signal: string): Float64Array {
  const values = reference.signals[signal];
  if (!values) throw new Error(`${reference.name} has no signal ${signal}`);
  return Float64Array.from(values, (value) => (typeof value === 'number' ? value : NaN));
}
