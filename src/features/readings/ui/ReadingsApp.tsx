import { useState } from 'react';
import { Bar } from '@/components/charts';
import { Button, EmptyState, PageHead, StatusBadge } from '@/components/ui';
import { formatDate, formatNumber, formatPercent } from '@/lib/format';
import type { ReadingFilter } from '../filter';
import type { ReadingLine } from '../readings';
import { filterWords } from '../words';
import { TakeReading, type Choice } from './TakeReading';

export interface ReadingsProps {
  snapshot: { id: string; takenOn: string };
  items: ReadingLine[];
  /** Numeric attributes of the snapshot. */
  attributes: Choice[];
  canMake: boolean;
  /** Address of the Readings place, without the question mark. */
  base: string;
}

/** Every reading of the snapshot, newest first. */
export function ReadingsApp({ snapshot, items, attributes, canMake, base }: ReadingsProps) {
  const [open, setOpen] = useState(false);
  const make =
    canMake && attributes.length > 0 ? (
      <Button kind="primary" icon="plus" onClick={() => setOpen(true)}>
        Take a reading
      </Button>
    ) : undefined;
  const why =
    attributes.length === 0
      ? 'This snapshot has no attribute with numbers. Load a members file with one to take a reading.'
      : canMake
        ? 'A reading tells what is shared along ties from what is one member’s own.'
        : 'An analyst can take a reading; it will appear here.';
  return (
    <>
      <PageHead
        title="Readings"
        sub={`Snapshot ${formatDate(snapshot.takenOn)}`}
        actions={items.length > 0 ? make : undefined}
      />
      {items.length === 0 ? (
        <div className="card">
          <EmptyState picture="beam" title="No readings yet." actions={make}>
            {why}
          </EmptyState>
        </div>
      ) : (
        <div className="card tscroll" tabIndex={0} role="region" aria-label="Readings">
          <table className="tbl">
            <thead>
              <tr>
                <th scope="col">Attribute</th>
                <th scope="col">Shared along ties</th>
                <th scope="col" className="r">
                  Moran’s I
                </th>
                <th scope="col" className="r">
                  Stand apart
                </th>
                <th scope="col">Smoother</th>
                <th scope="col">Taken</th>
              </tr>
            </thead>
            <tbody>
              {items.map((item) => (
                <Line key={item.id} item={item} />
              ))}
            </tbody>
          </table>
        </div>
      )}
      {make && (
        <TakeReading
          open={open}
          onOpenChange={setOpen}
          snapshotId={snapshot.id}
          attributes={attributes}
          base={base}
        />
      )}
    </>
  );
}

function Line({ item }: { item: ReadingLine }) {
  const ready = item.state === 'ready';
  const shared = item.explained === null ? null : Math.max(0, item.explained);
  return (
    <tr>
      <th scope="row">
        <a href={item.href}>{item.attribute}</a>
      </th>
      <td>
        {ready ? (
          <span className="ib" style={{ minWidth: 130 }}>
            <b className="r">{formatPercent(shared)}</b>
            <Bar share={shared ?? 0} />
          </span>
        ) : (
          <StatusBadge tone={item.state === 'queued' ? 'woad' : 'madder'}>
            {item.state === 'queued' ? 'In the making' : 'Could not be taken'}
          </StatusBadge>
        )}
      </td>
      <td className="r">{formatNumber(item.moran, 2)}</td>
      <td className="r">{ready ? formatNumber(item.flagged) : '–'}</td>
      <td className="ink2">{filterWords(item.filter as unknown as ReadingFilter)}</td>
      <td className="mut">
        {formatDate(item.createdAt)}
        {item.createdBy && `, ${item.createdBy}`}
      </td>
    </tr>
  );
}
