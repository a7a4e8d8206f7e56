import { useState } from 'react';
import { LineChart, StripPlot } from '@/components/charts';
import { Banner, Button, RadioCards, StatusBadge, TextArea, TextInput, toast } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';
import { formatChance, formatDate, formatDeparture, formatNumber } from '@/lib/format';
import type { CaseDetail, Decision } from '../cases';
import { Neighbourhood } from './Neighbourhood';
import { Trail } from './Trail';

const CHOICES: readonly { value: Decision; label: string; hint: string }[] = [
  { value: 'no-concern', label: 'No concern', hint: 'Close. Nothing follows from it.' },
  { value: 'keep-watching', label: 'Keep watching', hint: 'Return after the next snapshot.' },
  { value: 'reach-out', label: 'Reach out', hint: 'A private, friendly message first.' },
  { value: 'escalate', label: 'Escalate', hint: 'A second person must agree.' },
  { value: 'data-error', label: 'Data error', hint: 'The score itself is wrong.' },
];
const DECISION_WORDS: Record<Decision, string> = Object.fromEntries(
  CHOICES.map((one) => [one.value, one.label]),
) as Record<Decision, string>;

/** One case: the evidence, then the decision. */
export function CasePlace({ initial, me }: { initial: CaseDetail; me: { id: string } }) {
  const [detail, setDetail] = useState(initial);
  const [problem, setProblem] = useState<string | null>(null);
  const act = async (
    method: 'POST' | 'PATCH',
    path: string,
    body: unknown,
    said: string,
  ): Promise<boolean> => {
    setProblem(null);
    try {
      setDetail(await sendJson<CaseDetail>(method, `/api/v1/cases/${detail.id}${path}`, body));
      toast(said);
      return true;
    } catch (error) {
      setProblem(
        error instanceof ApiError ? error.problem.detail : 'That did not work. Nothing was recorded.',
      );
      return false;
    }
  };
  const name = detail.member.name ?? detail.member.code ?? 'Member';
  return (
    <>
      <section className="det" aria-label="Evidence">
        <div className="row sp wrap">
          <div>
            <h1 className="h2">{name}</h1>
            <p className="small mut">
              {detail.evidence.neighbours} ties · case {String(detail.number).padStart(4, '0')} ·{' '}
              {detail.attribute}
            </p>
          </div>
          <div className="row">
            {detail.decision && <StatusBadge tone="moss">{DECISION_WORDS[detail.decision]}</StatusBadge>}
            {detail.abilities.work && detail.assignee?.id !== me.id && (
              <Button
                size="small"
                onClick={() =>
                  void act('PATCH', '', { version: detail.version, assigneeId: me.id }, 'Assigned to you')
                }
              >
                Assign to me
              </Button>
            )}
          </div>
        </div>
        <Banner tone="caution" title="A departure is a reason to look, not a finding.">
          Read recent posts and ask who rated them before deciding.
        </Banner>
        <Evidence detail={detail} name={name} />
        <div className="two">
          <Neighbourhood detail={detail} name={name} />
          <History detail={detail} />
        </div>
        <div className="two">
          <Notes detail={detail} onAdd={(body) => act('POST', '/notes', { body }, 'Note added')} />
          <Trail events={detail.events} />
        </div>
      </section>
      <aside className="dec" aria-label="Decision">
        <h2 className="h3">Decision</h2>
        {problem && (
          <Banner tone="error" live>
            {problem}
          </Banner>
        )}
        {!detail.abilities.work && (
          <p className="small ink2">Your role reads cases; moderators and admins decide them.</p>
        )}
        {detail.abilities.work && detail.state === 'closed' && (
          <Reopen
            onReopen={(reason) =>
              act('POST', '/reopen', { version: detail.version, reason }, 'Case reopened')
            }
            detail={detail}
          />
        )}
        {detail.abilities.work && detail.state !== 'closed' && (
          <Decide
            detail={detail}
            me={me.id}
            onDecide={(decision, reason, lookAgainOn) =>
              act(
                'POST',
                '/decisions',
                { version: detail.version, decision, reason, lookAgainOn: lookAgainOn || null },
                `Case recorded: ${DECISION_WORDS[decision]}`,
              )
            }
          />
        )}
      </aside>
    </>
  );
}

function Evidence({ detail, name }: { detail: CaseDetail; name: string }) {
  const { value, predicted, departure, q } = detail.evidence;
  const around = detail.neighbourhood.items.flatMap((one) =>
    one.value === null ? [] : [{ label: one.name ?? one.code ?? '', value: one.value }],
  );
  if (value === null || predicted === null || departure === null) return null;
  const half = detail.neighbourhood.sigma === null ? 0 : 1.96 * detail.neighbourhood.sigma;
  const all = [value, predicted - half, predicted + half, ...around.map((one) => one.value)];
  const pad = (Math.max(...all) - Math.min(...all)) * 0.06 || 1;
  return (
    <div style={{ marginTop: 16 }}>
      <div className="row sp wrap">
        <h2 className="h4">{detail.attribute} against neighbours</h2>
        <span className="small">
          Chance of a false flag <b>{formatChance(q)}</b>
        </span>
      </div>
      <StripPlot
        name={name}
        value={value}
        predicted={predicted}
        neighbours={around}
        interval={[predicted - half, predicted + half]}
        intervalLabel="where 95% of such members fall"
        domain={[Math.min(...all) - pad, Math.max(...all) + pad]}
        withTable
      />
      <p className="small ink2">
        Scores {formatNumber(value, 2)}: <b>{formatDeparture(departure)}</b> against what the neighbourhood
        predicts without this score. Local Moran as a second opinion:{' '}
        {detail.evidence.localMoran.quadrant ?? 'not defined'}
        {detail.evidence.localMoran.q === null ? '' : `, q ${formatNumber(detail.evidence.localMoran.q, 2)}`}.
      </p>
    </div>
  );
}

function History({ detail }: { detail: CaseDetail }) {
  const known = detail.history.filter((one) => one.value !== null);
  return (
    <div>
      <h2 className="h4">Over snapshots</h2>
      <p className="small mut">Score and what neighbours predict</p>
      {known.length < 2 ? (
        <p className="small ink2">Only one snapshot has a score.</p>
      ) : (
        <LineChart
          label={`${detail.attribute} over snapshots`}
          points={detail.history.map(({ takenOn, value, predicted, half }) => ({
            label: formatDate(takenOn, 'short'),
            value,
            predicted,
            low: predicted === null || half === null ? null : predicted - half,
            high: predicted === null || half === null ? null : predicted + half,
          }))}
          withTable
        />
      )}
    </div>
  );
}

function Notes({ detail, onAdd }: { detail: CaseDetail; onAdd: (body: string) => Promise<boolean> }) {
  const [text, setText] = useState('');
  const notes = detail.events.filter((event) => event.kind === 'note');
  return (
    <div>
      <h2 className="h4">Notes</h2>
      {notes.map((note) => (
        <p key={note.id} className="small" style={{ marginTop: 8 }}>
          <b>{note.actor?.name}</b> <span className="mut">{formatDate(note.createdAt, 'time')}</span>
          <br />
          {String(note.body.text)}
        </p>
      ))}
      {notes.length === 0 && <p className="small mut">No notes yet.</p>}
      {detail.abilities.work && (
        <form
          className="col"
          style={{ gap: 8, marginTop: 10 }}
          onSubmit={(event) => {
            event.preventDefault();
            if (text.trim()) void onAdd(text.trim()).then((done) => done && setText(''));
          }}
        >
          <TextArea
            label="Add a note"
            value={text}
            rows={2}
            onChange={(event) => setText(event.target.value)}
          />
          <div>
            <Button size="small" type="submit">
              Add note
            </Button>
          </div>
        </form>
      )}
    </div>
  );
}

function Decide({
  detail,
  me,
  onDecide,
}: {
  detail: CaseDetail;
  me: string;
  onDecide: (decision: Decision, reason: string, lookAgainOn: string) => Promise<boolean>;
}) {
  const [decision, setDecision] = useState<Decision>('keep-watching');
  const [reason, setReason] = useState('');
  const [lookAgain, setLookAgain] = useState('');
  const [pending, setPending] = useState(false);
  const [tried, setTried] = useState(false);
  const short = reason.trim().length < 10;
  return (
    <form
      className="col"
      style={{ gap: 14 }}
      onSubmit={(event) => {
        event.preventDefault();
        setTried(true);
        if (short || pending) return;
        setPending(true);
        void onDecide(decision, reason.trim(), lookAgain).finally(() => setPending(false));
      }}
    >
      {detail.escalationBy && (
        <Banner tone="info">
          {detail.escalationBy.name} proposes to escalate.{' '}
          {detail.escalationBy.id === me ? 'A second person must agree.' : 'Choose Escalate to agree.'}
        </Banner>
      )}
      <RadioCards
        legend="Decision"
        name="decision"
        options={CHOICES.map((one) => ({ ...one }))}
        value={decision}
        onChange={(value) => setDecision(value as Decision)}
      />
      <TextArea
        label="Reason"
        hint="Kept with the case. A smoothed score alone is no reason."
        value={reason}
        rows={4}
        error={tried && short ? 'Say in a sentence what you looked at and why.' : undefined}
        onChange={(event) => setReason(event.target.value)}
      />
      <TextInput
        label="Look again on"
        optional
        type="date"
        value={lookAgain}
        onChange={(event) => setLookAgain(event.target.value)}
      />
      <Button kind="primary" type="submit" pending={pending}>
        Record decision
      </Button>
      <p className="small mut">The member is never notified by Thrum.</p>
    </form>
  );
}

function Reopen({
  detail,
  onReopen,
}: {
  detail: CaseDetail;
  onReopen: (reason: string) => Promise<boolean>;
}) {
  const [reason, setReason] = useState('');
  return (
    <form
      className="col"
      style={{ gap: 12 }}
      onSubmit={(event) => {
        event.preventDefault();
        void onReopen(reason.trim());
      }}
    >
      <p className="small ink2">
        Decided: <b>{detail.decision ? DECISION_WORDS[detail.decision] : ''}</b>. {detail.reason}
      </p>
      <TextArea
        label="Why it should be reopened"
        value={reason}
        rows={3}
        onChange={(event) => setReason(event.target.value)}
      />
      <Button type="submit" disabled={reason.trim().length < 10}>
        Reopen
      </Button>
    </form>
  );
}
