import { createHash } from 'node:crypto';
import { Readable } from 'node:stream';
import { generateSaltmarsh, type SaltmarshSnapshot } from './seeders/saltmarsh';
import type { Actor, Role } from '@/lib/actor';
import { ensureDemoPeople } from '@/features/account/index.server';
import { decideCase, openCases } from '@/features/cases/index.server';
import { makeGroupingSchema } from '@/features/groupings/groupings';
import { makeGrouping } from '@/features/groupings/index.server';
import { importOptionsSchema, type ImportOptions } from '@/features/imports/imports';
import { makeImport } from '@/features/imports/index.server';
import { makeReadingSchema } from '@/features/readings/readings';
import { makeReading } from '@/features/readings/index.server';
import { viewStateSchema } from '@/features/views';
import { createView } from '@/features/views/index.server';
import { registry } from '@/jobs';
import {
  Case,
  Community,
  Job,
  Membership,
  newId,
  sequelize,
  Snapshot,
  View,
  Workspace,
  type ImportFile,
} from '@/server/models';
import { runJob } from '@/server/queue';
import { ensureBucket, putObject } from '@/server/storage';

/** Seeds the Saltmarsh demo through the product's own functions; what is there already is left alone. */
const WORKSPACE = 'Estuary Commons';
const COMMUNITY = 'Saltmarsh Growers’ Exchange';

const OPTIONS = {
  ties: { source: 'source', target: 'target', kind: 'kind', weight: 'count', time: 'last_date' },
  members: {
    id: 'member',
    attributes: [
      { column: 'helpfulness', name: 'Helpfulness', type: 'number', direction: 'higher-better' },
      {
        column: 'complaints_per_100',
        name: 'Complaints per 100 posts',
        type: 'number',
        direction: 'higher-worse',
      },
      { column: 'belonging', name: 'Belonging', type: 'number', direction: 'higher-better' },
      { column: 'posts_per_week', name: 'Posts per week', type: 'number', direction: 'neither' },
      { column: 'months_since_joining', name: 'Months since joining', type: 'number', direction: 'neither' },
      { column: 'circle', name: 'Circle', type: 'label', direction: 'neither' },
    ],
  },
} as const;

const say = (line: string): void => void process.stdout.write(`${line}\n`);

/** Runs a job here, as a worker would, and insists that it succeeds. */
async function finish(job: Job): Promise<string> {
  await runJob(registry, job.id, 'seed', new AbortController().signal);
  const ended = (await Job.findByPk(job.id))!;
  if (ended.state !== 'succeeded')
    throw new Error(`${ended.kind} ${ended.state}: ${ended.error?.detail ?? ''}`);
  return ended.result!.id;
}

async function store(importId: string, role: ImportFile['role'], text: string): Promise<ImportFile> {
  const bytes = Buffer.from(text);
  const key = `imports/${importId}/${role}`;
  await putObject(key, Readable.from([bytes], { objectMode: false }));
  return {
    role,
    name: `saltmarsh-${role}.csv`,
    key,
    bytes: bytes.length,
    sha256: createHash('sha256').update(bytes).digest('hex'),
  };
}

async function importSnapshot(
  actor: Actor,
  communityId: string,
  { takenOn, label, tiesCsv, membersCsv }: SaltmarshSnapshot,
): Promise<string> {
  const known = await Snapshot.findOne({ where: { communityId, takenOn, state: 'ready' } });
  if (known) return known.id;
  say(`Loading ${label}`);
  const importId = newId();
  const files = [await store(importId, 'ties', tiesCsv), await store(importId, 'members', membersCsv)];
  const options: ImportOptions = importOptionsSchema.parse({ ...OPTIONS, takenOn, label });
  const fingerprint = createHash('sha256')
    .update(`${takenOn}${files.map((file) => file.sha256).join()}`)
    .digest('hex');
  const { job } = await makeImport(actor, communityId, { importId, files, options, fingerprint });
  return finish(job);
}

async function read(actor: Actor, snapshotId: string, attribute: string): Promise<string> {
  const { job } = await makeReading(
    actor,
    snapshotId,
    makeReadingSchema.parse({ attribute, permutations: 499 }),
  );
  return finish(job);
}

/** Groupings, readings, a shared view and a few cases, so that every place has something to show. */
async function explore(
  actors: Record<Role, Actor>,
  communityId: string,
  snapshots: readonly string[],
): Promise<void> {
  const last = snapshots.at(-1)!;
  const { analyst, moderator } = actors;
  say('Finding groups');
  const { job } = await makeGrouping(
    analyst,
    last,
    makeGroupingSchema.parse({ name: 'Autumn grouping', method: 'spectral', k: 'auto' }),
  );
  const grouping = await finish(job);
  for (const snapshot of snapshots.slice(0, -1)) await read(analyst, snapshot, 'Helpfulness');
  for (const attribute of [
    'Months since joining',
    'Posts per week',
    'Belonging',
    'Complaints per 100 posts',
  ]) {
    say(`Reading ${attribute}`);
    await read(analyst, last, attribute);
  }
  const reading = await read(analyst, last, 'Helpfulness');
  const state = viewStateSchema.parse({ colour: { by: 'group', of: grouping }, seams: grouping });
  await createView(analyst, communityId, {
    name: 'Autumn grouping, all members',
    note: 'Where the community is joined, and where it is thin.',
    place: 'map',
    snapshotId: last,
    state,
    visibility: 'workspace',
  });
  const opened = await openCases(moderator, reading, { preview: false, threshold: 0.05 });
  if (!('items' in opened)) return;
  const mine = opened.items.slice(0, 9);
  await Case.update(
    { assigneeId: moderator.userId, dueOn: '2026-12-04' },
    { where: { id: mine.map((one) => one.id) } },
  );
  const settled = opened.items.at(-1);
  if (settled)
    await decideCase(moderator, settled.id, {
      decision: 'no-concern',
      reason: 'Only two raters this season; asked both, nothing unusual.',
      lookAgainOn: null,
    });
}

async function seed(): Promise<void> {
  await ensureBucket();
  const people = await ensureDemoPeople();
  const [workspace] = await Workspace.findOrCreate({
    where: { name: WORKSPACE },
    defaults: { name: WORKSPACE },
  });
  const actors = {} as Record<Role, Actor>;
  for (const [role, userId] of Object.entries(people) as [Role, string][]) {
    await Membership.findOrCreate({
      where: { workspaceId: workspace.id, userId },
      defaults: { workspaceId: workspace.id, userId, role },
    });
    actors[role] = {
      userId,
      name: role,
      email: '',
      memberships: [{ workspaceId: workspace.id, role }],
      via: 'session',
      readOnly: false,
    };
  }
  const [community] = await Community.findOrCreate({
    where: { workspaceId: workspace.id, name: COMMUNITY },
    defaults: { workspaceId: workspace.id, name: COMMUNITY, createdBy: people.analyst! },
  });
  // The last thing that is made; with it there, nothing is missing.
  if (
    (await View.count({ where: { communityId: community.id } })) > 0 &&
    (await Case.count({ where: { communityId: community.id } })) > 0
  )
    return;
  const { snapshots } = generateSaltmarsh();
  const ids: string[] = [];
  for (const snapshot of snapshots) ids.push(await importSnapshot(actors.analyst, community.id, snapshot));
  await explore(actors, community.id, ids);
}

try {
  await seed();
} finally {
  await sequelize.close();
}
