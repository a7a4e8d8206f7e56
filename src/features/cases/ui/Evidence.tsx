import { LineChart, StripPlot } from '@/components/charts';
import { formatChance, formatDate, formatDeparture, formatNumber } from '@/lib/format';
import type { CaseDetail } from '../cases';

/** The score against its neighbours, with what they predict. */
export function Evidence({ detail, name }: { detail: CaseDetail; name: string }) {
  const { value, predicted, departure, q } = detail.evidence;
  const around = detail.neighbourhood.items.flatMap((one) =>
    one.value === null ? [] : [{ label: one.name ?? one.code ?? '', value: one.value }],
  );
  if (value === null || predicted === null || departure === null) return null;
  const half = detail.neighbourhood.sigma === null ? 0 : 1.96 * detail.neighbourhood.sigma;
  const all = [value, predicted - half, predicted + half, ...around.map((one) => one.value)];
  const pad = (Math.max(...all) - Math.min(...all)) * 0.06 || 1;
  return (
    <div style={{ marginTop: 16 }}>
      <div className="row sp wrap">
        <h2 className="h4">{detail.attribute} against neighbours</h2>
        <span className="small">
          Chance of a false flag <b>{formatChance(q)}</b>
        </span>
      </div>
      <StripPlot
        name={name}
        value={value}
        predicted={predicted}
        neighbours={around}
        interval={[predicted - half, predicted + half]}
        intervalLabel="where 95% of such members fall"
        domain={[Math.min(...all) - pad, Math.max(...all) + pad]}
        withTable
      />
      <p className="small ink2">
        Scores {formatNumber(value, 2)}: <b>{formatDeparture(departure)}</b> against what the neighbourhood
        predicts without this score. Local Moran as a second opinion:{' '}
        {detail.evidence.localMoran.quadrant ?? 'not defined'}
        {detail.evidence.localMoran.q === null ? '' : `, q ${formatNumber(detail.evidence.localMoran.q, 2)}`}.
      </p>
    </div>
  );
}

/** The score and its prediction over the snapshots. */
export function History({ detail }: { detail: CaseDetail }) {
  const known = detail.history.filter((one) => one.value !== null);
  return (
    <div>
      <h2 className="h4">Over snapshots</h2>
      <p className="small mut">Score and what neighbours predict</p>
      {known.length < 2 ? (
        <p className="small ink2">Only one snapshot has a score.</p>
      ) : (
        <LineChart
          label={`${detail.attribute} over snapshots`}
          points={detail.history.map(({ takenOn, value, predicted, half }) => ({
            label: formatDate(takenOn, 'short'),
            value,
            predicted,
            low: predicted === null || half === null ? null : predicted - half,
            high: predicted === null || half === null ? null : predicted + half,
          }))}
          withTable
        />
      )}
    </div>
  );
}

/** The member's other scores in the same snapshot. */
export function Others({ detail }: { detail: CaseDetail }) {
  const known = detail.others.filter((one) => one.value !== null);
  if (known.length === 0) return null;
  return (
    <div style={{ marginTop: 14 }}>
      <h2 className="h4">Other attributes</h2>
      <table className="tbl">
        <thead>
          <tr>
            <th scope="col">Attribute</th>
            <th scope="col" className="r">
              Score
            </th>
            <th scope="col" className="r">
              Departure
            </th>
          </tr>
        </thead>
        <tbody>
          {known.map((one) => (
            <tr key={one.attribute}>
              <th scope="row">{one.attribute}</th>
              <td className="r">{formatNumber(one.value, 2)}</td>
              <td className="r">
                {one.departure === null ? (
                  <span className="mut">not read</span>
                ) : (
                  formatDeparture(one.departure)
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
