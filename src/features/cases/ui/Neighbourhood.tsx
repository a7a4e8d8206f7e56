import { formatNumber } from '@/lib/format';
import { divergingStep, rampColour } from '@/lib/ramps';
import type { CaseDetail } from '../cases';

const SIZE = 280;
const MOST = 24;

/** The member in the middle, tied members around; a wider line is more contact. */
export function Neighbourhood({ detail, name }: { detail: CaseDetail; name: string }) {
  const shown = detail.neighbourhood.items.slice(0, MOST);
  const heaviest = Math.max(1e-9, ...shown.map((one) => one.weight));
  const place = (i: number): [number, number] => {
    const angle = (2 * Math.PI * i) / shown.length - Math.PI / 2;
    const radius = SIZE * 0.38 * (i % 2 === 0 ? 1 : 0.86);
    return [SIZE / 2 + radius * Math.cos(angle), SIZE / 2 + radius * Math.sin(angle)];
  };
  const centre = detail.evidence.predicted ?? 0;
  const spread = 2.5 * (detail.neighbourhood.sigma ?? 1);
  const colour = (value: number | null): string =>
    value === null ? 'var(--c-sheet)' : rampColour('diverging', divergingStep(value, centre, spread));
  return (
    <div>
      <h2 className="h4">Neighbourhood</h2>
      <p className="small mut">
        Wider line, more contact
        {detail.neighbourhood.items.length > MOST
          ? `; the ${MOST} strongest of ${detail.neighbourhood.items.length}`
          : ''}
      </p>
      <svg
        viewBox={`0 0 ${SIZE} ${SIZE}`}
        width="100%"
        style={{ maxWidth: SIZE }}
        role="img"
        aria-label={`${name} and ${formatNumber(shown.length)} tied members; the scores stand in the table of the strip above.`}
      >
        {detail.neighbourhood.between
          .filter(([a, b]) => a < shown.length && b < shown.length)
          .map(([a, b]) => {
            const [x1, y1] = place(a);
            const [x2, y2] = place(b);
            return (
              <line
                key={`${a}-${b}`}
                x1={x1}
                y1={y1}
                x2={x2}
                y2={y2}
                stroke="var(--c-line-strong)"
                strokeWidth={0.6}
                opacity={0.6}
              />
            );
          })}
        {shown.map((one, i) => {
          const [x, y] = place(i);
          return (
            <line
              key={one.id}
              x1={SIZE / 2}
              y1={SIZE / 2}
              x2={x}
              y2={y}
              stroke="var(--c-ink)"
              strokeWidth={0.8 + 2.4 * Math.sqrt(one.weight / heaviest)}
            />
          );
        })}
        {shown.map((one, i) => {
          const [cx, cy] = place(i);
          return (
            <circle key={one.id} cx={cx} cy={cy} r={8} fill={colour(one.value)} stroke="var(--c-node-edge)" />
          );
        })}
        <circle
          cx={SIZE / 2}
          cy={SIZE / 2}
          r={11}
          fill={colour(detail.evidence.value)}
          stroke="var(--c-madder)"
          strokeWidth={2.5}
        />
      </svg>
    </div>
  );
}
