import { formatCount } from '@/lib/format';

/** A few words about the member under the pointer; the panel says the rest. */
export function HoverCard({
  at,
  name,
  degree,
  value,
}: {
  at: { x: number; y: number };
  name: string | null;
  degree: number;
  value: string | null;
}) {
  return (
    <div
      className="hovc"
      style={{ left: `min(${at.x + 16}px, calc(100% - 240px))`, top: `${at.y + 12}px` }}
      aria-hidden="true"
    >
      <div className="row sp">
        <b>{name ?? '…'}</b>
        <span className="small mut">{formatCount(degree, 'tie')}</span>
      </div>
      {value && <div className="small">{value}</div>}
    </div>
  );
}
