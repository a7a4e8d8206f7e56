const WIDTHS = [88, 110, 74, 98, 120, 82];
const SHARES = [60, 40, 70, 52, 34, 66];

/** The first paint of a table whose rows are on their way. */
export function SkeletonTable({ rows = 6, label = 'Loading rows' }: { rows?: number; label?: string }) {
  return (
    <div role="status" aria-busy="true">
      <span className="vh">{label}</span>
      {Array.from({ length: rows }, (_, i) => (
        <div
          className="skrow"
          key={i}
          style={{ gridTemplateColumns: `16px ${WIDTHS[i % 6]}px 1fr 60px` }}
          aria-hidden="true"
        >
          <i className="sk" style={{ height: 16 }} />
          <i className="sk" />
          <i className="sk" style={{ width: `${SHARES[i % 6]}%`, opacity: 0.6 }} />
          <i className="sk" />
        </div>
      ))}
    </div>
  );
}

/** One grey line in place of words or a figure. */
export function Skeleton({ width = '100%', height = 11 }: { width?: number | string; height?: number }) {
  return <i className="sk" style={{ width, height }} aria-hidden="true" />;
}
