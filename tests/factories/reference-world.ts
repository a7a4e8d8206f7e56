import { components } from '@/numerics';
import { loadReference, numericSignal, type Reference } from '../reference/load';
import { actorOf } from '../integration/call';

/** Where the reference network was put, and a person of each kind of interest. */
export interface ReferenceWorld {
  readonly reference: Reference;
  readonly workspaceId: string;
  readonly communityId: string;
  readonly snapshotId: string;
  /** Attribute ids by name: `score`, `score_missing` (numbers) and `club` (labels). */
  readonly attributes: Readonly<Record<string, string>>;
  readonly analyst: ReturnType<typeof actorOf>;
  readonly viewer: ReturnType<typeof actorOf>;
  readonly stranger: ReturnType<typeof actorOf>;
}

/**
 * One workspace with a reference network as its only snapshot: the karate club (Zachary 1977) unless another is
 * named. Rows and packed arrays are written as an import writes them.
 */
export async function makeReferenceWorld(name = 'karate'): Promise<ReferenceWorld> {
  // Loaded late: the models connect to the database that the test file has made.
  const m = await import('@/server/models');
  const { saveArray } = await import('@/features/network/index.server');
  const { newId } = m;
  const reference = loadReference(name);
  const { network: net } = reference;
  const [workspaceId, elsewhere] = [newId(), newId()];
  await m.Workspace.bulkCreate([
    { id: workspaceId, name: 'Reference' },
    { id: elsewhere, name: 'Elsewhere' },
  ]);
  const analystId = newId();
  await m.User.create({
    id: analystId,
    name: 'Ada Analyst',
    email: `${analystId}@test.example`,
    emailVerified: true,
  });
  const community = await m.Community.create({ workspaceId, name });
  const parts = components(net);
  const snapshot = await m.Snapshot.create({
    workspaceId,
    communityId: community.id,
    takenOn: '2026-11-28',
    label: name,
    state: 'ready',
    members: net.n,
    ties: reference.m,
    totalWeight: net.strength.reduce((sum, d) => sum + d, 0) / 2,
    components: parts.count,
    largestComponent: parts.sizes[parts.largest]!,
    isolated: net.strength.filter((d) => d === 0).length,
  });
  const members = await m.CommunityMember.bulkCreate(
    reference.ids.map((externalId) => ({ communityId: community.id, externalId })),
  );
  await m.SnapshotMember.bulkCreate(
    members.map((member, ordinal) => ({
      snapshotId: snapshot.id,
      ordinal,
      memberId: member.id,
      externalId: member.externalId,
      component: parts.labels[ordinal]!,
      degree: net.offsets[ordinal + 1]! - net.offsets[ordinal]!,
      strength: net.strength[ordinal]!,
      x: 0,
      y: 0,
    })),
  );
  await m.Tie.bulkCreate(
    reference.edges.map(([source, target, weight]) => ({
      snapshotId: snapshot.id,
      source,
      target,
      weight,
      count: 1,
    })),
  );
  const attributes: Record<string, string> = {};
  const packed: [string, Int32Array | Float64Array][] = [
    ['offsets', net.offsets],
    ['targets', net.targets],
    ['weights', net.weights],
    ['strength', net.strength],
  ];
  let ordinal = 0;
  for (const [signal, values] of Object.entries(reference.signals)) {
    const label = values.some((value) => typeof value === 'string');
    const attribute = await m.Attribute.create({
      snapshotId: snapshot.id,
      ordinal: ordinal++,
      name: signal,
      type: label ? 'label' : 'number',
      observed: values.filter((value) => value !== null).length,
      summary: {},
    });
    attributes[signal] = attribute.id;
    await m.AttributeValue.bulkCreate(
      values.map((value, member) => ({
        attributeId: attribute.id,
        ordinal: member,
        ...(typeof value === 'string' ? { label: value } : { value }),
      })),
    );
    if (!label) packed.push([`attribute:${attribute.id}`, numericSignal(reference, signal)]);
  }
  await m.sequelize.transaction(async (transaction) => {
    for (const [array, values] of packed) await saveArray(snapshot.id, array, values, transaction);
  });
  return {
    reference,
    workspaceId,
    communityId: community.id,
    snapshotId: snapshot.id,
    attributes,
    analyst: actorOf(analystId, workspaceId, 'analyst'),
    viewer: actorOf(newId(), workspaceId, 'viewer'),
    stranger: actorOf(newId(), elsewhere, 'owner'),
  };
}
