import { formatNumber } from '@/lib/format';
import type { ReadingFilter } from '../filter';
import type { ReadingView } from '../readings';
import { filterWords } from '../words';

const exact = (value: number | null | undefined): string =>
  value == null
    ? '–'
    : value !== 0 && (Math.abs(value) < 1e-3 || Math.abs(value) >= 1e6)
      ? value.toExponential(2)
      : formatNumber(value, Number.isInteger(value) ? 0 : 4);

const SOURCES: [string, string][] = [
  ['Left-out departure', 'Exact for a linear smoother: (y − ŷ) / (1 − leverage)'],
  [
    'Strength of smoothing',
    'Restricted maximum likelihood, Patterson & Thompson 1971; cross-validation, Golub, Heath & Wahba 1979',
  ],
  ['Chance of a false flag (q)', 'Benjamini & Hochberg 1995'],
  ['Moran’s I, Geary’s C', 'Cliff & Ord 1981, moments under randomisation'],
  ['Local Moran', 'Anselin 1995; Sokal, Oden & Thomson 1998'],
];

/** Every option, seed and residual: all that is needed to do it again. */
export function HowComputed({ reading }: { reading: ReadingView }) {
  const options = reading.options as {
    permutations?: number;
    weights?: string | null;
    neighbourFloor?: number;
  };
  const rows: [string, string][] = [
    ['Smoother', filterWords(reading.filter as unknown as ReadingFilter)],
    ['Method', reading.method],
    ['Laplacian', reading.laplacian],
    ['Strength α', exact(reading.alpha)],
    ['Spread σ̂ (robust)', exact(reading.sigma)],
    ['Spread by likelihood', exact(reading.sigmaLikelihood)],
    ['Effective degrees of freedom', exact(reading.effectiveDegrees)],
    ...(reading.levels === null ? [] : ([['Group levels', String(reading.levels)]] as [string, string][])),
    ['Smoothness xᵀLx', exact(reading.smoothness?.quadratic)],
    ['Rayleigh quotient', exact(reading.smoothness?.rayleigh)],
    [
      'Scores, missing, tested',
      [reading.observed, reading.missing, reading.tested].map((n) => formatNumber(n)).join(', '),
    ],
    ['Fewest scored neighbours to be tested', String(options.neighbourFloor ?? '–')],
    ['Weights', options.weights ?? 'equal'],
    ['Shuffles', formatNumber(options.permutations ?? null)],
    ['Largest residual of a solve', exact(reading.residual)],
    ['Seed', String(reading.seed)],
    ['Version', reading.version],
    ['Time taken', `${formatNumber(reading.seconds, 1)} s`],
    ...SOURCES,
  ];
  return (
    <details className="card p" style={{ marginTop: 16 }}>
      <summary className="b">How this was computed</summary>
      <dl className="kv small" style={{ marginTop: 10 }}>
        {rows.map(([term, text]) => (
          <div key={term} style={{ display: 'contents' }}>
            <dt>{term}</dt>
            <dd>{text}</dd>
          </div>
        ))}
      </dl>
    </details>
  );
}
