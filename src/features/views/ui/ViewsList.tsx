import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useState } from 'react';
import { ConfirmDialog, Menu, StatusBadge, toast } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';
import { formatDate } from '@/lib/format';
import type { SavedView } from '../views';
import { ShareDialog, type Colleague } from './ShareDialog';

const seen = (view: SavedView): string =>
  view.visibility === 'workspace' ? 'everyone' : view.shares > 0 ? `${view.shares} named` : 'only you';

/** Saved views as a table: open, pin, share, delete. */
export function ViewsList({
  initial,
  colleagues,
}: {
  initial: SavedView[];
  colleagues: readonly Colleague[];
}) {
  const [client] = useState(() => new QueryClient());
  const [views, setViews] = useState(initial);
  const [sharing, setSharing] = useState<string | null>(null);
  const shared = views.find((one) => one.id === sharing);
  const [asking, setAsking] = useState<SavedView | null>(null);
  const change = async (view: SavedView, changes: Partial<SavedView>): Promise<void> => {
    try {
      const next = await sendJson<SavedView>('PATCH', `/api/v1/views/${view.id}`, {
        version: view.version,
        ...changes,
      });
      setViews((list) => list.map((one) => (one.id === view.id ? next : one)));
      toast('Saved');
    } catch (error) {
      toast(error instanceof ApiError ? error.problem.detail : 'That did not work.', { tone: 'error' });
    }
  };
  return (
    <div className="tw" tabIndex={0} role="region" aria-label="Saved views">
      <table className="tbl">
        <thead>
          <tr>
            <th scope="col">View</th>
            <th scope="col">Seen by</th>
            <th scope="col">Owner</th>
            <th scope="col">Saved</th>
            <th scope="col">
              <span className="vh">Actions</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {views.map((view) => (
            <tr key={view.id}>
              <th scope="row">
                <a href={view.href}>{view.name}</a>
                {view.pinned && <StatusBadge tone="plain">pinned</StatusBadge>}
                {view.note && <div className="small mut">{view.note}</div>}
              </th>
              <td>{seen(view)}</td>
              <td>{view.owner.name}</td>
              <td>{formatDate(view.updatedAt)}</td>
              <td>
                {(view.canEdit || view.canShare) && (
                  <Menu
                    trigger="More"
                    look="quiet"
                    size="small"
                    placement="bottom end"
                    label={`More for ${view.name}`}
                    entries={[
                      ...(view.canEdit
                        ? [
                            {
                              id: 'pin',
                              label: view.pinned ? 'Unpin' : 'Pin',
                              onAction: () => void change(view, { pinned: !view.pinned }),
                            },
                          ]
                        : []),
                      ...(view.canShare
                        ? [{ id: 'share', label: 'Share', onAction: () => setSharing(view.id) }]
                        : []),
                      ...(view.mine
                        ? [{ id: 'delete', label: 'Delete', danger: true, onAction: () => setAsking(view) }]
                        : []),
                    ]}
                  />
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {shared && (
        <QueryClientProvider client={client}>
          <ShareDialog
            view={shared}
            colleagues={colleagues}
            onVisibility={(visibility) => change(shared, { visibility })}
            onShares={(shares) =>
              setViews((list) => list.map((one) => (one.id === shared.id ? { ...one, shares } : one)))
            }
            onClose={() => setSharing(null)}
          />
        </QueryClientProvider>
      )}
      {asking && (
        <ConfirmDialog
          open
          onOpenChange={(open) => !open && setAsking(null)}
          title={`Delete “${asking.name}”?`}
          confirmLabel="Delete"
          danger
          onConfirm={async () => {
            await sendJson('DELETE', `/api/v1/views/${asking.id}`);
            setViews((list) => list.filter((one) => one.id !== asking.id));
            setAsking(null);
          }}
        >
          Everyone it is shared with loses it.
        </ConfirmDialog>
      )}
    </div>
  );
}
