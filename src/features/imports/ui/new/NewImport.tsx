import { useDeferredValue, useMemo, useState } from 'react';
import { Banner, Button, Card, ProgressBar, Stepper } from '@/components/ui';
import { JobPanel } from '@/features/jobs/ui';
import { ApiError } from '@/lib/api';
import type { ImportLimits, ImportOptions } from '../../imports';
import { sendFiles, type Sending } from '../send';
import { ChoicesCard } from './ChoicesCard';
import {
  addFiles,
  emptyDraft,
  fileOf,
  profilesFor,
  removeFile,
  setRole,
  setSettings,
  tableOf,
  useRecipe as withRecipe,
} from './draft';
import { FieldSelect, FieldTable } from './FieldTable';
import { FileDrop } from './FileDrop';
import { FileList } from './FileList';
import { loadFile, type LoadedFile } from './load-file';
import type { MappingField, TieField } from './match';
import { MemberFields } from './MemberFields';
import { Outcome } from './Outcome';
import { PreviewTable } from './PreviewTable';
import { RecipeBar, type Recipes } from './RecipeBar';
import { toOptions } from './to-options';
import { trySample } from './try-sample';

export interface NewImportProps {
  readonly communityId: string;
  readonly base: string;
  readonly today: string;
  readonly limits: ImportLimits;
  readonly recipes: Recipes;
  /** There is a snapshot that changes could be added to. */
  readonly canAdd: boolean;
}

const TIES: readonly (readonly [TieField, string])[] = [
  ['source', 'From'],
  ['target', 'To'],
  ['weight', 'Weight'],
  ['kind', 'Kind'],
  ['time', 'Date'],
];
const MAPPING: readonly (readonly [MappingField, string])[] = [
  ['old', 'Id before'],
  ['new', 'Id now'],
];
const STEPS = [{ label: 'Files' }, { label: 'Match columns' }, { label: 'Check rows' }, { label: 'Load' }];

/** Files, columns, choices, upload: a snapshot in four steps. */
export function NewImport(props: NewImportProps) {
  const { communityId, base, limits, canAdd } = props;
  const [recipes, setRecipes] = useState(props.recipes);
  const [recipe, setRecipe] = useState(recipes.latest ? 'latest' : 'none');
  const [draft, setDraft] = useState(() => emptyDraft(props.today, recipes.latest?.options ?? null));
  const [sending, setSending] = useState<(Sending & { stop: () => void }) | null>(null);
  const [job, setJob] = useState<{ id: string; importId: string } | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const settled = useDeferredValue(draft);
  const tried = useMemo(() => trySample(settled, limits), [settled, limits]);
  const problems = tried && typeof tried !== 'string' ? tried.problems : null;

  const take = async (list: File[]): Promise<void> => {
    setProblem(null);
    const loaded: LoadedFile[] = [];
    for (const file of list) loaded.push(await loadFile(file, limits));
    setDraft((before) => addFiles(before, loaded));
  };
  const choose = (id: string, options: ImportOptions | null): void => {
    setRecipe(id);
    setDraft((before) => withRecipe(before, options));
  };
  const send = (): void => {
    setProblem(null);
    const file = (side: 'ties' | 'members' | 'mapping'): File | undefined => {
      const found = fileOf(draft, side);
      return side === 'members' && found?.role === 'graph' ? undefined : found?.file;
    };
    const upload = sendFiles(
      communityId,
      { ties: file('ties')!, members: file('members'), mapping: file('mapping') },
      toOptions(draft),
      (state) => setSending({ ...state, stop: upload.stop }),
    );
    setSending({ share: 0, words: 'Sending files', stop: upload.stop });
    upload.done.then(
      (sent) => setJob({ id: sent.job.id, importId: sent.import.id }),
      (error: unknown) => {
        setSending(null);
        setProblem(error instanceof ApiError ? error.problem.detail : 'The upload did not work.');
      },
    );
  };

  const step = job ? 2 : draft.files.length > 0 ? 1 : 0;
  const stepper = <Stepper label="Steps of this import" steps={STEPS} current={step} />;
  if (job) {
    const report = (): void => location.assign(`${base}/imports/${job.importId}`);
    return (
      <>
        {stepper}
        <Card title="Checking rows">
          <JobPanel
            jobId={job.id}
            title="Reading your files"
            canStop
            onDone={report}
            onStopped={report}
            failedActions={<Button onClick={report}>See the report</Button>}
          />
          <p className="small mut">You can leave this page; it goes on, and stands under Imports.</p>
        </Card>
      </>
    );
  }
  const ties = fileOf(draft, 'ties');
  const members = fileOf(draft, 'members');
  const mapping = fileOf(draft, 'mapping');
  const columns = profilesFor(draft, 'members').map((one) => one.column);
  const ready =
    !!ties?.sample &&
    !!draft.ties.source &&
    !!draft.ties.target &&
    !!draft.choices.takenOn &&
    typeof tried !== 'string';
  return (
    <>
      {stepper}
      <div className="im">
        <div className="col" style={{ gap: 14, minWidth: 0 }}>
          {problem && (
            <Banner tone="error" live>
              {problem}
            </Banner>
          )}
          <FileDrop limits={limits} small={draft.files.length > 0} onFiles={(list) => void take(list)} />
          {draft.files.length > 0 && (
            <FileList
              files={draft.files}
              onRole={(key, role) => setDraft(setRole(draft, key, role))}
              onSettings={(key, settings) => setDraft(setSettings(draft, key, settings, limits))}
              onRemove={(key) => setDraft(removeFile(draft, key))}
            />
          )}
          {draft.files.length > 0 && (
            <RecipeBar
              communityId={communityId}
              recipes={recipes}
              chosen={recipe}
              options={() => toOptions(draft)}
              onChoose={choose}
              onRecipes={setRecipes}
            />
          )}
          {ties?.sample && (
            <>
              <FieldTable
                title="Ties"
                aside={ties.file.name}
                profiles={profilesFor(draft, 'ties')}
                why={(column) => draft.whys.ties[column]}
                becomes={({ column }) => (
                  <FieldSelect
                    column={column}
                    fields={TIES}
                    match={draft.ties}
                    onChange={(match) => setDraft({ ...draft, ties: match })}
                  />
                )}
              />
              <PreviewTable
                title="First rows of ties"
                side="ties"
                table={tableOf(draft, 'ties')!}
                problems={problems}
              />
            </>
          )}
          {members?.sample && (
            <>
              <FieldTable
                title="Members"
                aside={members.file.name}
                profiles={profilesFor(draft, 'members')}
                why={(column) => draft.whys.members[column]}
                becomes={({ column }) => (
                  <MemberFields
                    column={column}
                    columns={columns}
                    match={draft.members}
                    onChange={(match) => setDraft({ ...draft, members: match })}
                  />
                )}
              />
              <PreviewTable
                title="First rows of members"
                side="members"
                table={tableOf(draft, 'members')!}
                problems={problems}
              />
            </>
          )}
          {mapping?.sample && (
            <FieldTable
              title="Changed ids"
              aside={mapping.file.name}
              profiles={profilesFor(draft, 'mapping')}
              why={(column) => draft.whys.mapping[column]}
              becomes={({ column }) => (
                <FieldSelect
                  column={column}
                  fields={MAPPING}
                  match={draft.mapping}
                  onChange={(match) => setDraft({ ...draft, mapping: match })}
                />
              )}
            />
          )}
          {ties?.sample && (
            <ChoicesCard
              choices={draft.choices}
              canAdd={canAdd}
              onChange={(choices) => setDraft({ ...draft, choices })}
            />
          )}
        </div>
        <aside className="col" style={{ gap: 16 }} aria-label="What becomes of the rows">
          {draft.files.length > 0 && <Outcome tried={tried} />}
          {sending ? (
            <ProgressBar label={sending.words} value={sending.share} onStop={sending.stop} />
          ) : (
            draft.files.length > 0 && (
              <Button kind="primary" disabled={!ready} onClick={send} iconEnd="arrow-right">
                Check all rows
              </Button>
            )
          )}
          <p className="note woad small">
            Nothing is saved until you load. Problem rows are held back, never dropped in silence.
          </p>
        </aside>
      </div>
    </>
  );
}
