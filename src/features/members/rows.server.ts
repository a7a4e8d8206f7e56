import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { ProblemError } from '@/lib/problem';
import { sequelize } from '@/server/models';
import type { SharedSnapshot } from '@/features/views/index.server';
import { memberCode } from './codes.server';
import { Binds, resolveFields, type FieldSql } from './fields.server';
import { filterFields, filterSql } from './filters.server';
import { maskedGroups } from './masks.server';
import type { MemberRow, MembersPage, MembersQuery } from './members';

interface RawRow {
  member_id: string;
  external_id: string;
  name: string | null;
  ordinal: number;
  [column: string]: unknown;
}

const decodeCursor = (cursor: string | undefined): number => {
  if (!cursor) return 0;
  const offset = Number(Buffer.from(cursor, 'base64url').toString('utf8').replace(/^o/, ''));
  if (!Number.isInteger(offset) || offset < 0)
    throw new ProblemError(400, 'malformed', 'Please check what was sent.', 'The cursor is not one of ours.');
  return offset;
};
const encodeCursor = (offset: number): string => Buffer.from(`o${offset}`).toString('base64url');

interface Plan {
  readonly fields: ReadonlyMap<string, FieldSql>;
  readonly from: string;
  readonly order: string;
  readonly binds: Binds;
}

async function plan({ snapshot, access, through }: SharedSnapshot, query: MembersQuery): Promise<Plan> {
  const binds = new Binds();
  const filters = [...query.filter, ...(through?.filters ?? [])];
  const wanted = [...query.columns, ...filterFields(filters), ...(query.sort ? [query.sort.field] : [])];
  const fields = await resolveFields(snapshot, wanted, binds, through?.fields ?? null);
  const snapshotBind = binds.add(snapshot.id);
  const where = filters.map((filter) => `(${filterSql(filter, fields, binds, snapshotBind, access.names)})`);
  const joins = [...fields.values()].map((field) => field.join).filter(Boolean);
  const sortField =
    query.sort && (query.sort.field !== 'name' || access.names) ? fields.get(query.sort.field) : undefined;
  const order = sortField
    ? `${sortField.value} ${query.sort!.descending ? 'DESC' : 'ASC'} NULLS LAST, m.ordinal`
    : 'm.ordinal';
  return {
    fields,
    binds,
    order,
    from: `FROM snapshot_members m ${joins.join(' ')} WHERE m.snapshot_id = ${snapshotBind}${where.map((one) => ` AND ${one}`).join('')}`,
  };
}

function presenter(
  actor: Actor,
  shared: SharedSnapshot,
  query: MembersQuery,
  fields: ReadonlyMap<string, FieldSql>,
  masked: ReadonlyMap<string, Set<number>>,
) {
  const { names } = shared.access;
  const order = [...fields.keys()];
  return (row: RawRow): MemberRow => {
    const values: MemberRow['values'] = {};
    for (const column of query.columns) {
      const value = row[`v${order.indexOf(column)}`] as number | string | null;
      const hidden = (column === 'name' && !names) || masked.get(column)?.has(value as number);
      values[column] = hidden ? null : (value ?? null);
    }
    return {
      id: row.member_id,
      externalId: names ? row.external_id : null,
      name: names ? (row.name ?? row.external_id) : null,
      code: names ? null : memberCode(actor.userId, row.member_id),
      ordinal: row.ordinal,
      values,
      filled: query.columns.filter((column) => row[`w${order.indexOf(column)}`] === true),
    };
  };
}

/**
 * One page of the members table. The total counts everyone who passes the filters.
 * @param shared snapshot with what this person may see of it
 */
export async function memberRows(
  actor: Actor,
  shared: SharedSnapshot,
  query: MembersQuery,
): Promise<MembersPage> {
  const { fields, from, order, binds } = await plan(shared, query);
  const [count] = await sequelize.query<{ total: number }>(`SELECT count(*)::int AS total ${from}`, {
    bind: binds.values,
    type: QueryTypes.SELECT,
  });
  const offset = decodeCursor(query.cursor);
  const rows = await selectRows(fields, from, order, binds.values, query.limit, offset);
  const present = presenter(actor, shared, query, fields, await maskedGroups(shared, query.columns));
  const total = count?.total ?? 0;
  const next = offset + rows.length;
  return {
    items: rows.map(present),
    total,
    nextCursor: next < total && rows.length > 0 ? encodeCursor(next) : null,
  };
}

const selectRows = (
  fields: ReadonlyMap<string, FieldSql>,
  from: string,
  order: string,
  bind: unknown[],
  limit: number,
  offset: number,
): Promise<RawRow[]> => {
  const columns = [...fields.values()]
    .map(
      (field, index) =>
        `, ${field.value} AS v${index}${field.filled ? `, ${field.filled} AS w${index}` : ''}`,
    )
    .join('');
  const tail = ` ORDER BY ${order} LIMIT $${bind.length + 1} OFFSET $${bind.length + 2}`;
  return sequelize.query<RawRow>(
    `SELECT m.member_id, m.external_id, m.name, m.ordinal${columns} ${from}${tail}`,
    {
      bind: [...bind, limit, offset],
      type: QueryTypes.SELECT,
    },
  );
};

const CHUNK = 5_000;

/** All rows of a query, chunk by chunk, with what its columns are called and hold: for exports. */
export async function allMemberRows(
  actor: Actor,
  shared: SharedSnapshot,
  query: MembersQuery,
): Promise<{ columns: { title: string; label: boolean }[]; chunks: AsyncGenerator<MemberRow[]> }> {
  const { fields, from, order, binds } = await plan(shared, query);
  const present = presenter(actor, shared, query, fields, await maskedGroups(shared, query.columns));
  async function* chunks(): AsyncGenerator<MemberRow[]> {
    for (let offset = 0; ; offset += CHUNK) {
      const rows = await selectRows(fields, from, order, binds.values, CHUNK, offset);
      if (rows.length > 0) yield rows.map(present);
      if (rows.length < CHUNK) return;
    }
  }
  return {
    columns: query.columns.map((column) => {
      const { title, label } = fields.get(column)!;
      return { title, label };
    }),
    chunks: chunks(),
  };
}
