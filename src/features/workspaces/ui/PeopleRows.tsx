import { useState } from 'react';
import { Avatar, Button, Icon, Menu, Select, StatusBadge } from '@/components/ui';
import type { Role } from '@/lib/actor';
import { formatAgo, formatCount, formatDate, initialsOf } from '@/lib/format';
import { can, seesNames } from '../policy';
import { ROLE_NAMES } from '../roles';
import type { InvitationView, Person } from '../workspaces';

const TONES = {
  owner: 'madder',
  admin: 'madder',
  analyst: 'weld',
  moderator: 'moss',
  viewer: 'woad',
} as const;
const sees = (role: Role): string => (can(role, 'explore.open') ? 'All communities' : 'Shared views');

function Names({ role, viewersSeeNames }: { role: Role; viewersSeeNames: boolean }) {
  return seesNames(role, viewersSeeNames) ? (
    <StatusBadge tone="moss" icon="eye">
      Shown
    </StatusBadge>
  ) : (
    <StatusBadge icon="hidden">Codes only</StatusBadge>
  );
}

interface PersonRowProps {
  readonly person: Person;
  readonly grantable: readonly Role[];
  readonly viewersSeeNames: boolean;
  readonly onRole: (role: Role) => void;
  readonly onRemove: () => void;
}

/** One colleague. Nobody changes their own role here, nor one above theirs. */
export function PersonRow({ person, grantable, viewersSeeNames, onRole, onRemove }: PersonRowProps) {
  const changeable = !person.me && grantable.includes(person.role);
  return (
    <tr>
      <td>
        <span className="row">
          <Avatar initials={initialsOf(person.name)} tone={TONES[person.role]} />
          <span>
            <b>{person.name}</b>
            {person.me && <span className="mut"> (you)</span>}
            <br />
            <span className="small mut">{person.email}</span>
          </span>
        </span>
      </td>
      <td style={{ minWidth: 142 }}>
        {changeable ? (
          <Select
            label={`Role of ${person.name}`}
            labelPlace="hidden"
            size="small"
            full
            options={grantable.map((one) => ({ id: one, label: ROLE_NAMES[one] }))}
            value={person.role}
            onChange={(role) => role !== person.role && onRole(role)}
          />
        ) : (
          ROLE_NAMES[person.role]
        )}
      </td>
      <td>{sees(person.role)}</td>
      <td className="sm2">
        <Names role={person.role} viewersSeeNames={viewersSeeNames} />
      </td>
      <td className="mut">{person.lastSeenAt ? formatAgo(person.lastSeenAt) : 'not yet'}</td>
      <td className="r">
        {changeable && (
          <Menu
            trigger={`More for ${person.name}`}
            bare
            icon="more"
            look="quiet"
            size="small"
            placement="bottom end"
            entries={[{ id: 'remove', label: 'Remove from the workspace', danger: true, onAction: onRemove }]}
          />
        )}
      </td>
    </tr>
  );
}

interface InvitationRowProps {
  readonly invitation: InvitationView;
  readonly viewersSeeNames: boolean;
  readonly onResend: () => Promise<unknown>;
  readonly onRevoke: () => Promise<unknown>;
}

/** One invitation that waits. */
export function InvitationRow({ invitation, viewersSeeNames, onResend, onRevoke }: InvitationRowProps) {
  const [pending, setPending] = useState(false);
  const run = (work: () => Promise<unknown>): void => {
    setPending(true);
    void work().finally(() => setPending(false));
  };
  const days = Math.max(1, Math.ceil((Date.parse(invitation.expiresAt) - Date.now()) / 86_400_000));
  return (
    <tr>
      <td>
        <span className="row">
          <span
            className="ava"
            style={{ background: 'none', border: '1.5px dashed var(--c-line-strong)' }}
            aria-hidden="true"
          >
            <Icon name="mail" small />
          </span>
          <span>
            <b>{invitation.email}</b>
            <br />
            <span className="small mut">
              Invited {formatDate(invitation.invitedAt, 'short')}, link lasts {formatCount(days, 'more day')}
            </span>
          </span>
        </span>
      </td>
      <td>{ROLE_NAMES[invitation.role]}</td>
      <td>{sees(invitation.role)}</td>
      <td className="sm2">
        <Names role={invitation.role} viewersSeeNames={viewersSeeNames} />
      </td>
      <td>
        <StatusBadge tone="weld">Waiting</StatusBadge>
      </td>
      <td className="r">
        <span className="row" style={{ justifyContent: 'flex-end' }}>
          <Button size="small" pending={pending} onClick={() => run(onResend)}>
            Resend
          </Button>
          <Button size="small" kind="quiet" disabled={pending} onClick={() => run(onRevoke)}>
            Take back
          </Button>
        </span>
      </td>
    </tr>
  );
}
