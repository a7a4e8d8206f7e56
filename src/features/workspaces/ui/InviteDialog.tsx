import { useState, type FormEvent } from 'react';
import { Banner, Button, Dialog, Select, TextInput } from '@/components/ui';
import type { Role } from '@/lib/actor';
import { sendJson } from '@/lib/api';
import { ROLE_NAMES } from '../roles';
import type { InvitationView } from '../workspaces';
import { problemOf } from './say';

interface Props {
  readonly url: string;
  readonly roles: readonly Role[];
  readonly onInvited: (invitation: InvitationView) => void;
}

/** The button "Invite people" and its window: one address, one role, one letter. */
export function InviteDialog({ url, roles, onInvited }: Props) {
  const [open, setOpen] = useState(false);
  const [role, setRole] = useState<Role>('viewer');
  const [email, setEmail] = useState('');
  const [problem, setProblem] = useState<string | null>(null);
  const [pending, setPending] = useState(false);
  const close = (next: boolean): void => {
    setOpen(next);
    setEmail('');
    setProblem(null);
  };
  const send = async (event: FormEvent): Promise<void> => {
    event.preventDefault();
    setPending(true);
    try {
      onInvited(await sendJson<InvitationView>('POST', url, { email: email.trim(), role }));
      close(false);
    } catch (error) {
      setProblem(problemOf(error));
    } finally {
      setPending(false);
    }
  };
  return (
    <>
      <Button kind="primary" icon="plus" onClick={() => setOpen(true)}>
        Invite people
      </Button>
      <Dialog
        open={open}
        onOpenChange={close}
        title="Invite a colleague"
        actions={
          <>
            <Button kind="quiet" onClick={() => close(false)} disabled={pending}>
              Cancel
            </Button>
            <Button kind="primary" type="submit" form="invite" pending={pending}>
              Send the invitation
            </Button>
          </>
        }
      >
        <form id="invite" className="col" onSubmit={(event) => void send(event)}>
          {problem && (
            <Banner tone="error" live>
              {problem}
            </Banner>
          )}
          <TextInput
            label="E-mail"
            type="email"
            required
            maxLength={200}
            value={email}
            onChange={(event) => setEmail(event.target.value)}
            hint="The link works for seven days, for this address only."
          />
          <Select
            label="Role"
            full
            options={roles.map((one) => ({ id: one, label: ROLE_NAMES[one] }))}
            value={role}
            onChange={setRole}
          />
        </form>
      </Dialog>
    </>
  );
}
