import { formatNumber } from '@/lib/format';
import type { ReadingView } from '../readings';

type Moments = NonNullable<ReadingView['moran']>['row'];

const chance = (p: number | null): string =>
  p === null ? '–' : p < 0.0001 ? 'under 0.0001' : formatNumber(p, 4);

/** What Moran's I says, without the term. */
function verdict({ value, expectation, p }: Moments): string {
  if (value === null || expectation === null || p === null) return 'Could not be told.';
  if (p >= 0.05) return 'No more alike along ties than chance would make them.';
  return value > expectation
    ? 'Tied members resemble each other more than chance would have it.'
    : 'Tied members differ from each other more than chance would have it.';
}

/** Moran's I and Geary's C with what chance alone would give. */
export function SharedPanel({ reading }: { reading: ReadingView }) {
  const { moran, geary } = reading;
  if (!moran || !geary) return null;
  const rows: [string, string, Moments][] = [
    ['Moran’s I', 'row weights', moran.row],
    ['Moran’s I', 'raw weights', moran.raw],
    ['Geary’s C', 'row weights', geary.row],
    ['Geary’s C', 'raw weights', geary.raw],
  ];
  return (
    <section className="card" aria-labelledby="shared-title">
      <header>
        <h2 className="h3" id="shared-title">
          How shared it is
        </h2>
      </header>
      <p className="small ink2" style={{ padding: '0 16px 10px' }}>
        {verdict(moran.row)}
      </p>
      <div className="tscroll" tabIndex={0} role="region" aria-label="Moran’s I and Geary’s C">
        <table className="tbl">
          <thead>
            <tr>
              <th scope="col">Measure</th>
              <th scope="col" className="r">
                Value
              </th>
              <th scope="col" className="r">
                By chance
              </th>
              <th scope="col" className="r">
                z
              </th>
              <th scope="col" className="r">
                p
              </th>
            </tr>
          </thead>
          <tbody>
            {rows.map(([name, weights, one]) => (
              <tr key={name + weights}>
                <th scope="row" style={{ whiteSpace: 'normal', lineHeight: '16px', paddingBlock: 5 }}>
                  {name}
                  <span className="micro mut" style={{ display: 'block' }}>
                    {weights}
                  </span>
                </th>
                <td className="r">{formatNumber(one.value, 3)}</td>
                <td className="r">{formatNumber(one.expectation, 3)}</td>
                <td className="r">{formatNumber(one.z, 1)}</td>
                <td
                  className="r"
                  title={one.permutationP === null ? undefined : `${chance(one.permutationP)} by shuffling`}
                >
                  {chance(one.p)}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <p className="micro mut" style={{ padding: '8px 16px 12px' }}>
        {`${formatNumber(moran.row.n)} members with a score and a scored neighbour. p is two-sided, under randomisation. Row weights: the ties of each member add up to 1.`}
      </p>
    </section>
  );
}
