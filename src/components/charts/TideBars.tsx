import type { Bin, EdgeRange } from './bins';

/** The bars of a strip; what is outside the range fades but stays in place. Stretches to its box: it holds no words. */
export function TideBars({
  bins,
  height,
  range,
}: {
  bins: readonly Bin[];
  height: number;
  range: EdgeRange | null;
}) {
  const tallest = Math.max(1, ...bins.map((bin) => bin.count));
  const tall = (count: number) => (count / tallest) * (height - 2);
  return (
    <svg
      viewBox={`0 0 ${bins.length * 10} ${height}`}
      preserveAspectRatio="none"
      width="100%"
      height={height}
      aria-hidden="true"
    >
      {bins.map((bin, i) => {
        let top = height;
        const parts = bin.parts ?? [
          { key: '', count: bin.count, colour: bin.colour ?? 'var(--c-line-strong)' },
        ];
        return (
          <g key={bin.x0} opacity={range && (i < range[0] || i >= range[1]) ? 0.3 : 1}>
            {parts.map((part) => {
              if (part.count <= 0) return null;
              top -= tall(part.count);
              return (
                <rect
                  key={part.key}
                  x={i * 10 + 0.7}
                  y={top}
                  width={8.6}
                  height={tall(part.count)}
                  fill={part.colour}
                  stroke="var(--c-node-edge)"
                  strokeWidth={0.4}
                  vectorEffect="non-scaling-stroke"
                />
              );
            })}
          </g>
        );
      })}
      <path
        d={`M0 ${height}H${bins.length * 10}`}
        stroke="var(--c-line-strong)"
        vectorEffect="non-scaling-stroke"
      />
    </svg>
  );
}
