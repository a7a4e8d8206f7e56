import {
  takeReading,
  type Network,
  type ReadingColumns as Columns,
  type ReadingInput as Options,
  type Watch,
} from '@/numerics';
import type { ReadingFilter } from './filter';
import type { ReadingSummaryResult } from './readings';
import { warpOf } from './warp';
import { THRESHOLD } from './words';

/** What the thread task `reading` is given: typed arrays and options, nothing else. */
export interface ReadingInput extends Omit<Options, 'filter'> {
  readonly net: Network;
  readonly filter: ReadingFilter;
}

export type ReadingColumns = Columns;

export interface ReadingOutput {
  readonly columns: ReadingColumns;
  readonly result: Omit<ReadingSummaryResult, 'seconds'>;
}

const METHODS: Record<ReadingFilter['kind'], string> = {
  'two-level': 'Levels of groups by generalised least squares, ties by a Laplacian prior, robust rounds',
  tikhonov: 'Tikhonov, (S + αL) ŷ = S y',
  heat: 'Heat kernel exp(−τL)',
  'low-pass': 'Ideal low-pass',
  'high-pass': 'Ideal high-pass',
  'band-pass': 'Ideal band-pass',
};

const finite = (value: number): number | null => (Number.isFinite(value) ? value : null);

/** Every number of a record that is not finite becomes null, as JSON has no NaN. */
const withNulls = <T extends object>(record: T): { [K in keyof T]: T[K] | null } =>
  Object.fromEntries(
    Object.entries(record).map(([key, value]) => [key, typeof value === 'number' ? finite(value) : value]),
  ) as { [K in keyof T]: T[K] | null };

/** Takes a reading and sums it up; columns stay typed arrays for the database. */
export function computeReading({ net, filter, ...input }: ReadingInput, watch?: Watch): ReadingOutput {
  // The number of groups asked for has done its work when the groups were made.
  const used: Options['filter'] = filter.kind === 'two-level' ? { kind: filter.kind } : filter;
  const { columns, moran, geary, ...found } = takeReading(
    net,
    { ...input, filter: used },
    watch && { ...watch, progress: (done, step) => watch.progress?.(0.93 * done, step) },
  );
  watch?.progress?.(0.94, 'Drawing the warp');
  const filled = columns.value.map((value, i) => (Number.isNaN(value) ? columns.smoothed[i]! : value));
  const laplacian = filter.kind === 'two-level' ? 'combinatorial' : input.laplacian;
  const levels =
    filter.kind === 'two-level' ? new Set(input.groups?.filter((group) => group >= 0)).size : null;
  return {
    columns,
    result: {
      alpha: finite(found.alpha),
      sigma: finite(found.sigma),
      sigmaLikelihood: finite(found.sigmaLikelihood),
      observed: found.observed,
      missing: found.missing,
      tested: found.tested,
      effectiveDegrees: finite(found.effectiveDegrees),
      moran: moments(moran),
      geary: moments(geary),
      smoothness: withNulls(found.smoothness),
      explained: finite(found.explained),
      typical: finite(found.typical),
      residual: finite(found.residual),
      method: METHODS[filter.kind],
      flagged: columns.q.reduce(
        (count, q, i) => count + (columns.tested[i] === 1 && q <= THRESHOLD ? 1 : 0),
        0,
      ),
      levels,
      warp: warpOf(net, filled, columns.smoothed, laplacian, watch),
      notes: [...found.notes],
    },
  };
}

interface Both<T> {
  row: T;
  raw: T;
}
type Moments = NonNullable<ReadingSummaryResult['moran']>['row'];

const moments = ({ row, raw }: Both<Parameters<typeof withNulls>[0]>): Both<Moments> => ({
  row: withNulls(row) as Moments,
  raw: withNulls(raw) as Moments,
});
