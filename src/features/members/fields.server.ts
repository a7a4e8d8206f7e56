import { Attribute, Grouping, Reading, type Snapshot } from '@/server/models';
import { forbidden, unprocessable } from '@/lib/problem';

/** How one field is read in SQL. Every id in it is a bound parameter; nothing from a request is spliced in. */
export interface FieldSql {
  readonly field: string;
  /** Join that brings the row in, or nothing for columns of the member itself. */
  readonly join: string;
  /** Value expression. */
  readonly value: string;
  readonly label: boolean;
  /** True where the value was filled in by a reading rather than recorded. */
  readonly filled?: string;
  /** Name of the column for people, as in a table head or an export. */
  readonly title: string;
}

const READING_COLUMNS = { smoothed: 'smoothed', departure: 'departure', z: 'z', q: 'q' } as const;
const READING_TITLES = {
  smoothed: 'smoothed',
  departure: 'departure',
  z: 'z',
  q: 'chance of a false flag (q)',
} as const;

/** Collects bound parameters and numbers them. */
export class Binds {
  readonly values: unknown[] = [];
  add(value: unknown): string {
    this.values.push(value);
    return `$${this.values.length}`;
  }
}

/**
 * Resolves field names against one snapshot: an attribute, reading or grouping of another snapshot is refused.
 * @param allowed fields that a shared view lets through, or null for all
 */
export async function resolveFields(
  snapshot: Snapshot,
  names: Iterable<string>,
  binds: Binds,
  allowed: ReadonlySet<string> | null,
): Promise<Map<string, FieldSql>> {
  const fields = new Map<string, FieldSql>();
  for (const field of names) {
    if (fields.has(field)) continue;
    if (allowed && field !== 'name' && !allowed.has(field))
      throw forbidden('The shared view does not show this.');
    fields.set(field, await resolveField(snapshot, field, fields.size, binds));
  }
  return fields;
}

async function resolveField(
  snapshot: Snapshot,
  field: string,
  index: number,
  binds: Binds,
): Promise<FieldSql> {
  const own = (value: string, title: string): FieldSql => ({ field, join: '', value, label: false, title });
  if (field === 'degree') return own('m.degree', 'ties');
  if (field === 'strength') return own('m.strength', 'tie strength');
  if (field === 'name') return { ...own('coalesce(m.name, m.external_id)', 'name'), label: true };
  const [kind, id] = field.split(':') as [string, string];
  const alias = `f${index}`;
  const unknown = (): Error => unprocessable('unknown-field', `There is no ${field} on this snapshot.`);
  if (kind === 'attribute') {
    const attribute = await Attribute.findOne({ where: { id, snapshotId: snapshot.id } });
    if (!attribute) throw unknown();
    const label = attribute.type === 'label';
    return {
      field,
      join: `LEFT JOIN attribute_values ${alias} ON ${alias}.attribute_id = ${binds.add(id)} AND ${alias}.ordinal = m.ordinal`,
      value: label ? `${alias}.label` : `${alias}.value`,
      label,
      title: attribute.name,
    };
  }
  if (kind === 'group') {
    const grouping = await Grouping.findOne({ where: { id, snapshotId: snapshot.id, state: 'ready' } });
    if (!grouping) throw unknown();
    return {
      field,
      join: `LEFT JOIN grouping_members ${alias} ON ${alias}.grouping_id = ${binds.add(id)} AND ${alias}.ordinal = m.ordinal`,
      value: `${alias}.group_index`,
      label: false,
      title: grouping.name,
    };
  }
  const reading = await Reading.findOne({ where: { id, snapshotId: snapshot.id, state: 'ready' } });
  const column = READING_COLUMNS[kind as keyof typeof READING_COLUMNS];
  if (!reading || !column) throw unknown();
  return {
    field,
    join: `LEFT JOIN reading_members ${alias} ON ${alias}.reading_id = ${binds.add(id)} AND ${alias}.ordinal = m.ordinal`,
    value: `${alias}.${column}`,
    label: false,
    ...(kind === 'smoothed' ? { filled: `NOT ${alias}.observed` } : {}),
    title: `${reading.attribute}, ${READING_TITLES[kind as keyof typeof READING_TITLES]}`,
  };
}
