import type { KeyboardEvent, ReactNode } from 'react';
import { formatNumber } from '@/lib/format';
import { StripAxis } from './Axis';
import { edgesOf, moveEdge, nearestEdge, shiftRange, type Bin, type EdgeRange } from './bins';
import { TideBars } from './TideBars';
import { ticksFor } from './ticks';
import { useTideBrush } from './useTideBrush';
import { useWidth } from './useWidth';

export interface TideStripProps {
  /** What is counted, e.g. "Helpfulness". */
  label: string;
  bins: readonly Bin[];
  /** Range shown, in the units of the bins; null: everything. */
  selection: readonly [number, number] | null;
  onChange: (selection: [number, number] | null) => void;
  /** [ and ] on a handle; when left out they move the range by one bin. */
  onStep?: (direction: -1 | 1) => void;
  height?: number;
  format?: (value: number) => string;
  /** Members without a value; they are said, not drawn. */
  missing?: number;
  /** Muted line under the label, and a line under that (e.g. "212 of 1,264"). */
  sub?: ReactNode;
  summary?: ReactNode;
  /** Only the strip, without the words at its sides. */
  bare?: boolean;
}

/** A distribution that can be brushed: the legend is the instrument. */
export function TideStrip(props: TideStripProps) {
  const {
    label,
    bins,
    selection,
    onChange,
    onStep,
    height = 64,
    format = (v) => formatNumber(v),
    missing = 0,
    bare,
  } = props;
  const [water, width] = useWidth<HTMLDivElement>(560);
  const edges = edgesOf(bins);
  const domain: [number, number] = [edges[0] ?? 0, edges[edges.length - 1] ?? 1];
  const range: EdgeRange | null = selection && [
    nearestEdge(edges, selection[0]),
    nearestEdge(edges, selection[1]),
  ];
  const setRange = (next: EdgeRange | null) => {
    const whole = !next || (next[0] <= 0 && next[1] >= bins.length);
    if (whole) {
      if (selection) onChange(null);
    } else if (!range || next[0] !== range[0] || next[1] !== range[1]) {
      onChange([edges[next[0]] ?? domain[0], edges[next[1]] ?? domain[1]]);
    }
  };
  const brush = useTideBrush(water, bins.length, range, setRange);
  const here: EdgeRange = range ?? [0, bins.length];
  const onKey = (end: 'low' | 'high') => (event: KeyboardEvent) => {
    const size = event.shiftKey ? 10 : 1;
    const far = bins.length;
    const steps: Record<string, number> = {
      ArrowLeft: -size,
      ArrowDown: -size,
      ArrowRight: size,
      ArrowUp: size,
      PageDown: -10,
      PageUp: 10,
      Home: -far,
      End: far,
    };
    const by = steps[event.key];
    if (by !== undefined) setRange(moveEdge(here, end, by, far));
    else if (event.key === '[' || event.key === ']') {
      const direction = event.key === '[' ? -1 : 1;
      if (onStep) onStep(direction);
      else setRange(shiftRange(here, direction, far));
    } else if (event.key === 'Escape') {
      if (!selection) return;
      setRange(null);
    } else return;
    event.preventDefault();
    event.stopPropagation();
  };
  const words = selection ? `${format(selection[0])} to ${format(selection[1])}` : 'Drag to filter';
  const strip = (
    <div>
      <div className="water" ref={water} {...brush}>
        <TideBars bins={bins} height={height} range={range} />
        {range && (
          <div
            className="brush"
            data-part="brush"
            style={{
              left: `${(range[0] / bins.length) * 100}%`,
              width: `${((range[1] - range[0]) / bins.length) * 100}%`,
            }}
          />
        )}
        {(['low', 'high'] as const).map((end, i) => (
          <span
            key={end}
            className={selection ? 'hnd' : 'hnd idle'}
            data-part={end}
            role="slider"
            tabIndex={0}
            aria-label={`${end === 'low' ? 'Lowest' : 'Highest'} ${label} shown`}
            aria-valuemin={domain[0]}
            aria-valuemax={domain[1]}
            aria-valuenow={selection?.[i] ?? domain[i]}
            aria-valuetext={format(selection?.[i] ?? domain[i] ?? 0)}
            style={{ left: `${((here[i] ?? 0) / bins.length) * 100}%` }}
            onKeyDown={onKey(end)}
          />
        ))}
      </div>
      <StripAxis domain={domain} ticks={ticksFor(domain, width, 64, format)} />
    </div>
  );
  if (bare) return <div className="tide bare">{strip}</div>;
  return (
    <div className="tide">
      <div>
        <div className="h4">{label}</div>
        {props.sub && <div className="small mut">{props.sub}</div>}
        {missing > 0 && <div className="small mut">{formatNumber(missing)} without a score</div>}
        {props.summary && (
          <div className="small" style={{ marginTop: 5 }}>
            {props.summary}
          </div>
        )}
      </div>
      {strip}
      <div className="col g4 tide-end">
        <span className={selection ? 'b nw' : 'small mut nw'} aria-live="polite">
          {words}
        </span>
        {selection && (
          <button type="button" className="btn sm" onClick={() => onChange(null)}>
            Clear
          </button>
        )}
      </div>
    </div>
  );
}
