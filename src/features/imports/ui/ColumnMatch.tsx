import { Card, Checkbox, Select, TextInput } from '@/components/ui';
import type { Preview } from './preview';

export interface TieMatch {
  source?: string | undefined;
  target?: string | undefined;
  weight?: string | undefined;
  kind?: string | undefined;
  time?: string | undefined;
}
export interface AttributeMatch {
  readonly column: string;
  readonly name: string;
  readonly use: boolean;
  readonly direction: 'higher-better' | 'higher-worse' | 'neither';
  readonly sensitive: boolean;
}
export interface MemberMatch {
  readonly id?: string | undefined;
  readonly name?: string | undefined;
  readonly attributes: readonly AttributeMatch[];
}

type Props = { chosen: { file: File; preview: Preview } } & (
  | { role: 'ties'; ties: TieMatch; onTies: (match: TieMatch) => void }
  | { role: 'members'; members: MemberMatch; onMembers: (match: MemberMatch) => void }
);

const TIE_FIELDS = [
  ['source', 'From'],
  ['target', 'To'],
  ['weight', 'Weight'],
  ['kind', 'Kind'],
  ['time', 'Date'],
] as const;

/** One file: what its columns become, and its first rows. */
export function ColumnMatch(props: Props) {
  const { file, preview } = props.chosen;
  const options = [
    { id: '', label: 'Leave out' },
    ...preview.headers.filter(Boolean).map((header) => ({ id: header, label: header })),
  ];
  return (
    <Card title={file.name} aside={props.role === 'ties' ? 'ties' : 'members'}>
      {preview.note && <p className="small ink2">{preview.note}</p>}
      {preview.headers.length > 0 && props.role === 'ties' && (
        <div className="row wrap" style={{ gap: 14 }}>
          {TIE_FIELDS.map(([field, label]) => (
            <Select
              key={field}
              label={label}
              options={options}
              value={props.ties[field] ?? ''}
              onChange={(column) => props.onTies({ ...props.ties, [field]: column || undefined })}
            />
          ))}
        </div>
      )}
      {preview.headers.length > 0 && props.role === 'members' && (
        <MemberFields options={options} match={props.members} onChange={props.onMembers} />
      )}
      {preview.rows.length > 0 && (
        <div
          className="tw"
          tabIndex={0}
          role="region"
          aria-label={`First rows of ${file.name}`}
          style={{ marginTop: 14 }}
        >
          <table className="tbl">
            <thead>
              <tr>
                {preview.headers.map((header, i) => (
                  <th key={i} scope="col">
                    {header}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {preview.rows.map((row, r) => (
                <tr key={r}>
                  {preview.headers.map((_, i) => (
                    <td key={i}>{row[i] === '' ? <span className="mut">blank</span> : row[i]}</td>
                  ))}
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
    </Card>
  );
}

function MemberFields({
  options,
  match,
  onChange,
}: {
  options: { id: string; label: string }[];
  match: MemberMatch;
  onChange: (match: MemberMatch) => void;
}) {
  const set = (index: number, change: Partial<AttributeMatch>): void =>
    onChange({
      ...match,
      attributes: match.attributes.map((one, i) => (i === index ? { ...one, ...change } : one)),
    });
  return (
    <>
      <div className="row wrap" style={{ gap: 14 }}>
        <Select
          label="Member id"
          options={options}
          value={match.id ?? ''}
          onChange={(id) => onChange({ ...match, id: id || undefined })}
        />
        <Select
          label="Name"
          options={options}
          value={match.name ?? ''}
          onChange={(name) => onChange({ ...match, name: name || undefined })}
        />
      </div>
      <div className="tw" tabIndex={0} role="region" aria-label="Attributes" style={{ marginTop: 12 }}>
        <table className="tbl">
          <thead>
            <tr>
              <th scope="col">Column in file</th>
              <th scope="col">Becomes</th>
              <th scope="col">Higher is</th>
              <th scope="col">Sensitive</th>
            </tr>
          </thead>
          <tbody>
            {match.attributes.map((one, i) => (
              <tr key={one.column}>
                <th scope="row">
                  <Checkbox label={one.column} checked={one.use} onChange={(use) => set(i, { use })} />
                </th>
                <td>
                  <TextInput
                    label={`Name of ${one.column}`}
                    hideLabel
                    size="small"
                    value={one.name}
                    maxLength={120}
                    onChange={(event) => set(i, { name: event.target.value })}
                  />
                </td>
                <td>
                  <Select
                    label={`Direction of ${one.column}`}
                    labelPlace="hidden"
                    size="small"
                    value={one.direction}
                    onChange={(direction) => set(i, { direction })}
                    options={[
                      { id: 'neither', label: 'neither' },
                      { id: 'higher-better', label: 'better' },
                      { id: 'higher-worse', label: 'worse' },
                    ]}
                  />
                </td>
                <td>
                  <Checkbox
                    label={`${one.column} is sensitive`}
                    hideLabel
                    checked={one.sensitive}
                    onChange={(sensitive) => set(i, { sensitive })}
                  />
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </>
  );
}
