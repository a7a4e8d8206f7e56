import { actorOf } from '../integration/call';
import { makeReferenceWorld } from './reference-world';

/** Members past the threshold by ordinal, with their chance of a false flag, and one that the floor leaves out. */
export const APART = [
  { ordinal: 0, q: 0.004 },
  { ordinal: 2, q: 0.03 },
  { ordinal: 33, q: 0.08 },
] as const;
/** Far off, but with a single tie it is never tested: below the neighbour floor. */
export const BELOW_FLOOR = 11;

/**
 * The karate club (Zachary 1977, tests/reference/data/karate) with a finished reading of `score` whose flags are
 * set by hand, two moderators who work cases, and an analyst, a viewer and a stranger beside them.
 */
export async function makeCaseWorld() {
  const world = await makeReferenceWorld();
  const m = await import('@/server/models');
  const [first, second] = [m.newId(), m.newId()];
  await m.User.bulkCreate(
    [
      { id: first, name: 'Mara Moderator' },
      { id: second, name: 'Noor Moderator' },
    ].map((user) => ({ ...user, email: `${user.id}@test.example`, emailVerified: true })),
  );
  await m.Membership.bulkCreate([
    { workspaceId: world.workspaceId, userId: first, role: 'moderator' },
    { workspaceId: world.workspaceId, userId: second, role: 'moderator' },
    { workspaceId: world.workspaceId, userId: world.analyst.userId, role: 'analyst' },
  ]);
  const scores = world.reference.signals.score!;
  const degrees = world.reference.network.offsets;
  const makeReading = async (): Promise<string> => {
    const reading = await m.Reading.create({
      workspaceId: world.workspaceId,
      communityId: world.communityId,
      snapshotId: world.snapshotId,
      attributeId: world.attributes.score!,
      attribute: 'score',
      filter: { kind: 'tikhonov', alpha: 1 },
      laplacian: 'combinatorial',
      options: {},
      seed: 1,
      version: 'test',
      state: 'ready',
      result: { sigma: 0.5 },
    });
    await m.ReadingMember.bulkCreate(
      scores.map((value, ordinal) => {
        const neighbours = degrees[ordinal + 1]! - degrees[ordinal]!;
        const flagged = APART.find((one) => one.ordinal === ordinal);
        const tested = neighbours >= 3;
        return {
          readingId: reading.id,
          ordinal,
          value: value as number,
          smoothed: 0,
          departure: flagged || ordinal === BELOW_FLOOR ? -2 : 0.1,
          standardError: 0.2,
          observed: true,
          tested,
          neighbours,
          ...(tested ? { z: flagged ? -4 : 0.2, p: flagged?.q ?? 0.8, q: flagged?.q ?? 0.95 } : {}),
        };
      }),
    );
    return reading.id;
  };
  return {
    ...world,
    first: actorOf(first, world.workspaceId, 'moderator'),
    second: actorOf(second, world.workspaceId, 'moderator'),
    makeReading,
  };
}
export type CaseWorld = Awaited<ReturnType<typeof makeCaseWorld>>;
