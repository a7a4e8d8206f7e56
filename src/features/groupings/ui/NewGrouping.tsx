import { useState } from 'react';
import { Banner, Button, Dialog, NumberInput, RadioCards, Select, TextInput } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';
import type { MakeGrouping } from '../groupings';

interface Props {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  snapshotId: string;
  /** Address of the Groups place. */
  base: string;
  /** Split only this group of an earlier grouping. */
  within?: { grouping: string; group: number; title: string };
}

const METHODS = [
  { value: 'fiedler', label: 'Split in two', hint: 'Finds the weakest seam and cuts along it.' },
  {
    value: 'spectral',
    label: 'Several groups at once',
    hint: 'As many as you say, or as many as the ties suggest.',
  },
  { value: 'louvain', label: 'Louvain', hint: 'A second opinion by another method.' },
] as const;

const CUTS = [
  {
    id: 'sweep',
    label: 'Where it is loosest',
    description: 'Fewest ties cut for the size of the smaller side',
  },
  { id: 'sign', label: 'By sign', description: 'Positive entries on one side, the rest on the other' },
  { id: 'median', label: 'In equal halves', description: 'The same number of members on each side' },
] as const;

const LAPLACIANS = [
  { id: 'regularised', label: 'Regularised', description: 'Thin branches are not taken for groups' },
  { id: 'normalised', label: 'Normalised', description: 'Counts a tie by how many its members have' },
  { id: 'combinatorial', label: 'Plain', description: 'Fiedler’s own: every tie counts as it is' },
] as const;

/** Asks how to divide the members and starts the work; then goes to the grouping, which shows how far it is. */
export function NewGrouping({ open, onOpenChange, snapshotId, base, within }: Props) {
  const [name, setName] = useState('');
  const [method, setMethod] = useState<MakeGrouping['method']>('fiedler');
  const [cut, setCut] = useState<MakeGrouping['cut']>('sweep');
  const [laplacian, setLaplacian] = useState<MakeGrouping['laplacian']>('regularised');
  const [k, setK] = useState<number | null>(null);
  const [seed, setSeed] = useState<number | null>(1);
  const [pending, setPending] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);

  const make = async (): Promise<void> => {
    setPending(true);
    setProblem(null);
    try {
      const answer = await sendJson<{ grouping: { id: string } }>(
        'POST',
        `/api/v1/snapshots/${snapshotId}/groupings`,
        {
          ...(name.trim() ? { name: name.trim() } : {}),
          ...(within ? { within: { grouping: within.grouping, group: within.group } } : {}),
          method,
          cut,
          laplacian,
          k: k ?? 'auto',
          seed: seed ?? 1,
        },
      );
      window.location.assign(`${base}/${answer.grouping.id}?snapshot=${snapshotId}`);
    } catch (cause) {
      setPending(false);
      setProblem(cause instanceof ApiError ? cause.problem.detail : 'That did not work. Please try again.');
    }
  };

  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title={within ? `Split ${within.title}` : 'New grouping'}
      width={520}
      actions={
        <>
          <Button kind="quiet" onClick={() => onOpenChange(false)} disabled={pending}>
            Cancel
          </Button>
          <Button kind="primary" pending={pending} onClick={() => void make()}>
            {within ? 'Split' : 'Make grouping'}
          </Button>
        </>
      }
    >
      {!within && (
        <RadioCards legend="How" options={METHODS} value={method} onChange={setMethod} name="method" />
      )}
      {method === 'fiedler' && (
        <Select label="Where to cut" options={CUTS} value={cut} onChange={setCut} full />
      )}
      {method === 'spectral' && (
        <NumberInput
          label="Number of groups"
          optional
          hint="Leave empty to take the number with the cleanest cut."
          value={k}
          onChange={setK}
          min={2}
          max={50}
        />
      )}
      {method !== 'louvain' && (
        <Select label="Laplacian" options={LAPLACIANS} value={laplacian} onChange={setLaplacian} full />
      )}
      <TextInput
        label="Name"
        optional
        value={name}
        maxLength={120}
        onChange={(event) => setName(event.target.value)}
      />
      {method !== 'fiedler' && (
        <NumberInput
          label="Seed"
          hint="The same seed gives the same groups."
          value={seed}
          onChange={setSeed}
          min={0}
          max={2_147_483_647}
        />
      )}
      {problem && <Banner tone="error">{problem}</Banner>}
    </Dialog>
  );
}
