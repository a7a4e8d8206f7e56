import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Button, Checkbox, Dialog, IconButton, RadioCards, Select, Skeleton, toast } from '@/components/ui';
import { ROLES } from '@/lib/actor';
import { ApiError, getJson, sendJson } from '@/lib/api';
import { ROLE_PLURALS } from '../role-plurals';
import type { SavedView, Share } from '../views';

export interface Colleague {
  readonly id: string;
  readonly name: string;
}

const words = (error: unknown): string =>
  error instanceof ApiError ? error.problem.detail : 'That could not be changed. Try again.';

/** Who may open a view: only its owner and those named, or everyone; people and roles one by one, to open or to edit. */
export function ShareDialog({
  view,
  colleagues,
  onVisibility,
  onShares,
  onClose,
}: {
  view: SavedView;
  colleagues: readonly Colleague[];
  onVisibility: (visibility: SavedView['visibility']) => Promise<void>;
  onShares: (count: number) => void;
  onClose: () => void;
}) {
  const url = `/api/v1/views/${view.id}/shares`;
  const queryClient = useQueryClient();
  const [chosen, setChosen] = useState<string | null>(null);
  const [canEdit, setCanEdit] = useState(false);
  const list = useQuery({
    queryKey: ['shares', view.id],
    queryFn: ({ signal }) => getJson<{ items: Share[] }>(url, signal),
  });
  const shares = list.data?.items ?? [];
  const keep = (items: Share[]): void => {
    queryClient.setQueryData(['shares', view.id], { items });
    onShares(items.length);
  };
  const add = useMutation({
    mutationFn: (whom: string) => {
      const [kind, id] = whom.split(':') as ['role' | 'user', string];
      return sendJson<Share>('POST', url, { ...(kind === 'role' ? { role: id } : { userId: id }), canEdit });
    },
    onSuccess: (share) => {
      keep([...shares.filter((one) => one.id !== share.id), share]);
      setChosen(null);
      toast(`Shared with ${share.name}`);
    },
    onError: (error) => toast(words(error), { tone: 'error' }),
  });
  const end = useMutation({
    mutationFn: (share: Share) => sendJson('DELETE', `${url}/${share.id}`),
    onSuccess: (_, share) => {
      keep(shares.filter((one) => one.id !== share.id));
      toast(`${share.name} no longer ${share.role ? 'see' : 'sees'} it`);
    },
    onError: (error) => toast(words(error), { tone: 'error' }),
  });
  const taken = new Set(shares.map((one) => (one.role ? `role:${one.role}` : `user:${one.userId}`)));
  const options = [
    ...ROLES.map((role) => ({ id: `role:${role}`, label: ROLE_PLURALS[role] })),
    ...colleagues.map(({ id, name }) => ({ id: `user:${id}`, label: name })),
  ].filter((one) => !taken.has(one.id) && one.id !== `user:${view.owner.id}`);
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={`Share “${view.name}”`}
      actions={
        <Button kind="primary" onClick={onClose}>
          Done
        </Button>
      }
    >
      <div className="col" style={{ gap: 16 }}>
        <RadioCards
          legend="Who can open it"
          name="visibility"
          value={view.visibility}
          onChange={(value) => void onVisibility(value as SavedView['visibility'])}
          options={[
            {
              value: 'private',
              label: 'You, and those named below',
              hint: 'A link opens it for nobody else.',
            },
            {
              value: 'workspace',
              label: 'Everyone in the workspace',
              hint: 'Viewers see it with names hidden, unless an admin allows them.',
            },
          ]}
        />
        <div className="col" style={{ gap: 8 }}>
          <Select
            label="People and roles"
            full
            placeholder="Choose"
            options={options}
            value={chosen}
            onChange={setChosen}
          />
          <div className="row sp wrap">
            <Checkbox label="May also edit it" checked={canEdit} onChange={setCanEdit} />
            <Button disabled={!chosen} pending={add.isPending} onClick={() => chosen && add.mutate(chosen)}>
              Share
            </Button>
          </div>
        </div>
        {list.isPending && <Skeleton height={40} />}
        {list.error && <p className="small">{words(list.error)}</p>}
        {shares.length > 0 && (
          <ul className="plain" aria-label="Shared with">
            {shares.map((share) => (
              <li key={share.id} className="row sp" style={{ minHeight: 40 }}>
                <span>
                  <b>{share.name}</b> <span className="mut">{share.canEdit ? 'can edit' : 'can open'}</span>
                </span>
                <IconButton
                  icon="close"
                  label={`Stop sharing with ${share.name}`}
                  onClick={() => end.mutate(share)}
                />
              </li>
            ))}
          </ul>
        )}
      </div>
    </Dialog>
  );
}
