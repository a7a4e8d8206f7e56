import { DivergingBar } from '@/components/charts';
import { Tag } from '@/components/ui';
import { formatChance, formatDeparture, formatNumber } from '@/lib/format';
import type { ExploreProps } from '@/features/views';
import type { MemberRow } from '../members';

/** One value in the table, drawn by what its field means. */
export function Cell({
  props,
  row,
  field,
  most,
}: {
  props: ExploreProps;
  row: MemberRow;
  field: string;
  most: number;
}) {
  const value = row.values[field];
  const [kind, id] = field.split(':');
  if (kind === 'group') {
    const group = props.groupings.find((one) => one.id === id)?.groups.find((one) => one.index === value);
    if (!group) return <span className="mut">–</span>;
    return (
      <span className="row">
        <Tag letter={group.letter} />
        <span className="x1">{group.name ?? `Group ${group.letter}`}</span>
      </span>
    );
  }
  if (value === null || value === undefined)
    return <span className="mut">{kind === 'q' ? 'not tested' : 'blank'}</span>;
  if (typeof value === 'string') return <span>{value}</span>;
  if (kind === 'departure')
    return (
      <span className="row">
        <DivergingBar value={value} most={most} width={70} />
        <b className="r">{formatDeparture(value)}</b>
      </span>
    );
  if (kind === 'q') return <span>{formatChance(value)}</span>;
  if (row.filled.includes(field))
    return (
      <span className="fi" title="Filled in from neighbours">
        ≈ {formatNumber(value)}
      </span>
    );
  return kind === 'attribute' ? <b>{formatNumber(value)}</b> : <span>{formatNumber(value)}</span>;
}
