import { useRef, useState } from 'react';
import { Banner, Button, Card, ProgressBar, Select, TextInput } from '@/components/ui';
import { ApiError } from '@/lib/api';
import { formatNumber } from '@/lib/format';
import { JobPanel } from '@/features/jobs/ui';
import { LIMITS } from '../imports';
import { guessMemberColumns, guessTieColumns } from '../guess';
import { ColumnMatch, type MemberMatch, type TieMatch } from './ColumnMatch';
import { previewOf, type Preview } from './preview';
import { sendFiles } from './send';

export interface NewImportProps {
  readonly communityId: string;
  readonly base: string;
  readonly today: string;
}

interface Chosen {
  readonly file: File;
  readonly preview: Preview;
}
type Files = Partial<Record<'ties' | 'members', Chosen>>;

/** Files, columns, choices, upload: a snapshot in four steps on one page. */
export function NewImport({ communityId, base, today }: NewImportProps) {
  const [files, setFiles] = useState<Files>({});
  const [ties, setTies] = useState<TieMatch>({});
  const [members, setMembers] = useState<MemberMatch>({ attributes: [] });
  const [takenOn, setTakenOn] = useState(today);
  const [label, setLabel] = useState('');
  const [directions, setDirections] = useState<'sum' | 'larger' | 'mutual'>('sum');
  const [repeats, setRepeats] = useState<'sum' | 'count' | 'largest'>('sum');
  const [sending, setSending] = useState<{ share: number; stop: () => void } | null>(null);
  const [job, setJob] = useState<{ id: string; importId: string } | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const picker = useRef<HTMLInputElement>(null);

  const take = async (list: FileList | null): Promise<void> => {
    setProblem(null);
    const next: Files = { ...files };
    for (const file of [...(list ?? [])].slice(0, 2)) {
      if (file.size > LIMITS.fileBytes) {
        setProblem(`${file.name} is larger than 512 MB.`);
        continue;
      }
      const preview = await previewOf(file);
      next[preview.role] = { file, preview };
      if (preview.role === 'ties') setTies(guessTieColumns(preview.headers));
      else setMembers(withDefaults(guessMemberColumns(preview.headers)));
    }
    setFiles(next);
  };
  const swap = (): void =>
    setFiles({
      ...(files.members ? { ties: files.members } : {}),
      ...(files.ties ? { members: files.ties } : {}),
    });

  const send = (): void => {
    setProblem(null);
    const form = new FormData();
    const known = <T extends object>(match: T): Partial<T> =>
      Object.fromEntries(
        Object.entries(match).filter(([, value]) => value !== undefined && value !== ''),
      ) as Partial<T>;
    const readable = files.members && files.members.preview.headers.length > 0;
    form.set(
      'options',
      JSON.stringify({
        accept: 'review',
        takenOn,
        ...(label.trim() ? { label: label.trim() } : {}),
        directions,
        repeats,
        ties: known(ties),
        ...(readable
          ? {
              members: {
                ...known({ id: members.id, name: members.name }),
                attributes: members.attributes
                  .filter((one) => one.use)
                  .map(({ column, name, direction, sensitive }) => ({ column, name, direction, sensitive })),
              },
            }
          : {}),
      }),
    );
    form.set('ties', files.ties!.file);
    if (files.members) form.set('members', files.members.file);
    const upload = sendFiles(`/api/v1/communities/${communityId}/imports`, form, (share) =>
      setSending({ share, stop: upload.stop }),
    );
    setSending({ share: 0, stop: upload.stop });
    upload.done.then(
      (sent) => setJob({ id: sent.job.id, importId: sent.import.id }),
      (error: unknown) => {
        setSending(null);
        setProblem(error instanceof ApiError ? error.problem.detail : 'The upload did not work.');
      },
    );
  };

  if (job)
    return (
      <Card title="Checking rows">
        <JobPanel
          jobId={job.id}
          title="Reading your files"
          canStop
          onDone={() => location.assign(`${base}/imports/${job.importId}`)}
          onStopped={() => location.assign(`${base}/imports/${job.importId}`)}
          failedActions={
            <Button onClick={() => location.assign(`${base}/imports/${job.importId}`)}>See the report</Button>
          }
        />
      </Card>
    );
  return (
    <div className="col" style={{ gap: 18 }}>
      {problem && (
        <Banner tone="error" live>
          {problem}
        </Banner>
      )}
      <div
        className="drop"
        onDragOver={(event) => event.preventDefault()}
        onDrop={(event) => {
          event.preventDefault();
          void take(event.dataTransfer.files);
        }}
      >
        <p className="h4">Drop a ties file and a members file here</p>
        <p className="small mut">
          CSV, TSV, plain or gzip; up to 512 MB each, {formatNumber(LIMITS.tieRows)} ties,{' '}
          {formatNumber(LIMITS.memberRows)} members, {LIMITS.columns} columns.
        </p>
        <Button onClick={() => picker.current?.click()} icon="file">
          Choose files
        </Button>
        <input
          ref={picker}
          type="file"
          multiple
          className="vh"
          aria-label="Files to load"
          tabIndex={-1}
          onChange={(event) => void take(event.target.files)}
        />
      </div>
      {files.ties && <ColumnMatch role="ties" chosen={files.ties} ties={ties} onTies={setTies} />}
      {files.members && (
        <ColumnMatch role="members" chosen={files.members} members={members} onMembers={setMembers} />
      )}
      {files.ties && files.members && (
        <p className="small">
          Taken the wrong way round?{' '}
          <button type="button" className="linkish" onClick={swap}>
            Swap the two files
          </button>
        </p>
      )}
      {files.ties && (
        <Card title="How ties add up">
          <div className="row wrap" style={{ gap: 16, alignItems: 'flex-end' }}>
            <TextInput
              label="Taken on"
              type="date"
              value={takenOn}
              required
              onChange={(event) => setTakenOn(event.target.value)}
            />
            <TextInput
              label="Label"
              optional
              value={label}
              maxLength={120}
              onChange={(event) => setLabel(event.target.value)}
            />
            <Select
              label="Two directions become one"
              value={directions}
              onChange={setDirections}
              options={[
                { id: 'sum', label: 'Added up' },
                { id: 'larger', label: 'The larger' },
                { id: 'mutual', label: 'Only mutual ties' },
              ]}
            />
            <Select
              label="Repeats"
              value={repeats}
              onChange={setRepeats}
              options={[
                { id: 'sum', label: 'Added up' },
                { id: 'count', label: 'Counted' },
                { id: 'largest', label: 'The largest' },
              ]}
            />
          </div>
        </Card>
      )}
      {sending ? (
        <ProgressBar label="Sending files" value={sending.share} onStop={sending.stop} />
      ) : (
        <div className="row">
          <Button kind="primary" disabled={!files.ties || !takenOn} onClick={send} iconEnd="arrow-right">
            Check all rows
          </Button>
          <span className="small mut">
            Nothing is saved until you load. Problem rows are held back, never dropped in silence.
          </span>
        </div>
      )}
    </div>
  );
}

const withDefaults = (guess: ReturnType<typeof guessMemberColumns>): MemberMatch => ({
  id: guess.id,
  name: guess.name,
  attributes: guess.attributes.map((one) => ({
    ...one,
    use: true,
    direction: 'neither' as const,
    sensitive: false,
  })),
});
