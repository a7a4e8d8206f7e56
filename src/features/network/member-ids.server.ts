import { QueryTypes, UniqueConstraintError, type Transaction } from 'sequelize';
import { conflict } from '@/lib/problem';
import { newId, sequelize } from '@/server/models';
import { chunks, slice } from './chunks';

interface Members {
  readonly communityId: string;
  readonly ids: readonly string[];
  readonly formerOf: ReadonlyMap<string, string>;
}

/** Members of a community among these external ids. */
async function known(
  communityId: string,
  ids: readonly string[],
  transaction: Transaction,
): Promise<Map<string, string>> {
  const found = new Map<string, string>();
  for (const { from, count } of chunks(ids.length)) {
    const rows = await sequelize.query<{ id: string; external_id: string }>(
      'SELECT id, external_id FROM community_members WHERE community_id = $1 AND external_id = ANY($2)',
      { bind: [communityId, ids.slice(from, from + count)], type: QueryTypes.SELECT, transaction },
    );
    for (const row of rows) found.set(row.external_id, row.id);
  }
  return found;
}

/** Members whose id changed, by place: those known by their former id, whose present one is nobody else's. */
async function renamed(
  { communityId, ids, formerOf }: Members,
  transaction: Transaction,
): Promise<Map<number, string>> {
  const pairs = ids.flatMap((id, place) => {
    const former = formerOf.get(id);
    return former === undefined ? [] : [{ place, id, former }];
  });
  const there = await known(
    communityId,
    [...new Set(pairs.flatMap((one) => [one.id, one.former]))],
    transaction,
  );
  const formers = new Set(formerOf.values());
  const found = new Map<number, string>();
  for (const { place, id, former } of pairs) {
    const member = there.get(former);
    if (member !== undefined && (!there.has(id) || formers.has(id))) found.set(place, member);
  }
  return found;
}

/** Ids of members by external id: known ones keep theirs, also under a changed external id; new ones get one. */
export async function memberIds(members: Members, transaction: Transaction): Promise<string[]> {
  const { communityId, ids } = members;
  const result = new Array<string>(ids.length);
  const changed = members.formerOf.size > 0 ? await renamed(members, transaction) : new Map<number, string>();
  for (const { from, count } of chunks(ids.length)) {
    const places = slice(from, count, (i) => i).filter((i) => !changed.has(i));
    const external = places.map((i) => ids[i]!);
    await sequelize.query(
      `INSERT INTO community_members (id, community_id, external_id)
       SELECT id, $1, external_id FROM unnest($2::uuid[], $3::text[]) AS new(id, external_id)
       ON CONFLICT (community_id, external_id) DO NOTHING`,
      { bind: [communityId, external.map(() => newId()), external], transaction },
    );
    const rows = await sequelize.query<{ id: string; place: number }>(
      `SELECT m.id, (asked.place - 1)::int AS place FROM unnest($2::text[]) WITH ORDINALITY AS asked(external_id, place)
       JOIN community_members m ON m.community_id = $1 AND m.external_id = asked.external_id`,
      { bind: [communityId, external], type: QueryTypes.SELECT, transaction },
    );
    for (const row of rows) result[places[row.place]!] = row.id;
  }
  for (const [place, id] of changed) result[place] = id;
  return result;
}

/**
 * Makes the external ids of an accepted snapshot those by which its members are known from now on. Earlier snapshots
 * keep theirs, as they were loaded.
 * @throws ProblemError 409 when another import has given one of the ids to somebody else meanwhile
 */
export async function settleIds(snapshotId: string, transaction: Transaction): Promise<void> {
  const moved = await sequelize.query<{ id: string; external_id: string }>(
    `SELECT m.id, s.external_id FROM snapshot_members s JOIN community_members m ON m.id = s.member_id
     WHERE s.snapshot_id = $1 AND m.external_id <> s.external_id`,
    { bind: [snapshotId], type: QueryTypes.SELECT, transaction },
  );
  if (moved.length === 0) return;
  const set = (value: string, bind: unknown[]) =>
    sequelize.query(`UPDATE community_members m SET external_id = ${value}`, { bind, transaction });
  try {
    // By way of names that nobody has, so that two members can trade theirs.
    await set(`'moving ' || m.id FROM unnest($1::uuid[]) AS moved(id) WHERE m.id = moved.id`, [
      moved.map((one) => one.id),
    ]);
    await set(
      `moved.external_id FROM unnest($1::uuid[], $2::text[]) AS moved(id, external_id) WHERE m.id = moved.id`,
      [moved.map((one) => one.id), moved.map((one) => one.external_id)],
    );
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw conflict(
      'id-taken',
      'Another import has meanwhile given one of the changed ids to somebody else. Discard this one and load it again.',
    );
  }
}
