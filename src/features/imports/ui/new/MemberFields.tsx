import { Checkbox, NumberInput, PopoverButton, Select, TextInput } from '@/components/ui';
import type { AttributeMatch, As, MemberMatch } from './match';

type Becomes = 'id' | 'name' | As | 'out';

const CHOICES: readonly { id: Becomes; label: string }[] = [
  { id: 'id', label: 'Member id' },
  { id: 'name', label: 'Name' },
  { id: 'number', label: 'Score or count' },
  { id: 'label', label: 'Label' },
  { id: 'date', label: 'Months since a date' },
  { id: 'out', label: 'Leave out' },
];

/** What a column of the members file becomes, and the particulars of an attribute. */
export function MemberFields({
  column,
  columns,
  match,
  onChange,
}: {
  column: string;
  /** All columns, for the count behind a score. */
  columns: readonly string[];
  match: MemberMatch;
  onChange: (match: MemberMatch) => void;
}) {
  const attribute = match.attributes.find((one) => one.column === column);
  const value: Becomes =
    match.id === column ? 'id' : match.name === column ? 'name' : (attribute?.as ?? 'out');
  const become = (next: Becomes): void => {
    const others = {
      id: match.id === column ? null : match.id,
      name: match.name === column ? null : match.name,
      attributes: match.attributes.filter((one) => one.column !== column),
    };
    if (next === 'id' || next === 'name') return onChange({ ...others, [next]: column });
    if (next === 'out') return onChange(others);
    const base: AttributeMatch = attribute ?? {
      column,
      name: column,
      as: next,
      direction: 'neither',
      sensitive: false,
      countColumn: null,
      least: null,
      most: null,
    };
    const made = { ...base, as: next };
    const order = new Map(columns.map((one, i) => [one, i]));
    onChange({
      ...others,
      attributes: [...others.attributes, made].sort(
        (a, b) => (order.get(a.column) ?? 0) - (order.get(b.column) ?? 0),
      ),
    });
  };
  const set = (change: Partial<AttributeMatch>): void =>
    onChange({
      ...match,
      attributes: match.attributes.map((one) => (one.column === column ? { ...one, ...change } : one)),
    });
  return (
    <span className="row wrap" style={{ gap: 8 }}>
      <Select
        label={`What ${column} becomes`}
        labelPlace="hidden"
        size="small"
        value={value}
        options={CHOICES}
        onChange={become}
      />
      {attribute && (
        <PopoverButton
          label={`Particulars of ${column}`}
          trigger={summary(attribute)}
          size="small"
          look="quiet"
          width={290}
        >
          <Particulars attribute={attribute} columns={columns} onChange={set} />
        </PopoverButton>
      )}
    </span>
  );
}

const DIRECTION = {
  'higher-better': 'higher is better',
  'higher-worse': 'higher is worse',
  neither: '',
} as const;

function summary({ name, column, direction, sensitive, countColumn, least, most }: AttributeMatch): string {
  const range = least !== null || most !== null ? `${least ?? 'any'} to ${most ?? 'any'}` : '';
  const words = [
    name === column ? '' : name,
    DIRECTION[direction],
    range,
    sensitive ? 'sensitive' : '',
    countColumn ? `weighed by ${countColumn}` : '',
  ].filter(Boolean);
  return words.length > 0 ? words.join(', ') : 'More';
}

function Particulars({
  attribute,
  columns,
  onChange,
}: {
  attribute: AttributeMatch;
  columns: readonly string[];
  onChange: (change: Partial<AttributeMatch>) => void;
}) {
  const { column } = attribute;
  return (
    <div className="col" style={{ gap: 10, padding: 12 }}>
      <TextInput
        label="Name in Thrum"
        size="small"
        value={attribute.name}
        maxLength={120}
        onChange={(event) => onChange({ name: event.target.value })}
      />
      {attribute.as !== 'label' && (
        <Select
          label="Higher is"
          size="small"
          full
          value={attribute.direction}
          onChange={(direction) => onChange({ direction })}
          options={[
            { id: 'neither', label: 'neither better nor worse' },
            { id: 'higher-better', label: 'better' },
            { id: 'higher-worse', label: 'worse' },
          ]}
        />
      )}
      {attribute.as === 'number' && (
        <>
          <div className="row" style={{ gap: 8 }}>
            <NumberInput
              label="Least"
              size="small"
              optional
              value={attribute.least}
              onChange={(least) => onChange({ least })}
            />
            <NumberInput
              label="Most"
              size="small"
              optional
              value={attribute.most}
              onChange={(most) => onChange({ most })}
            />
          </div>
          <Select
            label="Count behind each score"
            size="small"
            full
            value={attribute.countColumn ?? ''}
            onChange={(next) => onChange({ countColumn: next || null })}
            options={[
              { id: '', label: 'None: all weigh the same' },
              ...columns
                .filter((one) => one !== column && one !== '')
                .map((one) => ({ id: one, label: one })),
            ]}
          />
        </>
      )}
      <Checkbox
        label="Sensitive"
        hint="Health, belief, origin and the like: never used for cases."
        checked={attribute.sensitive}
        onChange={(sensitive) => onChange({ sensitive })}
      />
    </div>
  );
}
