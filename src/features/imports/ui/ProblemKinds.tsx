import { useState } from 'react';
import { Button, toast } from '@/components/ui';
import { getJson } from '@/lib/api';
import { formatNumber } from '@/lib/format';
import type { ImportProblem, ProblemKind } from '../imports';

interface Page {
  items: ImportProblem[];
  nextCursor: string | null;
}

/** Refused rows and cells by kind; the rows of a kind are fetched when they are asked for. */
export function ProblemKinds({ importId, kinds }: { importId: string; kinds: readonly ProblemKind[] }) {
  return (
    <ul className="prob">
      {kinds.map((kind) => (
        <Kind key={kind.kind} importId={importId} kind={kind} />
      ))}
    </ul>
  );
}

function Kind({ importId, kind }: { importId: string; kind: ProblemKind }) {
  const [page, setPage] = useState<Page | null>(null);
  const [open, setOpen] = useState(false);
  const [pending, setPending] = useState(false);
  const more = async (): Promise<void> => {
    setPending(true);
    try {
      const query = new URLSearchParams({ kind: String(kind.kind), cursor: page?.nextCursor ?? '0' });
      const next = await getJson<Page>(`/api/v1/imports/${importId}/problems?${query.toString()}`);
      setPage({ items: [...(page?.items ?? []), ...next.items], nextCursor: next.nextCursor });
    } catch {
      toast('The rows could not be fetched. Try again.', { tone: 'error' });
    }
    setPending(false);
  };
  const toggle = (): void => {
    setOpen(!open);
    if (!open && !page) void more();
  };
  const where = kind.column === null ? `whole rows of ${kind.file}` : `${kind.column} in ${kind.file}`;
  return (
    <li>
      <div className="row sp wrap">
        <div>
          <div className="b">
            {formatNumber(kind.count)} × {where}
          </div>
          <div className="small mut">
            {kind.reason} First in line {formatNumber(kind.firstLine)}.
          </div>
        </div>
        <Button size="small" onClick={toggle} aria-expanded={open} pending={pending && !page}>
          {open ? 'Hide rows' : 'Show rows'}
        </Button>
      </div>
      {open && page && (
        <>
          <div
            className="tw"
            tabIndex={0}
            role="region"
            aria-label={`Rows: ${kind.reason}`}
            style={{ marginTop: 8, maxHeight: 320 }}
          >
            <table className="tbl">
              <thead>
                <tr>
                  <th scope="col" className="r">
                    Line
                  </th>
                  <th scope="col">Value</th>
                  <th scope="col">Reason</th>
                </tr>
              </thead>
              <tbody>
                {page.items.map((one, i) => (
                  <tr key={i}>
                    <td className="r">{formatNumber(one.line)}</td>
                    <td style={{ overflowWrap: 'anywhere' }}>{one.value}</td>
                    <td>{one.reason}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </div>
          {page.nextCursor && (
            <Button size="small" kind="quiet" pending={pending} onClick={() => void more()}>
              More rows
            </Button>
          )}
        </>
      )}
    </li>
  );
}
