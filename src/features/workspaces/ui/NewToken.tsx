import { useState, type FormEvent } from 'react';
import { Banner, Button, Card, RadioCards, Select, TextInput } from '@/components/ui';
import { sendJson } from '@/lib/api';
import type { TokenView } from '../workspaces';
import { problemOf } from './say';

export type NewTokenView = TokenView & { token: string };
const DAYS = { '30': '30 days', '90': '90 days', '365': 'one year' } as const;

/** Makes a token and shows it, once. */
export function NewToken({ url, onMade }: { url: string; onMade: (token: TokenView) => void }) {
  const [name, setName] = useState('');
  const [scope, setScope] = useState<'read' | 'write'>('read');
  const [days, setDays] = useState<keyof typeof DAYS>('90');
  const [made, setMade] = useState<NewTokenView | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const [pending, setPending] = useState(false);
  const make = async (event: FormEvent): Promise<void> => {
    event.preventDefault();
    setPending(true);
    setProblem(null);
    try {
      const answer = await sendJson<NewTokenView>('POST', url, {
        name: name.trim(),
        readOnly: scope === 'read',
        days: Number(days),
      });
      const { token: _, ...view } = answer;
      onMade(view);
      setMade(answer);
      setName('');
    } catch (error) {
      setProblem(problemOf(error));
    }
    setPending(false);
  };
  return (
    <Card title="New token">
      {made && (
        <Banner tone="done" live title={`“${made.name}” is made. Copy it now: it is not shown again.`}>
          <code style={{ overflowWrap: 'anywhere' }}>{made.token}</code>
        </Banner>
      )}
      {problem && (
        <Banner tone="error" live>
          {problem}
        </Banner>
      )}
      <form className="col" onSubmit={(event) => void make(event)}>
        <TextInput
          label="Name"
          hint="What uses it, so that you know it again."
          required
          maxLength={80}
          value={name}
          onChange={(event) => setName(event.target.value)}
        />
        <RadioCards
          legend="Scope"
          name="scope"
          options={[
            { value: 'read', label: 'Read', hint: 'Sees what you see in this workspace.' },
            { value: 'write', label: 'Read and write', hint: 'May do what you may do in this workspace.' },
          ]}
          value={scope}
          onChange={setScope}
        />
        <Select
          label="Works for"
          options={Object.entries(DAYS).map(([id, label]) => ({ id: id as keyof typeof DAYS, label }))}
          value={days}
          onChange={setDays}
        />
        <div>
          <Button type="submit" kind="primary" pending={pending} disabled={name.trim() === ''}>
            Make the token
          </Button>
        </div>
      </form>
    </Card>
  );
}
