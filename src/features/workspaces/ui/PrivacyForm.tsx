import { useState } from 'react';
import { Button, Card, NumberInput, Switch } from '@/components/ui';
import { sendJson } from '@/lib/api';
import type { WorkspaceSettings } from '../workspaces';
import { attempt } from './say';

/** What protects the people in the data. The switch acts at once; the numbers when saved. */
export function PrivacyForm({ workspaceId, initial }: { workspaceId: string; initial: WorkspaceSettings }) {
  const [saved, setSaved] = useState(initial);
  const [group, setGroup] = useState<number | null>(initial.smallestGroup);
  const [floor, setFloor] = useState<number | null>(initial.neighbourFloor);
  const [pending, setPending] = useState(false);
  const change = async (changes: Partial<WorkspaceSettings>): Promise<void> => {
    setPending(true);
    await attempt(async () => {
      setSaved(await sendJson<WorkspaceSettings>('PATCH', `/api/v1/workspaces/${workspaceId}`, changes));
    }, 'Saved');
    setPending(false);
  };
  const numbersChanged = group !== saved.smallestGroup || floor !== saved.neighbourFloor;
  return (
    <Card title="Privacy">
      <Switch
        label="Codes in place of names for viewers"
        hint="Each viewer sees a different set of codes."
        checked={!saved.viewersSeeNames}
        disabled={pending}
        onChange={(codes) => void change({ viewersSeeNames: !codes })}
      />
      <form
        className="col"
        style={{ marginTop: 14 }}
        onSubmit={(event) => {
          event.preventDefault();
          if (group !== null && floor !== null) void change({ smallestGroup: group, neighbourFloor: floor });
        }}
      >
        <NumberInput
          label="Hide figures of groups smaller than"
          hint="Figures for tiny groups can point at people."
          unit="members"
          min={2}
          max={100}
          value={group}
          onChange={setGroup}
        />
        <NumberInput
          label="Never flag members with fewer neighbours than"
          hint="With few neighbours there is too little to compare with."
          unit="neighbours"
          min={1}
          max={100}
          value={floor}
          onChange={setFloor}
        />
        <div>
          <Button
            type="submit"
            pending={pending}
            disabled={!numbersChanged || group === null || floor === null}
          >
            Save
          </Button>
        </div>
      </form>
      <p className="small mut" style={{ marginTop: 10 }}>
        Every change here is written to the audit log.
      </p>
    </Card>
  );
}
