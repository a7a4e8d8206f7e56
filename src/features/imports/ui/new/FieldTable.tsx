import type { ReactNode } from 'react';
import { Card, Select, StatusBadge } from '@/components/ui';
import type { Why } from './match';
import type { Profile } from './profile';

/** One row a column: its first values, what it becomes, and why. */
export function FieldTable({
  title,
  aside,
  profiles,
  becomes,
  why,
}: {
  title: ReactNode;
  aside?: ReactNode;
  profiles: readonly Profile[];
  becomes: (profile: Profile) => ReactNode;
  why: (column: string) => Why | undefined;
}) {
  return (
    <Card title={title} aside={aside} flush>
      <div className="tw" tabIndex={0} role="region" aria-label={`Columns of ${String(title)}`}>
        <table className="tbl cmt">
          <thead>
            <tr>
              <th scope="col">Column in file</th>
              <th scope="col">First values</th>
              <th scope="col">Becomes</th>
              <th scope="col">Check</th>
            </tr>
          </thead>
          <tbody>
            {profiles
              .filter((one) => one.column !== '')
              .map((profile) => {
                const reason = why(profile.column);
                return (
                  <tr key={profile.column}>
                    <th scope="row">{profile.column}</th>
                    <td className="mut first">{profile.first.map((one) => one.slice(0, 30)).join(', ')}</td>
                    <td>{becomes(profile)}</td>
                    <td>
                      {reason && (
                        <StatusBadge
                          tone={reason.tone}
                          icon={
                            reason.tone === 'moss' ? 'check' : reason.tone === 'weld' ? 'warning' : undefined
                          }
                        >
                          {reason.text}
                        </StatusBadge>
                      )}
                    </td>
                  </tr>
                );
              })}
          </tbody>
        </table>
      </div>
    </Card>
  );
}

const OUT = 'out';

/** The field that a column of a ties file or of changed ids becomes. */
export function FieldSelect<F extends string>({
  column,
  fields,
  match,
  onChange,
}: {
  column: string;
  fields: readonly (readonly [F, string])[];
  match: Partial<Record<F, string>>;
  onChange: (match: Partial<Record<F, string>>) => void;
}) {
  const value = fields.find(([field]) => match[field] === column)?.[0] ?? OUT;
  return (
    <Select
      label={`What ${column} becomes`}
      labelPlace="hidden"
      size="small"
      value={value as F | typeof OUT}
      options={[...fields.map(([id, label]) => ({ id, label })), { id: OUT, label: 'Leave out' }]}
      onChange={(next) => {
        const rest = Object.fromEntries(
          Object.entries(match).filter(([field, one]) => one !== column && field !== next),
        ) as Partial<Record<F, string>>;
        onChange(next === OUT ? rest : { ...rest, [next]: column });
      }}
    />
  );
}
