import { useState } from 'react';
import { Banner, Button, RadioCards, TextArea, TextInput } from '@/components/ui';
import type { CaseDetail, Decision } from '../cases';
import { CHOICES, decisionWords } from './decisions';

const LEAST = 10;

export interface Draft {
  decision: Decision | null;
  reason: string;
  lookAgain: string;
}

/** The form of a case that is not closed. The draft is held by the place, so that a conflict loses nothing. */
export function Decide({
  detail,
  me,
  draft,
  onChange,
  onDecide,
}: {
  detail: CaseDetail;
  me: string;
  draft: Draft;
  onChange: (draft: Draft) => void;
  onDecide: (decision: Decision) => Promise<unknown>;
}) {
  const [pending, setPending] = useState(false);
  const [tried, setTried] = useState(false);
  const { decision, reason } = draft;
  const short = reason.trim().length < LEAST;
  const mine = detail.escalationBy?.id === me;
  return (
    <form
      className="col"
      style={{ gap: 14 }}
      onSubmit={(event) => {
        event.preventDefault();
        setTried(true);
        if (short || !decision || pending) return;
        setPending(true);
        void onDecide(decision).finally(() => {
          setPending(false);
          setTried(false);
        });
      }}
    >
      {detail.escalationBy && (
        <Banner
          tone="info"
          title={`${mine ? 'You propose' : `${detail.escalationBy.name} proposes`} to escalate.`}
        >
          {mine ? 'A second person must agree.' : 'Choose Escalate to agree, or decide otherwise.'}
        </Banner>
      )}
      <RadioCards
        legend="Decision"
        hideLegend
        name="decision"
        options={CHOICES}
        value={decision}
        error={tried && !decision ? 'Choose one of the five.' : undefined}
        onChange={(value) => onChange({ ...draft, decision: value })}
      />
      <TextArea
        label="Reason"
        hint="Kept with the case. A smoothed score alone is no reason."
        value={reason}
        rows={4}
        error={tried && short ? 'Say in a sentence what you looked at and why.' : undefined}
        onChange={(event) => onChange({ ...draft, reason: event.target.value })}
      />
      <TextInput
        label="Look again on"
        optional
        type="date"
        value={draft.lookAgain}
        onChange={(event) => onChange({ ...draft, lookAgain: event.target.value })}
      />
      <Button kind="primary" type="submit" pending={pending}>
        {decision === 'escalate' && !(detail.escalationBy && !mine)
          ? 'Propose to escalate'
          : 'Record decision'}
      </Button>
      <p className="small mut">The member is never notified by Thrum.</p>
    </form>
  );
}

/** A decided case: what was decided and why, and the way back. */
export function Reopen({
  detail,
  onReopen,
}: {
  detail: CaseDetail;
  onReopen: (reason: string) => Promise<unknown>;
}) {
  const [reason, setReason] = useState('');
  const [tried, setTried] = useState(false);
  const short = reason.trim().length < LEAST;
  return (
    <form
      className="col"
      style={{ gap: 12 }}
      onSubmit={(event) => {
        event.preventDefault();
        setTried(true);
        if (!short) void onReopen(reason.trim());
      }}
    >
      <p className="small ink2">
        <b>{decisionWords(detail.decision)}.</b> {detail.reason}
      </p>
      <TextArea
        label="Why it should be reopened"
        value={reason}
        rows={3}
        error={tried && short ? 'Say in a sentence what has changed.' : undefined}
        onChange={(event) => setReason(event.target.value)}
      />
      <Button type="submit">Reopen</Button>
    </form>
  );
}
