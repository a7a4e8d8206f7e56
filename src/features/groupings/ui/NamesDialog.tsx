import { useState } from 'react';
import { Banner, Button, Dialog, Tag, TextInput } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';
import type { GroupingView } from '../groupings';

/** Most groups that get a field each; the small ones after them keep their letters. */
const MOST = 24;

/** Names of the grouping and of its groups. */
export function NamesDialog({
  view,
  open,
  onOpenChange,
  onSaved,
}: {
  view: GroupingView;
  open: boolean;
  onOpenChange: (open: boolean) => void;
  onSaved: (view: GroupingView) => void;
}) {
  const [name, setName] = useState(view.name);
  const [names, setNames] = useState(() => new Map(view.groups.map((one) => [one.index, one.name ?? ''])));
  const [pending, setPending] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const save = async (): Promise<void> => {
    setPending(true);
    setProblem(null);
    try {
      const groups = view.groups
        .filter((one) => (one.name ?? '') !== (names.get(one.index) ?? '').trim())
        .map((one) => ({ index: one.index, name: (names.get(one.index) ?? '').trim() }));
      const saved = await sendJson<GroupingView>('PATCH', `/api/v1/groupings/${view.id}`, {
        name: name.trim() || view.name,
        groups,
      });
      onSaved(saved);
      onOpenChange(false);
    } catch (cause) {
      setProblem(cause instanceof ApiError ? cause.problem.detail : 'That did not work. Please try again.');
    } finally {
      setPending(false);
    }
  };
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Names"
      actions={
        <>
          <Button kind="quiet" onClick={() => onOpenChange(false)} disabled={pending}>
            Cancel
          </Button>
          <Button kind="primary" pending={pending} onClick={() => void save()}>
            Save names
          </Button>
        </>
      }
    >
      <TextInput
        label="Grouping"
        value={name}
        maxLength={120}
        onChange={(event) => setName(event.target.value)}
      />
      <div className="col" style={{ gap: 8, maxHeight: 340, overflowY: 'auto' }}>
        {view.groups.slice(0, MOST).map((group) => (
          <div className="row" key={group.index}>
            <Tag letter={group.letter} />
            <div className="grow">
              <TextInput
                label={`Name of group ${group.letter}`}
                hideLabel
                placeholder={`Group ${group.letter}`}
                value={names.get(group.index) ?? ''}
                maxLength={80}
                onChange={(event) => setNames(new Map(names).set(group.index, event.target.value))}
              />
            </div>
          </div>
        ))}
      </div>
      {problem && <Banner tone="error">{problem}</Banner>}
    </Dialog>
  );
}
