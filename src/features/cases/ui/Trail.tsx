import { formatDate } from '@/lib/format';
import type { CaseEventView } from '../cases';

/** One line of the log, in words. */
function words(event: CaseEventView): string {
  const { body } = event;
  switch (event.kind) {
    case 'opened':
      return 'opened the case from a reading';
    case 'assigned':
      return body.assigneeName ? `assigned it to ${String(body.assigneeName)}` : 'took the assignment back';
    case 'changed':
      return 'changed priority or date';
    case 'note':
      return 'added a note';
    case 'escalation-proposed':
      return `proposed to escalate: ${String(body.reason)}`;
    case 'decision':
      return `decided ${String(body.decision).replaceAll('-', ' ')}: ${String(body.reason)}`;
    case 'reopened':
      return `reopened it: ${String(body.reason)}`;
  }
}

/** Everything that was done, oldest first; only ever added to. */
export function Trail({ events }: { events: readonly CaseEventView[] }) {
  return (
    <div>
      <h2 className="h4">Trail</h2>
      <ol className="col" style={{ gap: 10, marginTop: 8 }}>
        {events.map((event) => (
          <li key={event.id} className="small">
            <b>{event.actor?.name ?? 'Thrum'}</b> {words(event)}
            <div className="mut">{formatDate(event.createdAt, 'time')}</div>
          </li>
        ))}
      </ol>
    </div>
  );
}
