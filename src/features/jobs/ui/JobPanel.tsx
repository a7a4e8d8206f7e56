import { useState, type ReactNode } from 'react';
import { ErrorState, LoadingState, toast } from '@/components/ui';
import { ApiError } from '@/lib/api';
import type { JobView } from '../jobs';
import { stopJob, useJob } from './use-job';

export interface JobPanelProps {
  jobId: string;
  /** What is being made, as a sentence: "Taking a reading of Belonging". */
  title: string;
  onDone: (job: JobView) => void;
  /** Called when somebody stopped it. */
  onStopped: () => void;
  /** Next steps when it failed. */
  failedActions?: ReactNode;
  /** May this person stop it? */
  canStop: boolean;
}

/** A job that fills a page: how far it is, a way to stop it, and why it failed when it did. */
export function JobPanel({ jobId, title, onDone, onStopped, failedActions, canStop }: JobPanelProps) {
  const [stopping, setStopping] = useState(false);
  const job = useJob(jobId, (ended) => {
    if (ended.state === 'succeeded') onDone(ended);
    if (ended.state === 'cancelled') onStopped();
  });
  if (job?.state === 'failed')
    return (
      <ErrorState
        title={job.error?.title ?? 'This could not be finished.'}
        detail={job.error?.detail}
        actions={failedActions}
      >
        Nothing was kept of it.
      </ErrorState>
    );
  const stop = async (): Promise<void> => {
    setStopping(true);
    try {
      await stopJob(jobId);
    } catch (cause) {
      setStopping(false);
      toast(cause instanceof ApiError ? cause.problem.detail : 'That did not work.', { tone: 'error' });
    }
  };
  return (
    <LoadingState
      title={title}
      progress={job?.progress}
      onStop={canStop && !stopping ? () => void stop() : undefined}
    >
      <span role="status">{stopping ? 'Stopping' : (job?.step ?? 'Waiting for its turn')}</span>
    </LoadingState>
  );
}
