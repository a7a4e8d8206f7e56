import { useEffect, useState } from 'react';
import { sendJson } from '@/lib/api';
import type { JobView } from '../jobs';

const ENDED = new Set<JobView['state']>(['succeeded', 'failed', 'cancelled']);

/**
 * Follows a job by its event stream until it ends. The browser reconnects by itself when the line drops.
 * @param onEnd called once, with the job as it ended
 */
export function useJob(id: string | null, onEnd?: (job: JobView) => void): JobView | null {
  const [job, setJob] = useState<JobView | null>(null);
  useEffect(() => {
    if (!id) return;
    const events = new EventSource(`/api/v1/jobs/${id}/events`);
    events.addEventListener('job', (event) => {
      const next = JSON.parse((event as MessageEvent<string>).data) as JobView;
      setJob(next);
      if (!ENDED.has(next.state)) return;
      events.close();
      onEnd?.(next);
    });
    return () => events.close();
    // A new callback each render must not open a new line.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [id]);
  return job;
}

/** Asks a job to stop; it ends as `cancelled` soon after. */
export const stopJob = (id: string): Promise<JobView> => sendJson<JobView>('DELETE', `/api/v1/jobs/${id}`);
