import { useState } from 'react';
import { Banner, Button, ButtonLink, ErrorState, PageHead, SegmentedControl } from '@/components/ui';
import { formatDate } from '@/lib/format';
import { JobPanel } from '@/features/jobs/ui';
import type { Group, GroupingView } from '../groupings';
import { BoundaryMembers, TiesBetween, loosestSeam } from './Between';
import { GroupCards, GroupTable } from './GroupCards';
import { HowMade, HowMany } from './HowMade';
import { NamesDialog } from './NamesDialog';
import { NewGrouping } from './NewGrouping';
import { groupTitle } from './words';

export interface GroupingProps {
  view: GroupingView;
  takenOn: string;
  canMake: boolean;
  canExport: boolean;
  /** Addresses of the Groups and Members places, without the question mark. */
  base: string;
  membersHref: string;
}

/** One grouping: how far it is while it is being made, then its groups. */
export function GroupingApp(props: GroupingProps) {
  const { view, base } = props;
  const list = `${base}?snapshot=${view.snapshotId}`;
  if (view.state === 'ready') return <Ready {...props} list={list} />;
  return (
    <>
      <PageHead title={view.name} eyebrow={<a href={list}>Groups</a>} />
      <div className="card">
        {view.job ? (
          <JobPanel
            jobId={view.job}
            title="Finding the groups"
            canStop={props.canMake}
            onDone={() => window.location.reload()}
            onStopped={() => window.location.assign(list)}
            failedActions={<ButtonLink href={list}>Back to Groups</ButtonLink>}
          />
        ) : (
          <ErrorState
            title="This could not be made."
            actions={<ButtonLink href={list}>Back to Groups</ButtonLink>}
          />
        )}
      </div>
    </>
  );
}

function Ready({
  view: initial,
  takenOn,
  canMake,
  canExport,
  base,
  membersHref,
  list,
}: GroupingProps & { list: string }) {
  const [view, setView] = useState(initial);
  const [look, setLook] = useState<'cards' | 'table'>('cards');
  const [dialog, setDialog] = useState<'new' | 'names' | null>(null);
  const [split, setSplit] = useState<Group | null>(null);
  const seam = loosestSeam(view);
  const loosest = seam && seam[0];
  const maker = view.createdBy ? `, by ${view.createdBy}` : '';
  const islets = view.groups.filter((group) => group.islet).length;
  return (
    <>
      <PageHead
        title={view.name}
        eyebrow={
          <>
            <a href={list}>Groups</a> / Snapshot {formatDate(takenOn)}, made on {formatDate(view.createdAt)}
            {maker}
          </>
        }
        actions={
          <>
            <SegmentedControl
              label="Show groups as"
              options={[
                { value: 'cards', label: 'Cards' },
                { value: 'table', label: 'Table' },
              ]}
              value={look}
              onChange={setLook}
            />
            {canMake && <Button onClick={() => setDialog('names')}>Names</Button>}
            {canExport && (
              <ButtonLink icon="download" href={`/api/v1/groupings/${view.id}/members.csv`}>
                Export
              </ButtonLink>
            )}
            {canMake && (
              <Button kind="primary" icon="plus" onClick={() => setDialog('new')}>
                New grouping
              </Button>
            )}
          </>
        }
      />
      {view.notes.map((note) => (
        <div key={note} style={{ marginBottom: 10 }}>
          <Banner tone="caution">{note}</Banner>
        </div>
      ))}
      <div className="gr">
        <div>
          {look === 'cards' ? (
            <GroupCards
              groups={view.groups.slice(0, 24)}
              loosest={loosest}
              onSplit={canMake ? setSplit : undefined}
            />
          ) : (
            <GroupTable groups={view.groups} />
          )}
          <p className="small mut" style={{ marginTop: 8 }}>
            {view.groups.length > 24 && look === 'cards' && 'The 24 largest are shown; the table has all. '}
            {islets > 0 && 'Islets are not tied to the rest; they were not cut off. '}
            Profiles show each group against the community mean, in standard deviations: blue sits lower,
            madder sits higher.
          </p>
          <HowMany view={view} />
          <HowMade view={view} />
        </div>
        <div className="col" style={{ gap: 14 }}>
          <TiesBetween view={view} />
          <BoundaryMembers view={view} all={membersHref} />
        </div>
      </div>
      {canMake && (
        <>
          <NewGrouping
            open={dialog === 'new'}
            onOpenChange={(open) => setDialog(open ? 'new' : null)}
            snapshotId={view.snapshotId}
            base={base}
          />
          {split && (
            <NewGrouping
              key={split.index}
              open
              onOpenChange={(open) => !open && setSplit(null)}
              snapshotId={view.snapshotId}
              base={base}
              within={{ grouping: view.id, group: split.index, title: groupTitle(split) }}
            />
          )}
          {dialog === 'names' && (
            <NamesDialog
              view={view}
              open
              onOpenChange={(open) => setDialog(open ? 'names' : null)}
              onSaved={setView}
            />
          )}
        </>
      )}
    </>
  );
}
