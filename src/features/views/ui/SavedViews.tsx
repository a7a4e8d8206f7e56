import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import {
  Button,
  Dialog,
  Menu,
  RadioCards,
  TextArea,
  TextInput,
  toast,
  type MenuEntry,
} from '@/components/ui';
import type { SavedView } from '../views';
import { ApiError, getJson, sendJson } from '@/lib/api';
import type { ExploreProps } from '../explore';
import type { StateControl } from './use-view-state';

const sharing = (view: SavedView): string => {
  if (view.visibility === 'workspace')
    return view.mine ? 'Shared with everyone' : `Shared by ${view.owner.name}`;
  if (view.shares > 0) return view.mine ? 'Shared with some' : `Shared by ${view.owner.name}`;
  return 'Only you';
};

/** Saved views of the community: open one, save this one, copy its link. */
export function SavedViews({
  props,
  control,
  place = 'map',
}: {
  props: ExploreProps;
  control: StateControl;
  place?: 'map' | 'members';
}) {
  const queryClient = useQueryClient();
  const url = `/api/v1/communities/${props.communityId}/views`;
  const list = useQuery({
    queryKey: ['views', props.communityId],
    queryFn: ({ signal }) => getJson<{ items: SavedView[] }>(url, signal),
  });
  const [saving, setSaving] = useState(false);
  const maySave = props.abilities.includes('views.save');
  const { view } = props;

  const update = useMutation({
    mutationFn: () =>
      sendJson<SavedView>('PATCH', `/api/v1/views/${view!.id}`, {
        version: view!.version,
        state: control.state,
      }),
    onSuccess: () => toast('View saved'),
    onError: (error) =>
      toast(error instanceof ApiError ? error.problem.detail : 'The view could not be saved.', {
        tone: 'error',
      }),
  });
  const views = (list.data?.items ?? []).slice(0, 8);
  const entries: (MenuEntry | 'separator')[] = views.map((one) => ({
    id: one.id,
    label: one.name,
    description: sharing(one),
    icon: one.visibility === 'private' && one.shares === 0 ? 'lock' : 'eye',
    href: one.href,
    current: one.id === view?.id,
  }));
  if (entries.length > 0) entries.push('separator');
  if (maySave)
    entries.push({ id: 'save', label: 'Save this view', icon: 'plus', onAction: () => setSaving(true) });
  if (maySave && view?.canEdit)
    entries.push({
      id: 'update',
      label: `Update “${view.name}”`,
      icon: 'check',
      onAction: () => update.mutate(),
    });
  entries.push({
    id: 'copy',
    label: 'Copy link to this view',
    icon: 'share',
    onAction: () => void navigator.clipboard.writeText(location.href).then(() => toast('Link copied')),
  });
  return (
    <>
      <Menu
        trigger={view?.name ?? 'Saved views'}
        icon="bookmark"
        size="small"
        entries={entries}
        placement="bottom end"
        label="Saved views"
      />
      {saving && (
        <SaveDialog
          props={props}
          control={control}
          place={place}
          onClose={() => setSaving(false)}
          onSaved={() => void queryClient.invalidateQueries({ queryKey: ['views', props.communityId] })}
        />
      )}
    </>
  );
}

function SaveDialog({
  props,
  control,
  place,
  onClose,
  onSaved,
}: {
  props: ExploreProps;
  control: StateControl;
  place: 'map' | 'members';
  onClose: () => void;
  onSaved: () => void;
}) {
  const [name, setName] = useState('');
  const [note, setNote] = useState('');
  const [visibility, setVisibility] = useState<'private' | 'workspace'>('private');
  const save = useMutation({
    mutationFn: () =>
      sendJson<SavedView>('POST', `/api/v1/communities/${props.communityId}/views`, {
        name,
        note,
        visibility,
        place,
        snapshotId: props.snapshot.id,
        state: control.state,
      }),
    onSuccess: (view) => {
      onSaved();
      onClose();
      toast(`Saved “${view.name}”`, {
        action: { label: 'Open', onAction: () => location.assign(view.href) },
      });
    },
  });
  const problem =
    save.error instanceof ApiError
      ? save.error.problem.detail
      : save.error
        ? 'The view could not be saved.'
        : undefined;
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="Save this view"
      actions={
        <>
          <Button kind="quiet" onClick={onClose}>
            Cancel
          </Button>
          <Button
            kind="primary"
            pending={save.isPending}
            disabled={!name.trim()}
            onClick={() => save.mutate()}
          >
            Save view
          </Button>
        </>
      }
    >
      <div className="col" style={{ gap: 14 }}>
        <TextInput
          label="Name of view"
          value={name}
          autoFocus
          maxLength={120}
          error={problem}
          onChange={(event) => setName(event.target.value)}
        />
        <TextArea
          label="Note"
          optional
          value={note}
          maxLength={2000}
          onChange={(event) => setNote(event.target.value)}
        />
        <RadioCards
          legend="Who can open it"
          name="visibility"
          value={visibility}
          onChange={(value) => setVisibility(value as 'private' | 'workspace')}
          options={[
            { value: 'private', label: 'Only you', hint: 'You can share it later from Saved views.' },
            {
              value: 'workspace',
              label: 'Everyone in the workspace',
              hint: 'Viewers see it with names hidden, unless an admin allows them.',
            },
          ]}
        />
      </div>
    </Dialog>
  );
}
