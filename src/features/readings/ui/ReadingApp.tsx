import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useState } from 'react';
import { Banner, Button, ButtonLink, ErrorState, PageHead } from '@/components/ui';
import { formatDate, formatNumber, formatPercent } from '@/lib/format';
import { JobPanel } from '@/features/jobs/ui';
import type { ReadingMemberView, ReadingView } from '../readings';
import { THRESHOLD } from '../words';
import { HowComputed } from './HowComputed';
import { OpenCases } from './OpenCases';
import { SharedPanel } from './Shared';
import { StandApart } from './StandApart';
import { WarpPanel } from './WarpPanel';

export interface ReadingProps {
  reading: ReadingView;
  takenOn: string;
  canMake: boolean;
  canExport: boolean;
  canOpenCases: boolean;
  /** Addresses of the Readings and Cases places, without the question mark. */
  base: string;
  casesBase: string;
  /** Opens the preview of cases at once. */
  preview: boolean;
}

/** One reading: how far it is while it is being taken, then what it says. */
export function ReadingApp(props: ReadingProps) {
  const [client] = useState(
    () => new QueryClient({ defaultOptions: { queries: { retry: 1, refetchOnWindowFocus: false } } }),
  );
  const { reading } = props;
  const list = `${props.base}?snapshot=${reading.snapshotId}`;
  const title = `${reading.attribute}, ${formatDate(props.takenOn)}`;
  if (reading.state === 'ready')
    return (
      <QueryClientProvider client={client}>
        <Ready {...props} list={list} title={title} />
      </QueryClientProvider>
    );
  const back = <ButtonLink href={list}>Back to Readings</ButtonLink>;
  return (
    <>
      <PageHead title={title} eyebrow={<a href={list}>Readings</a>} />
      <div className="card">
        {reading.job ? (
          <JobPanel
            jobId={reading.job}
            title={`Taking a reading of ${reading.attribute}`}
            canStop={props.canMake}
            onDone={() => window.location.reload()}
            onStopped={() => window.location.assign(list)}
            failedActions={back}
          />
        ) : (
          <ErrorState title="This could not be taken." actions={back} />
        )}
      </div>
    </>
  );
}

function Ready(props: ReadingProps & { list: string; title: string }) {
  const { reading, list, title, canExport, casesBase } = props;
  const canOpen = props.canOpenCases && !reading.sensitive;
  const [cases, setCases] = useState<ReadingMemberView | 'all' | null>(
    props.preview && canOpen ? 'all' : null,
  );
  return (
    <>
      <PageHead
        title={title}
        eyebrow={
          <>
            <a href={list}>Readings</a> / {reading.createdBy ? `Made by ${reading.createdBy}, ` : 'Made on '}
            {formatDate(reading.createdAt)}
          </>
        }
        actions={
          <>
            {canExport && (
              <ButtonLink icon="download" href={`/api/v1/readings/${reading.id}/members.csv`}>
                Export CSV
              </ButtonLink>
            )}
            {canOpen && (
              <Button kind="primary" icon="cases" onClick={() => setCases('all')}>
                Open cases
              </Button>
            )}
          </>
        }
      />
      <Three reading={reading} />
      {reading.sensitive && (
        <Spaced>
          <Banner tone="caution" title={`${reading.attribute} is marked as sensitive.`}>
            No cases can be opened from it.
          </Banner>
        </Spaced>
      )}
      {reading.notes.map((note) => (
        <Spaced key={note}>
          <Banner tone="info">{note}</Banner>
        </Spaced>
      ))}
      {reading.warp ? (
        <div className="rd">
          <WarpPanel warp={reading.warp} />
          <SharedPanel reading={reading} />
        </div>
      ) : (
        <SharedPanel reading={reading} />
      )}
      <StandApart reading={reading} casesBase={casesBase} canOpen={canOpen} onOpen={setCases} />
      <HowComputed reading={reading} />
      {cases && (
        <OpenCases
          reading={reading}
          member={cases === 'all' ? null : cases}
          onClose={() => setCases(null)}
          casesHref={`${casesBase}?snapshot=${reading.snapshotId}`}
        />
      )}
    </>
  );
}

const Spaced = ({ children }: { children: React.ReactNode }) => (
  <div style={{ marginBottom: 12 }}>{children}</div>
);

/** The reading in three numbers, in words. */
function Three({ reading }: { reading: ReadingView }) {
  const { explained, typical, flagged, attribute } = reading;
  const likely = Math.max(1, Math.round(flagged * THRESHOLD));
  const name = attribute.toLowerCase();
  return (
    <div className="three">
      <div>
        <span className="fig">{formatPercent(explained === null ? null : Math.max(0, explained))}</span>
        <p>
          of the differences in {name} are <b>shared across ties</b>
          {explained !== null && explained < 0.1
            ? ': neighbours say little about each other.'
            : ': neighbours resemble each other.'}
        </p>
      </div>
      <div>
        <span className="fig">±{formatNumber(typical, 2)}</span>
        <p>
          is how far a <b>typical member</b> sits from what their neighbourhood predicts.
        </p>
      </div>
      <div>
        <span className="fig">{formatNumber(flagged)}</span>
        <p>
          {flagged === 1 ? 'member ' : 'members '}
          <b>{flagged === 1 ? 'stands apart' : 'stand apart'}</b>.{' '}
          {flagged > 0
            ? `About ${formatNumber(likely)} of them ${likely === 1 ? 'is' : 'are'} likely to be ${likely === 1 ? 'a false flag' : 'false flags'}.`
            : `${formatNumber(reading.tested)} were tested.`}
        </p>
      </div>
    </div>
  );
}
