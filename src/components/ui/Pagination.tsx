import type { ReactNode } from 'react';
import { formatNumber } from '@/lib/format';
import { Button } from './Button';
import { Select } from './Select';

export interface PaginationProps {
  /** First row shown, from 0. */
  from: number;
  /** Rows shown. */
  shown: number;
  total: number;
  onPrevious?: () => void;
  onNext?: () => void;
  pageSize?: number;
  pageSizes?: readonly number[];
  onPageSize?: (size: number) => void;
  /** A note at the start, such as what "≈" means. */
  children?: ReactNode;
  noun?: string;
}

/** The foot of a table: note, rows shown, page size, previous and next. */
export function Pagination(props: PaginationProps) {
  const {
    from,
    shown,
    total,
    onPrevious,
    onNext,
    pageSize,
    pageSizes = [25, 50, 100],
    onPageSize,
    noun = 'Rows',
  } = props;
  const range =
    total === 0
      ? `No ${noun.toLowerCase()}`
      : `${noun} ${formatNumber(from + 1)} to ${formatNumber(from + shown)} of ${formatNumber(total)}`;
  return (
    <div className="pgf">
      <span className="small mut">{props.children}</span>
      <span className="grow" />
      <span className="small" role="status">
        {range}
      </span>
      {onPageSize && pageSize !== undefined && (
        <Select
          label="Per page"
          labelPlace="inside"
          size="small"
          options={pageSizes.map((size) => ({ id: String(size), label: String(size) }))}
          value={String(pageSize)}
          onChange={(size) => onPageSize(Number(size))}
        />
      )}
      <Button size="small" disabled={!onPrevious} onClick={onPrevious}>
        Previous
      </Button>
      <Button size="small" disabled={!onNext} onClick={onNext}>
        Next
      </Button>
    </div>
  );
}
