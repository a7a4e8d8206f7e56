import { Button } from './Button';

export interface ProgressBarProps {
  label: string;
  /** 0…1, or null while nothing is known yet. */
  value: number | null;
  /** Shows the stop button. */
  onStop?: () => void;
  stopLabel?: string;
  /** What the value means in words, e.g. "620 of 1,264 threads". */
  valueText?: string;
  /** `weft` is the thick woven bar of imports. */
  look?: 'bar' | 'weft';
}

/** How far a piece of work is, with a stop button when it can be stopped. */
export function ProgressBar({
  label,
  value,
  onStop,
  stopLabel = 'Stop',
  valueText,
  look = 'bar',
}: ProgressBarProps) {
  const percent = value === null ? undefined : Math.round(Math.min(1, Math.max(0, value)) * 100);
  const className = look === 'weft' ? 'weft grow' : value === null ? 'bar wait grow' : 'bar grow';
  return (
    <div className="row">
      <div
        className={className}
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent}
        aria-valuetext={valueText}
      >
        <i style={percent === undefined ? undefined : { width: `${percent}%` }} />
      </div>
      {onStop && (
        <Button kind="quiet" size="small" onClick={onStop}>
          {stopLabel}
        </Button>
      )}
    </div>
  );
}
