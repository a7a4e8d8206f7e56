import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { DivergingBar } from '@/components/charts';
import {
  Button,
  EmptyState,
  ErrorState,
  Select,
  SkeletonTable,
  StatusBadge,
  Tag,
  type Tone,
} from '@/components/ui';
import { ApiError, getJson } from '@/lib/api';
import { formatChance, formatDeparture, formatNumber } from '@/lib/format';
import type { ReadingMemberView, ReadingView } from '../readings';
import { THRESHOLD } from '../words';

interface Page {
  items: ReadingMemberView[];
  nextCursor: string | null;
}

const ORDERS = [
  { id: 'departure', label: 'Largest first' },
  { id: 'q', label: 'Surest first' },
] as const;
type Order = (typeof ORDERS)[number]['id'];
const PAGE = 25;

const DECISIONS: Record<string, [string, Tone]> = {
  'no-concern': ['No concern', 'moss'],
  'keep-watching': ['Keep watching', 'weld'],
  'reach-out': ['Reach out', 'woad'],
  escalate: ['Escalated', 'madder'],
  'data-error': ['Data error', 'plain'],
};

/** Members past the threshold. A flag is a reason to look, never a finding, and the table says so. */
export function StandApart({
  reading,
  casesBase,
  canOpen,
  onOpen,
}: {
  reading: ReadingView;
  /** Address of the Cases place, without the question mark. */
  casesBase: string;
  canOpen: boolean;
  onOpen: (member: ReadingMemberView) => void;
}) {
  const [order, setOrder] = useState<Order>('departure');
  const [shown, setShown] = useState(PAGE);
  const { data, error, refetch, isPending } = useQuery({
    queryKey: ['reading', reading.id, order, shown],
    queryFn: ({ signal }) =>
      getJson<Page>(
        `/api/v1/readings/${reading.id}/members?sort=${order}&maximumQ=${THRESHOLD}&limit=${shown}`,
        signal,
      ),
    placeholderData: (before) => before,
  });
  return (
    <section className="card" style={{ marginTop: 16, overflow: 'hidden' }} aria-labelledby="apart-title">
      <div className="row sp wrap" style={{ padding: '11px 16px 10px' }}>
        <h2 className="h3" id="apart-title">
          Members who stand apart <span className="mut">{formatNumber(reading.flagged)}</span>
        </h2>
        <div className="row wrap">
          <span className="small mut">A departure is a reason to look, not a finding.</span>
          <Select
            label="Show"
            labelPlace="inside"
            size="small"
            options={ORDERS}
            value={order}
            onChange={setOrder}
          />
        </div>
      </div>
      {error ? (
        <ErrorState
          level={3}
          title="The members could not be read."
          detail={error instanceof ApiError ? error.problem.detail : undefined}
          actions={<Button onClick={() => void refetch()}>Try again</Button>}
        />
      ) : isPending ? (
        <SkeletonTable rows={6} label="Reading the members" />
      ) : data.items.length === 0 ? (
        <EmptyState level={3} picture="settled" title="Nobody stands apart.">
          At this threshold every tested score fits its neighbourhood.
        </EmptyState>
      ) : (
        <Rows items={data.items} casesBase={casesBase} canOpen={canOpen} onOpen={onOpen} />
      )}
      {data?.nextCursor && (
        <div style={{ padding: '10px 16px' }}>
          <Button size="small" onClick={() => setShown(shown + 4 * PAGE)}>
            Show more
          </Button>
        </div>
      )}
    </section>
  );
}

function Rows({
  items,
  casesBase,
  canOpen,
  onOpen,
}: {
  items: readonly ReadingMemberView[];
  casesBase: string;
  canOpen: boolean;
  onOpen: (member: ReadingMemberView) => void;
}) {
  const most = Math.max(...items.map((one) => Math.abs(one.departure ?? 0)));
  return (
    <div className="tscroll" tabIndex={0} role="region" aria-label="Members who stand apart">
      <table className="tbl">
        <thead>
          <tr>
            <th scope="col">Member</th>
            <th scope="col">Group</th>
            <th scope="col" className="r">
              Score
            </th>
            <th scope="col" className="r">
              Predicted
            </th>
            <th scope="col">Departure from neighbourhood</th>
            <th scope="col" className="r">
              Chance of a false flag
            </th>
            <th scope="col">Case</th>
          </tr>
        </thead>
        <tbody>
          {items.map((one) => {
            const predicted = one.value === null || one.departure === null ? null : one.value - one.departure;
            return (
              <tr key={one.id}>
                <th scope="row">{one.name ?? one.code}</th>
                <td>
                  {one.group ? (
                    <span className="row">
                      <Tag letter={one.group.letter} name={one.group.name ?? undefined} />
                      {one.group.name}
                    </span>
                  ) : (
                    '–'
                  )}
                </td>
                <td className="r b">{formatNumber(one.value, 2)}</td>
                <td className="r">{formatNumber(predicted, 2)}</td>
                <td>
                  <span className="row">
                    <DivergingBar value={one.departure} most={most} width={120} />
                    <b>{formatDeparture(one.departure)}</b>
                  </span>
                </td>
                <td className="r">{formatChance(one.q)}</td>
                <td>
                  <CaseCell member={one} casesBase={casesBase} canOpen={canOpen} onOpen={onOpen} />
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

function CaseCell({
  member,
  casesBase,
  canOpen,
  onOpen,
}: {
  member: ReadingMemberView;
  casesBase: string;
  canOpen: boolean;
  onOpen: (member: ReadingMemberView) => void;
}) {
  const found = member.case;
  if (!found)
    return canOpen ? (
      <Button kind="quiet" size="small" onClick={() => onOpen(member)}>
        Open case
      </Button>
    ) : (
      <span className="mut">–</span>
    );
  const [words, tone] = DECISIONS[found.decision ?? ''] ?? ['In review', 'plain'];
  return (
    <a href={`${casesBase}/${found.id}`}>
      <StatusBadge tone={tone}>{words}</StatusBadge>
    </a>
  );
}
