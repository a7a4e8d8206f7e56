import { ColumnChart } from '@/components/charts';
import { formatNumber } from '@/lib/format';
import type { GroupingView } from '../groupings';
import { methodWords } from './words';

/** Gaps between neighbouring graph frequencies: the larger, the cleaner the cut into that many groups. */
export function HowMany({ view }: { view: GroupingView }) {
  if (!view.gaps || view.gaps.length < 2) return null;
  return (
    <section className="card p" style={{ marginTop: 10, padding: '12px 16px 8px' }}>
      <div className="row sp wrap">
        <h2 className="h3">How many groups?</h2>
        <span className="small mut">Taller means a cleaner cut</span>
      </div>
      <ColumnChart
        label={`How many groups: the gap after each number of groups; ${view.k ?? ''} were made`}
        columns={view.gaps.map(({ k, gap }) => ({
          key: String(k),
          label: String(k),
          value: gap,
          current: k === view.k,
        }))}
        format={(value) => formatNumber(value, 4)}
        withTable
      />
    </section>
  );
}

const exact = (value: number | null): string =>
  value === null
    ? '–'
    : value !== 0 && Math.abs(value) < 1e-3
      ? value.toExponential(2)
      : formatNumber(value, Number.isInteger(value) ? 0 : 4);

/** Everything needed to do it again. */
export function HowMade({ view }: { view: GroupingView }) {
  const { cheeger, eigenvalues, residuals } = view;
  const rows: [string, string][] = [
    ['Method', methodWords(view)],
    ['Source', view.source],
    ['Groups', String(view.k ?? '–')],
    ['Members divided', formatNumber(view.scope.members)],
    ['Modularity', exact(view.modularity)],
    ['Normalised cut', exact(view.normalisedCut)],
    ['Seed', String(view.seed)],
    ['Version', view.version],
    ['Time taken', `${formatNumber(view.seconds, 1)} s`],
  ];
  if (view.tau !== null) rows.splice(2, 0, ['Regularisation τ', exact(view.tau)]);
  if (cheeger)
    rows.push([
      'Best conductance possible',
      `between ${exact(cheeger.lower)} and ${exact(cheeger.upper)} (Cheeger’s bounds)`,
    ]);
  if (eigenvalues.length > 0) {
    rows.push(['Graph frequencies', eigenvalues.slice(0, 12).map(exact).join(', ')]);
    rows.push(['Largest residual', exact(Math.max(...residuals))]);
  }
  return (
    <details className="card p" style={{ marginTop: 14 }}>
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
