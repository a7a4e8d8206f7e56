import { useState } from 'react';
import { EmptyState, Button, ButtonLink, PageHead, StatusBadge, Tag } from '@/components/ui';
import { formatCount, formatDate, formatNumber } from '@/lib/format';
import type { GroupingSummary } from '../groupings';
import { NewGrouping } from './NewGrouping';
import { methodWords } from './words';

export interface GroupsProps {
  snapshot: { id: string; takenOn: string; members: number; ties: number };
  items: GroupingSummary[];
  canMake: boolean;
  /** Address of the place, without the question mark. */
  base: string;
}

/** Every grouping of the snapshot, newest first. */
export function GroupsApp({ snapshot, items, canMake, base }: GroupsProps) {
  const [open, setOpen] = useState(false);
  const make = canMake ? (
    <Button kind="primary" icon="plus" onClick={() => setOpen(true)}>
      New grouping
    </Button>
  ) : undefined;
  const dialog = canMake && (
    <NewGrouping open={open} onOpenChange={setOpen} snapshotId={snapshot.id} base={base} />
  );
  if (items.length === 0)
    return (
      <>
        <PageHead title="Groups" />
        <div className="card">
          <EmptyState picture="beam" title="No groups yet." actions={make}>
            {canMake
              ? 'A grouping shows where this community holds together and where it could come apart.'
              : 'An analyst can make a grouping; it will appear here.'}
          </EmptyState>
        </div>
        {dialog}
      </>
    );
  return (
    <>
      <PageHead
        title="Groups"
        sub={`${formatCount(snapshot.members, 'member')} on ${formatDate(snapshot.takenOn)}`}
        actions={make}
      />
      <ul className="col" style={{ gap: 10, listStyle: 'none', padding: 0 }}>
        {items.map((item) => (
          <GroupingLine key={item.id} item={item} />
        ))}
      </ul>
      {dialog}
    </>
  );
}

function GroupingLine({ item }: { item: GroupingSummary }) {
  const cut = item.groups.filter((group) => !group.islet);
  const islets = item.groups.length - cut.length;
  return (
    <li className="card p">
      <div className="row sp wrap">
        <h2 className="h3">
          <a href={item.href}>{item.name}</a>
        </h2>
        {item.state === 'queued' && <StatusBadge tone="woad">In the making</StatusBadge>}
        {item.state === 'failed' && <StatusBadge tone="madder">Could not be made</StatusBadge>}
        {item.state === 'ready' && item.modularity !== null && (
          <span className="small mut">Modularity {formatNumber(item.modularity, 2)}</span>
        )}
      </div>
      <p className="small mut">
        {methodWords(item)}. {formatDate(item.createdAt)}
        {item.createdBy && `, by ${item.createdBy}`}
      </p>
      {item.state === 'ready' && (
        <div className="row wrap" style={{ marginTop: 8, gap: '6px 14px' }}>
          {cut.slice(0, 12).map((group) => (
            <span className="row" key={group.index} style={{ gap: 6 }}>
              <Tag letter={group.letter} />
              <span className="small">
                {group.name ?? `Group ${group.letter}`}{' '}
                <span className="mut">{formatNumber(group.size)}</span>
              </span>
            </span>
          ))}
          {cut.length > 12 && <span className="small mut">and {formatNumber(cut.length - 12)} more</span>}
          {islets > 0 && <span className="small mut">{formatCount(islets, 'islet')}</span>}
        </div>
      )}
      {item.state !== 'ready' && (
        <div style={{ marginTop: 8 }}>
          <ButtonLink size="small" href={item.href}>
            {item.state === 'queued' ? 'See how far it is' : 'See why'}
          </ButtonLink>
        </div>
      )}
    </li>
  );
}
