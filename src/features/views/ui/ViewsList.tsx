import { useState } from 'react';
import { ConfirmDialog, Menu, StatusBadge, toast } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';
import { formatDate } from '@/lib/format';
import type { SavedView } from '../views';

const seen = (view: SavedView): string =>
  view.visibility === 'workspace' ? 'everyone' : view.shares > 0 ? 'some' : 'only you';

/** Saved views as a table: open, pin, share with everyone, delete. */
export function ViewsList({ initial }: { initial: SavedView[] }) {
  const [views, setViews] = useState(initial);
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
                {view.canEdit && (
                  <Menu
                    trigger="More"
                    look="quiet"
                    size="small"
                    placement="bottom end"
                    label={`More for ${view.name}`}
                    entries={[
                      {
                        id: 'pin',
                        label: view.pinned ? 'Unpin' : 'Pin',
                        onAction: () => void change(view, { pinned: !view.pinned }),
                      },
                      ...(view.mine
                        ? [
                            {
                              id: 'share',
                              label:
                                view.visibility === 'workspace' ? 'Keep to yourself' : 'Share with everyone',
                              onAction: () =>
                                void change(view, {
                                  visibility:
                                    view.visibility === 'workspace'
                                      ? ('private' as const)
                                      : ('workspace' as const),
                                }),
                            },
                            { id: 'delete', label: 'Delete', danger: true, onAction: () => setAsking(view) },
                          ]
                        : []),
                    ]}
                  />
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
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
