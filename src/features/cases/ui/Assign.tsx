import { Menu } from '@/components/ui';
import type { CaseDetail } from '../cases';

/** Who works the case; for those who work cases a menu to take it, give it or let go of it. */
export function Assign({
  detail,
  me,
  people,
  onAssign,
}: {
  detail: CaseDetail;
  me: string;
  people: readonly { id: string; name: string }[];
  onAssign: (id: string | null, said: string) => void;
}) {
  const { assignee } = detail;
  const now = assignee ? (assignee.id === me ? 'Assigned to you' : assignee.name) : 'Nobody yet';
  if (!detail.abilities.work) return <span className="small mut">{now}</span>;
  const others = people.filter((one) => one.id !== me && one.id !== assignee?.id);
  return (
    <Menu
      trigger={now}
      label="Assign the case"
      icon="members"
      size="small"
      placement="bottom end"
      entries={[
        ...(assignee?.id === me
          ? []
          : [{ id: 'me', label: 'Assign to me', onAction: () => onAssign(me, 'Assigned to you') }]),
        ...others.map((one) => ({
          id: one.id,
          label: `Assign to ${one.name}`,
          onAction: () => onAssign(one.id, `Assigned to ${one.name}`),
        })),
        ...(assignee
          ? [
              {
                id: 'nobody',
                label: 'Assign to nobody',
                onAction: () => onAssign(null, 'Assigned to nobody'),
              },
            ]
          : []),
      ]}
    />
  );
}
