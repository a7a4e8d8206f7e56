import { useCallback, useRef, useState } from 'react';
import { Banner, KeyHint, StatusBadge, TextArea, toast } from '@/components/ui';
import { ApiError, getJson, sendJson } from '@/lib/api';
import type { CaseDetail } from '../cases';
import { Assign } from './Assign';
import { Decide, Reopen, type Draft } from './Decide';
import { CHOICES, decisionWords } from './decisions';
import { Evidence, History, Others } from './Evidence';
import { Neighbourhood } from './Neighbourhood';
import { Notes } from './Notes';
import { Trail } from './Trail';
import { useCaseKeys } from './use-case-keys';

export interface CasePlaceProps {
  initial: CaseDetail;
  me: { id: string };
  /** Colleagues who work cases. */
  people: readonly { id: string; name: string }[];
  previous: string | null;
  next: string | null;
  /** The queue, for narrow windows where it stands on a page of its own. */
  queue: string;
}

const EMPTY: Draft = { decision: null, reason: '', lookAgain: '' };

/** One case: the evidence, then the decision. */
export function CasePlace({ initial, me, people, previous, next, queue }: CasePlaceProps) {
  const [detail, setDetail] = useState(initial);
  const [draft, setDraft] = useState<Draft>(EMPTY);
  const [problem, setProblem] = useState<{ detail: string; conflict: boolean } | null>(null);
  const note = useRef<HTMLTextAreaElement>(null);
  const work = detail.abilities.work;
  const act = async (
    method: 'POST' | 'PATCH',
    path: string,
    body: unknown,
    said: (now: CaseDetail) => string,
  ): Promise<boolean> => {
    setProblem(null);
    const url = `/api/v1/cases/${detail.id}`;
    try {
      const now = await sendJson<CaseDetail>(method, `${url}${path}`, body);
      setDetail(now);
      toast(said(now));
      return true;
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      const conflict = error.problem.status === 409;
      // The draft stays; what the other person did is shown beside it.
      if (conflict) await getJson<CaseDetail>(url).then(setDetail, () => undefined);
      setProblem({ detail: error.problem.detail, conflict });
      return false;
    }
  };
  useCaseKeys({
    previous,
    next,
    onChoose: useCallback(
      (index) => setDraft((old) => ({ ...old, decision: CHOICES[index]?.value ?? old.decision })),
      [],
    ),
    onNote: useCallback(() => note.current?.focus(), []),
  });
  const name = detail.member.name ?? detail.member.code ?? 'Member';
  const { version } = detail;
  return (
    <>
      <section className="det" aria-label="Evidence">
        <a className="back small" href={queue}>
          ← All cases
        </a>
        <div className="row sp wrap" style={{ marginBottom: 12 }}>
          <div>
            <h1 className="h2">{name}</h1>
            <p className="small mut">
              {detail.evidence.neighbours} ties · {detail.attribute} · case{' '}
              {String(detail.number).padStart(4, '0')}
            </p>
          </div>
          <div className="row wrap">
            {detail.state === 'watching' && <StatusBadge tone="plain">Watching</StatusBadge>}
            {detail.state === 'closed' && (
              <StatusBadge tone="moss">{decisionWords(detail.decision)}</StatusBadge>
            )}
            <Assign
              detail={detail}
              me={me.id}
              people={people}
              onAssign={(assigneeId, to) => void act('PATCH', '', { version, assigneeId }, () => to)}
            />
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
        <Others detail={detail} />
        <div className="two">
          <Notes
            detail={detail}
            field={note}
            onAdd={(body) => act('POST', '/notes', { body }, () => 'Note added')}
          />
          <Trail events={detail.events} />
        </div>
      </section>
      <aside className="dec" aria-label="Decision">
        <h2 className="h3" style={{ marginBottom: 10 }}>
          Decision
        </h2>
        {problem && (
          <div style={{ marginBottom: 12 }}>
            <Banner
              tone="error"
              title={problem.conflict ? 'Somebody was faster.' : 'Nothing was recorded.'}
              live
            >
              {problem.detail}
              {problem.conflict && draft.reason && ' Your words are kept.'}
            </Banner>
          </div>
        )}
        {!work && (
          <p className="small ink2">
            {detail.decision ? `${decisionWords(detail.decision)}. ${detail.reason ?? ''} ` : ''}
            Your role reads cases; moderators and admins decide them.
          </p>
        )}
        {work && detail.state === 'closed' && (
          <>
            <Reopen
              detail={detail}
              onReopen={(reason) => act('POST', '/reopen', { version, reason }, () => 'Case reopened')}
            />
            {problem?.conflict && draft.reason && (
              <div style={{ marginTop: 14 }}>
                <TextArea label="What you wrote" value={draft.reason} rows={4} readOnly />
              </div>
            )}
          </>
        )}
        {work && detail.state !== 'closed' && (
          <Decide
            detail={detail}
            me={me.id}
            draft={draft}
            onChange={setDraft}
            onDecide={(decision) =>
              act(
                'POST',
                '/decisions',
                {
                  version,
                  decision,
                  reason: draft.reason.trim(),
                  lookAgainOn: draft.lookAgain || null,
                },
                (now) =>
                  now.decision
                    ? `Case recorded: ${decisionWords(now.decision)}`
                    : 'Proposed. A second person must agree.',
              ).then((done) => done && setDraft(EMPTY))
            }
          />
        )}
        <p className="lowr" style={{ marginTop: 16 }}>
          <KeyHint
            hints={[
              { keys: ['j', 'k'], does: 'walk' },
              ...(work
                ? [
                    { keys: ['1\u2060–\u20605'], does: 'decision' },
                    { keys: ['n'], does: 'note' },
                  ]
                : []),
            ]}
          />
        </p>
      </aside>
    </>
  );
}
