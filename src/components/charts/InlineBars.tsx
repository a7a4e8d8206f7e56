import { divergingStep, rampColour } from '@/lib/ramps';

/** A length from 0 to 1, beside its figure (in tables and cards). Decorative: the figure says the same. */
export function Bar({ share, colour }: { share: number; colour?: string }) {
  const percent = Math.min(1, Math.max(0, Number.isFinite(share) ? share : 0)) * 100;
  return (
    <div className="bar" aria-hidden="true">
      <i style={{ width: `${percent}%`, background: colour }} />
    </div>
  );
}

/** Figure with a bar, for a table cell. */
export function BarCell({ share, text }: { share: number; text: string }) {
  return (
    <div className="ib">
      <b className="r">{text}</b>
      <Bar share={share} />
    </div>
  );
}

export interface DivergingBarProps {
  /** Value around 0; null draws only the centre line. */
  value: number | null;
  /** The value that fills half the width. */
  most: number;
  width?: number;
  height?: number;
  colour?: string;
}

/** A bar that leaves its centre line to the left or right, in the diverging ramp. Decorative: the figure stands beside it. */
export function DivergingBar({ value, most, width = 80, height = 12, colour }: DivergingBarProps) {
  const middle = width / 2;
  const place = value === null || !(most > 0) ? 0 : Math.max(-1, Math.min(1, value / most));
  const length = Math.abs(place) * (middle - 2);
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      width={width}
      height={height}
      aria-hidden="true"
      style={{ flex: 'none' }}
    >
      <path d={`M${middle} 0v${height}`} stroke="var(--c-line-strong)" />
      {length > 0 && (
        <rect
          x={place < 0 ? middle - length : middle}
          y={height / 4}
          width={length}
          height={height / 2}
          rx={1.5}
          fill={colour ?? rampColour('diverging', divergingStep(place, 0, 1))}
          stroke="var(--c-node-edge)"
          strokeWidth={0.6}
        />
      )}
    </svg>
  );
}

/** Two lengths that meet: ties on each side of a seam, in the colours of the two groups. */
export function SplitBar({
  left,
  right,
  colours,
}: {
  left: number;
  right: number;
  colours: [string, string];
}) {
  const total = Math.max(1, left + right);
  return (
    <div aria-hidden="true" style={{ display: 'flex', gap: 2, height: 6 }}>
      <i style={{ width: `${(left / total) * 100}%`, background: colours[0], borderRadius: '3px 0 0 3px' }} />
      <i
        style={{ width: `${(right / total) * 100}%`, background: colours[1], borderRadius: '0 3px 3px 0' }}
      />
    </div>
  );
}
