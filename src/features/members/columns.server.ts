import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { sequelize } from '@/server/models';
import type { SharedSnapshot } from '@/features/views/index.server';
import type { Filter } from '@/features/views';
import { memberCode } from './codes.server';
import { Binds, resolveFields } from './fields.server';
import { filterFields, filterSql } from './filters.server';
import { maskedGroups } from './masks.server';
import type { Handles } from './members';

export interface Column {
  /** One number a member, NaN where there is none; for labels their place in `labels`. */
  readonly values: Float64Array<ArrayBuffer>;
  readonly labels: readonly string[] | null;
}

/** One field of every member, in member order, with small groups masked for viewers. */
export async function memberColumn(shared: SharedSnapshot, field: string): Promise<Column> {
  const binds = new Binds();
  const fields = await resolveFields(shared.snapshot, [field], binds, shared.through?.fields ?? null);
  const { join, value, label } = fields.get(field)!;
  const rows = await sequelize.query<{ ordinal: number; value: number | string | null }>(
    `SELECT m.ordinal, ${value} AS value FROM snapshot_members m ${join} WHERE m.snapshot_id = ${binds.add(shared.snapshot.id)}`,
    { bind: binds.values, type: QueryTypes.SELECT },
  );
  const masked = (await maskedGroups(shared, [field])).get(field);
  const values = new Float64Array(shared.snapshot.members).fill(NaN);
  const labels = label
    ? [...new Set(rows.flatMap((row) => (row.value === null ? [] : [String(row.value)])))].sort()
    : null;
  const placeOf = new Map(labels?.map((one, index) => [one, index]));
  for (const row of rows) {
    if (row.value === null || masked?.has(row.value as number)) continue;
    values[row.ordinal] = label ? placeOf.get(String(row.value))! : (row.value as number);
  }
  return { values, labels };
}

/** Ids with names, or with this viewer's codes where names are hidden, in member order. */
export async function memberHandles(actor: Actor, shared: SharedSnapshot): Promise<Handles> {
  const rows = await sequelize.query<{ member_id: string; name: string }>(
    'SELECT member_id, coalesce(name, external_id) AS name FROM snapshot_members WHERE snapshot_id = $1 ORDER BY ordinal',
    { bind: [shared.snapshot.id], type: QueryTypes.SELECT },
  );
  const { names } = shared.access;
  return {
    ids: rows.map((row) => row.member_id),
    names: rows.map((row) => (names ? row.name : memberCode(actor.userId, row.member_id))),
  };
}

/** 1 for every member who passes all filters, 0 for the rest, in member order. */
export async function matchingMembers(
  shared: SharedSnapshot,
  asked: readonly Filter[],
): Promise<Uint8Array<ArrayBuffer>> {
  const binds = new Binds();
  const filters = [...asked, ...(shared.through?.filters ?? [])];
  const fields = await resolveFields(
    shared.snapshot,
    filterFields(filters),
    binds,
    shared.through?.fields ?? null,
  );
  const snapshotBind = binds.add(shared.snapshot.id);
  const where = filters.map(
    (filter) => ` AND (${filterSql(filter, fields, binds, snapshotBind, shared.access.names)})`,
  );
  const joins = [...fields.values()].map((field) => field.join).join(' ');
  const rows = await sequelize.query<{ ordinal: number }>(
    `SELECT m.ordinal FROM snapshot_members m ${joins} WHERE m.snapshot_id = ${snapshotBind}${where.join('')}`,
    { bind: binds.values, type: QueryTypes.SELECT },
  );
  const mask = new Uint8Array(shared.snapshot.members);
  for (const row of rows) mask[row.ordinal] = 1;
  return mask;
}
