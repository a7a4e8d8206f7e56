import { useState } from 'react';
import { Button, ConfirmDialog, toast } from '@/components/ui';
import type { Role } from '@/lib/actor';
import { sendJson } from '@/lib/api';
import { csvLine } from '@/lib/csv';
import { formatCount } from '@/lib/format';
import { ROLE_NAMES } from '../roles';
import type { InvitationView, Person } from '../workspaces';
import { InviteDialog } from './InviteDialog';
import { InvitationRow, PersonRow } from './PeopleRows';
import { attempt } from './say';

interface Props {
  readonly workspaceId: string;
  readonly people: Person[];
  readonly invitations: InvitationView[];
  /** Roles that this person may hand out. */
  readonly grantable: readonly Role[];
  readonly viewersSeeNames: boolean;
}

function saveList(people: readonly Person[]): void {
  const lines = people.map((one) => csvLine([one.name, one.email, ROLE_NAMES[one.role], one.lastSeenAt]));
  const text = [csvLine(['name', 'email', 'role', 'last_here']), ...lines].join('');
  const link = document.createElement('a');
  link.href = URL.createObjectURL(new Blob([text], { type: 'text/csv' }));
  link.download = 'people.csv';
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 1000);
}

/** People and roles: who is here, who is invited, what each may do. */
export function PeoplePlace(props: Props) {
  const { grantable, viewersSeeNames } = props;
  const base = `/api/v1/workspaces/${props.workspaceId}`;
  const [people, setPeople] = useState(props.people);
  const [invitations, setInvitations] = useState(props.invitations);
  const [removing, setRemoving] = useState<Person | null>(null);

  const keep = (made: InvitationView): void =>
    setInvitations((list) => [made, ...list.filter((one) => one.email !== made.email)]);
  const changeRole = (person: Person, role: Role): Promise<boolean> =>
    attempt(async () => {
      const next = await sendJson<Person>('PATCH', `${base}/people/${person.id}`, { role });
      setPeople((list) => list.map((one) => (one.id === next.id ? next : one)));
    }, `${person.name} is now ${ROLE_NAMES[role].toLowerCase()}`);
  const resend = ({ email, role }: InvitationView): Promise<boolean> =>
    attempt(
      async () => keep(await sendJson<InvitationView>('POST', `${base}/invitations`, { email, role })),
      'A new link is on its way; the old one has stopped working',
    );
  const revoke = ({ id }: InvitationView): Promise<boolean> =>
    attempt(async () => {
      await sendJson('DELETE', `${base}/invitations/${id}`);
      setInvitations((list) => list.filter((one) => one.id !== id));
    }, 'The invitation has been taken back');

  const waiting = invitations.length;
  return (
    <>
      <div className="phead">
        <div>
          <h1 className="h1">People &amp; roles</h1>
          <p className="mut" role="status">
            {formatCount(people.length, 'person', 'people')}
            {waiting > 0 && `, ${formatCount(waiting, 'invitation')} waiting`}
          </p>
        </div>
        <div className="acts">
          <Button icon="download" onClick={() => saveList(people)}>
            Export list
          </Button>
          <InviteDialog
            url={`${base}/invitations`}
            roles={grantable}
            onInvited={(made) => {
              keep(made);
              toast(`An invitation is on its way to ${made.email}`);
            }}
          />
        </div>
      </div>
      <section className="card">
        <div className="tw" tabIndex={0} role="region" aria-label="People of this workspace">
          <table className="tbl ppl">
            <thead>
              <tr>
                {['Person', 'Role', 'Can see'].map((name) => (
                  <th scope="col" key={name}>
                    {name}
                  </th>
                ))}
                <th scope="col" className="sm2">
                  Names
                </th>
                <th scope="col">Last here</th>
                <th scope="col">
                  <span className="vh">Actions</span>
                </th>
              </tr>
            </thead>
            <tbody>
              {people.map((person) => (
                <PersonRow
                  key={person.id}
                  person={person}
                  grantable={grantable}
                  viewersSeeNames={viewersSeeNames}
                  onRole={(role) => void changeRole(person, role)}
                  onRemove={() => setRemoving(person)}
                />
              ))}
              {invitations.map((one) => (
                <InvitationRow
                  key={one.id}
                  invitation={one}
                  viewersSeeNames={viewersSeeNames}
                  onResend={() => resend(one)}
                  onRevoke={() => revoke(one)}
                />
              ))}
            </tbody>
          </table>
        </div>
      </section>
      {removing && (
        <ConfirmDialog
          open
          onOpenChange={(open) => !open && setRemoving(null)}
          title={`Remove ${removing.name} from this workspace?`}
          confirmLabel={`Remove ${removing.name}`}
          danger
          onConfirm={async () => {
            await sendJson('DELETE', `${base}/people/${removing.id}`);
            setPeople((list) => list.filter((one) => one.id !== removing.id));
            toast(`${removing.name} has been removed`);
          }}
        >
          Their access and their API tokens end at once. What they made, decided and wrote stays.
        </ConfirmDialog>
      )}
    </>
  );
}
