import { ROLES, type Actor, type Role } from '@/lib/actor';
import { actorOf } from './call';

export interface WalkFixture {
  readonly params: Record<string, string>;
  readonly actors: Record<Role, Actor>;
  readonly otherWorkspaceId: string;
  /** Words that must never appear in a refused answer. */
  readonly secrets: readonly string[];
  /** Brings back what an earlier visit removed or changed. */
  restore(): Promise<void>;
}

/** One workspace with one of everything, a person of each role, and another workspace beside it. */
export async function makeWalkFixture(): Promise<WalkFixture> {
  const m = await import('@/server/models');
  const id = m.newId;
  const workspaceId = id();
  const otherWorkspaceId = id();
  await m.Workspace.bulkCreate([
    { id: workspaceId, name: 'Secret Estuary' },
    { id: otherWorkspaceId, name: 'Elsewhere' },
  ]);
  await m.User.bulkCreate(
    [...ROLES, 'foreign-owner', 'stranger', 'removable'].map((name) => ({
      id: `user-${name}`,
      name: `Person ${name}`,
      email: `${name}@test.example`,
      emailVerified: true,
    })),
  );
  const membershipId = id();
  await m.Membership.bulkCreate([
    ...ROLES.map((role) => ({ workspaceId, userId: `user-${role}`, role })),
    { workspaceId: otherWorkspaceId, userId: 'user-foreign-owner', role: 'owner' as const },
    { id: membershipId, workspaceId, userId: 'user-removable', role: 'viewer' as const },
  ]);
  const common = { workspaceId };
  const community = await m.Community.create({ ...common, name: 'Secret Growers' });
  const imported = await m.Import.create({
    ...common,
    communityId: community.id,
    state: 'accepted',
    options: {},
    files: [],
    fingerprint: 'walk',
  });
  const snapshot = await m.Snapshot.create({
    ...common,
    communityId: community.id,
    importId: imported.id,
    takenOn: '2026-11-28',
    label: 'Secret snapshot',
    state: 'ready',
    members: 2,
    ties: 1,
    totalWeight: 1,
    components: 1,
    largestComponent: 2,
    isolated: 0,
  });
  const people = await m.CommunityMember.bulkCreate(
    ['secret-fern', 'secret-reed'].map((externalId) => ({ communityId: community.id, externalId })),
  );
  await m.SnapshotMember.bulkCreate(
    people.map((person, ordinal) => ({
      snapshotId: snapshot.id,
      ordinal,
      memberId: person.id,
      externalId: person.externalId,
      component: 0,
      degree: 1,
      strength: 1,
      x: ordinal,
      y: 0,
    })),
  );
  await m.Tie.create({ snapshotId: snapshot.id, source: 0, target: 1, weight: 1, count: 1 });
  const { saveArray, savePicture } = await import('@/features/network/index.server');
  await m.sequelize.transaction(async (t) => {
    const arrays = {
      offsets: Int32Array.of(0, 1, 2),
      targets: Int32Array.of(1, 0),
      weights: Float64Array.of(1, 1),
      strength: Float64Array.of(1, 1),
      x: Float32Array.of(0, 1),
      y: Float32Array.of(0, 0),
      component: Int32Array.of(0, 0),
    };
    for (const [name, values] of Object.entries(arrays)) await saveArray(snapshot.id, name, values, t);
    const network = {
      n: 2,
      offsets: arrays.offsets,
      targets: arrays.targets,
      weights: arrays.weights,
      strength: arrays.strength,
    };
    const tie = { sources: Int32Array.of(0), targets: Int32Array.of(1), weights: Float64Array.of(1) };
    await savePicture(
      snapshot.id,
      { network, x: arrays.x, y: arrays.y, component: arrays.component },
      tie,
      t,
    );
  });
  const attribute = await m.Attribute.create({
    snapshotId: snapshot.id,
    ordinal: 0,
    name: 'Secret score',
    type: 'number',
    observed: 2,
    summary: {},
  });
  await m.AttributeValue.bulkCreate(
    [0, 1].map((ordinal) => ({ attributeId: attribute.id, ordinal, value: 3 + ordinal })),
  );
  await m.sequelize.transaction((t) =>
    saveArray(snapshot.id, `attribute:${attribute.id}`, Float64Array.of(3, 4), t),
  );
  const analysis = {
    ...common,
    communityId: community.id,
    snapshotId: snapshot.id,
    options: {},
    seed: 1,
    version: '0',
    state: 'ready' as const,
  };
  const grouping = await m.Grouping.create({
    ...analysis,
    name: 'Secret grouping',
    method: 'fiedler',
    laplacian: 'combinatorial',
    cut: 'sign',
    k: 2,
    result: { groups: [] },
  });
  await m.GroupingMember.bulkCreate(
    [0, 1].map((ordinal) => ({
      groupingId: grouping.id,
      ordinal,
      groupIndex: ordinal,
      vector: 0.5 - ordinal,
    })),
  );
  const reading = await m.Reading.create({
    ...analysis,
    attributeId: attribute.id,
    attribute: 'Secret score',
    filter: { kind: 'tikhonov', alpha: 1 },
    laplacian: 'combinatorial',
    result: {},
  });
  await m.ReadingMember.bulkCreate(
    [0, 1].map((ordinal) => ({
      readingId: reading.id,
      ordinal,
      value: 3 + ordinal,
      smoothed: 3.5,
      observed: true,
      tested: false,
      neighbours: 1,
    })),
  );
  const evidence = {
    attribute: 'Secret score',
    value: 3,
    predicted: 3.5,
    departure: -0.5,
    z: -1,
    p: 0.3,
    q: 0.3,
    neighbours: 1,
    localMoran: { z: 0, q: 1, quadrant: 'LH' },
    threshold: 0.1,
  };
  const opened = await m.Case.create({
    ...common,
    number: 1,
    communityId: community.id,
    snapshotId: snapshot.id,
    readingId: reading.id,
    memberId: people[0]!.id,
    ordinal: 0,
    evidence,
  });
  const job = await m.Job.create({
    ...common,
    kind: 'walk',
    targetId: 'walk',
    state: 'succeeded',
    createdBy: 'user-moderator',
  });
  const invitation = await m.Invitation.create({
    ...common,
    email: 'guest@test.example',
    role: 'viewer',
    tokenHash: 'walk',
    invitedBy: 'user-owner',
    expiresAt: new Date(Date.now() + 86_400_000),
  });
  const tokenId = id();
  const viewId = id();
  const shareId = id();
  const recipeId = id();
  const restore = async (): Promise<void> => {
    await m.View.findOrCreate({
      where: { id: viewId },
      defaults: {
        id: viewId,
        ...common,
        communityId: community.id,
        snapshotId: snapshot.id,
        name: 'Secret view',
        place: 'map',
        state: {},
        visibility: 'workspace',
        ownerId: 'user-analyst',
      },
    });
    await m.ViewShare.findOrCreate({
      where: { id: shareId },
      defaults: { id: shareId, viewId, role: 'viewer', createdBy: 'user-analyst' },
    });
    await m.Membership.findOrCreate({
      where: { id: membershipId },
      defaults: { id: membershipId, workspaceId, userId: 'user-removable', role: 'viewer' },
    });
    await m.ImportRecipe.findOrCreate({
      where: { id: recipeId },
      defaults: {
        id: recipeId,
        ...common,
        communityId: community.id,
        name: 'Secret recipe',
        options: {},
        createdBy: 'user-analyst',
      },
    });
    await m.ApiToken.findOrCreate({
      where: { id: tokenId },
      defaults: {
        id: tokenId,
        workspaceId,
        userId: 'user-admin',
        name: 'walk',
        tokenHash: 'walk',
        expiresAt: new Date(Date.now() + 86_400_000),
      },
    });
    await m.ApiToken.update({ revokedAt: null }, { where: { id: tokenId } });
    await m.Invitation.update({ revokedAt: null, acceptedAt: null }, { where: { id: invitation.id } });
  };
  await restore();
  return {
    otherWorkspaceId,
    restore,
    secrets: ['Secret', 'secret-fern', workspaceId, 'Person owner'],
    actors: Object.fromEntries(
      ROLES.map((role) => [role, actorOf(`user-${role}`, workspaceId, role)]),
    ) as Record<Role, Actor>,
    params: {
      workspace: workspaceId,
      community: community.id,
      import: imported.id,
      recipe: recipeId,
      snapshot: snapshot.id,
      member: people[0]!.id,
      attribute: attribute.id,
      grouping: grouping.id,
      reading: reading.id,
      case: opened.id,
      job: job.id,
      view: viewId,
      share: shareId,
      person: 'user-removable',
      membership: membershipId,
      invitation: invitation.id,
      token: tokenId,
    },
  };
}
