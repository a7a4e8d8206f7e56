import { useState } from 'react';
import { Button, Card, TextInput } from '@/components/ui';
import { sendJson } from '@/lib/api';
import type { WorkspaceSettings } from '../workspaces';
import { attempt } from './say';

/** The name of the workspace. */
export function WorkspaceForm({ workspaceId, name }: { workspaceId: string; name: string }) {
  const [saved, setSaved] = useState(name);
  const [draft, setDraft] = useState(name);
  const [pending, setPending] = useState(false);
  const save = async (): Promise<void> => {
    setPending(true);
    await attempt(async () => {
      const next = await sendJson<WorkspaceSettings>('PATCH', `/api/v1/workspaces/${workspaceId}`, {
        name: draft,
      });
      setSaved(next.name);
      setDraft(next.name);
    }, 'Saved');
    setPending(false);
  };
  return (
    <Card title="Name">
      <form
        className="col"
        style={{ maxWidth: 420 }}
        onSubmit={(event) => {
          event.preventDefault();
          void save();
        }}
      >
        <TextInput
          label="Name of the workspace"
          value={draft}
          required
          maxLength={120}
          onChange={(event) => setDraft(event.target.value)}
        />
        <div>
          <Button type="submit" pending={pending} disabled={draft.trim() === '' || draft === saved}>
            Save
          </Button>
        </div>
      </form>
    </Card>
  );
}
