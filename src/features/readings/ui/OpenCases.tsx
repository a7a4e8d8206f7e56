import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Banner, Button, Dialog } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';
import { formatCount, formatNumber, formatPercent } from '@/lib/format';
import type { ReadingMemberView, ReadingView } from '../readings';
import { THRESHOLD } from '../words';

interface Preview {
  count: number;
  expectedFalse: number;
  alreadyOpen: number;
  leftOut: { tooFewNeighbours: number; noScore: number };
}

const problemOf = (cause: unknown): string =>
  cause instanceof ApiError ? cause.problem.detail : 'That did not work. Please try again.';

/** Says first what opening cases would do, and how many of them are likely to be false flags. */
export function OpenCases({
  reading,
  member,
  onClose,
  casesHref,
}: {
  reading: ReadingView;
  /** Only this member, or everyone past the threshold. */
  member: ReadingMemberView | null;
  onClose: () => void;
  casesHref: string;
}) {
  const [pending, setPending] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const url = `/api/v1/readings/${reading.id}/cases`;
  const body = { threshold: THRESHOLD, ...(member ? { members: [member.id] } : {}) };
  const preview = useQuery({
    queryKey: ['cases-preview', reading.id, member?.id],
    queryFn: () => sendJson<Preview>('POST', url, { ...body, preview: true }),
    staleTime: 0,
  });
  const open = async (): Promise<void> => {
    setPending(true);
    setProblem(null);
    try {
      await sendJson('POST', url, { ...body, preview: false });
      window.location.assign(casesHref);
    } catch (cause) {
      setPending(false);
      setProblem(problemOf(cause));
    }
  };
  const data = preview.data;
  const who = member ? (member.name ?? member.code) : null;
  return (
    <Dialog
      open
      onOpenChange={(next) => !next && onClose()}
      title={who ? `Open a case for ${who}?` : 'Open cases?'}
      actions={
        <>
          <Button kind="quiet" onClick={onClose} disabled={pending}>
            Cancel
          </Button>
          <Button
            kind="primary"
            pending={pending}
            disabled={!data || data.count === 0}
            onClick={() => void open()}
          >
            {data && data.count > 0 ? `Open ${formatCount(data.count, 'case')}` : 'Open cases'}
          </Button>
        </>
      }
    >
      {preview.isPending && <p className="mut">Counting first</p>}
      {preview.error && <Banner tone="error">{problemOf(preview.error)}</Banner>}
      {data && (
        <div className="col ink2" style={{ gap: 8 }} role="status">
          {data.count > 0 ? (
            <p>
              {`${formatCount(data.count, 'member')} ${data.count === 1 ? 'stands' : 'stand'} apart in ${reading.attribute} and ${data.count === 1 ? 'has' : 'have'} no open case. `}
              {!who &&
                `At this threshold about ${formatNumber(Math.max(1, Math.round(data.expectedFalse)))} of all flagged are likely to be false flags.`}
            </p>
          ) : (
            <p>There is nobody left to open a case for.</p>
          )}
          {data.alreadyOpen > 0 && <p>{`${formatCount(data.alreadyOpen, 'member')} already in review.`}</p>}
          {!who && (
            <p className="small mut">
              {`Left out: ${formatNumber(data.leftOut.tooFewNeighbours)} with too few neighbours, ${formatNumber(data.leftOut.noScore)} without a score. Threshold: ${formatPercent(THRESHOLD)} false flags.`}
            </p>
          )}
          <p className="small">A departure is a reason to look, not a finding. A person decides each case.</p>
        </div>
      )}
      {problem && <Banner tone="error">{problem}</Banner>}
    </Dialog>
  );
}
