import type { Filter } from '@/features/views';
import type { Binds, FieldSql } from './fields.server';

/** Field names that a list of filters needs. */
export const filterFields = (filters: readonly Filter[]): string[] =>
  filters.flatMap((filter) => {
    if (filter.kind === 'range' || filter.kind === 'missing') return [filter.field];
    if (filter.kind === 'group') return [`group:${filter.grouping}`];
    return filter.kind === 'label' ? [`attribute:${filter.attribute}`] : [];
  });

/** `%` and `_` of what a person typed are themselves, not wildcards. */
const literal = (text: string): string => text.replace(/[\\%_]/g, (sign) => `\\${sign}`);

/**
 * One SQL condition per filter over the member alias `m` and the joined fields.
 * @param names whether searching by name is allowed for this person
 */
export function filterSql(
  filter: Filter,
  fields: ReadonlyMap<string, FieldSql>,
  binds: Binds,
  snapshotBind: string,
  names: boolean,
): string {
  const value = (field: string): string => fields.get(field)!.value;
  switch (filter.kind) {
    case 'range': {
      const column = value(filter.field);
      const parts = [`${column} IS NOT NULL`];
      if (filter.low !== null) parts.push(`${column} >= ${binds.add(filter.low)}`);
      if (filter.high !== null) parts.push(`${column} <= ${binds.add(filter.high)}`);
      return parts.join(' AND ');
    }
    case 'missing':
      return `${value(filter.field)} IS ${filter.missing ? '' : 'NOT '}NULL`;
    case 'group':
      return `${value(`group:${filter.grouping}`)} = ANY(${binds.add(filter.groups)}::int[])`;
    case 'label':
      return `${value(`attribute:${filter.attribute}`)} = ANY(${binds.add(filter.labels)}::text[])`;
    case 'members':
      return `m.member_id = ANY(${binds.add(filter.members)}::uuid[])`;
    case 'search': {
      if (!names) return 'false';
      const pattern = binds.add(`%${literal(filter.text)}%`);
      return `(m.external_id ILIKE ${pattern} OR m.name ILIKE ${pattern})`;
    }
    case 'near':
      return `m.ordinal IN (
        WITH RECURSIVE walk(ordinal, steps) AS (
          SELECT s.ordinal, 0 FROM snapshot_members s WHERE s.snapshot_id = ${snapshotBind} AND s.member_id = ${binds.add(filter.member)}
          UNION
          SELECT CASE WHEN t.source = w.ordinal THEN t.target ELSE t.source END, w.steps + 1
          FROM walk w JOIN ties t ON t.snapshot_id = ${snapshotBind} AND (t.source = w.ordinal OR t.target = w.ordinal)
          WHERE w.steps < ${binds.add(filter.steps)})
        SELECT ordinal FROM walk)`;
  }
}
