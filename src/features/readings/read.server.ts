import type { Actor } from '@/lib/actor';
import { Attribute, Job, Reading, User } from '@/server/models';
import { snapshotFor } from '@/features/network/index.server';
import type { ReadingLine, ReadingSummaryResult, ReadingView } from './readings';
import { hrefOf, readingFor, resultOf } from './scope.server';

async function jobsOf(rows: readonly Reading[]): Promise<Map<string, string>> {
  const unfinished = rows.filter((row) => row.state !== 'ready').map((row) => row.id);
  const jobs = await Job.findAll({ where: { kind: 'reading', targetId: unfinished } });
  return new Map(jobs.map((job) => [job.targetId, job.id]));
}

async function makersOf(rows: readonly Reading[]): Promise<Map<string, string>> {
  const ids = [...new Set(rows.flatMap((row) => row.createdBy ?? []))];
  const users = await User.findAll({ where: { id: ids }, attributes: ['id', 'name'] });
  return new Map(users.map(({ id, name }) => [id, name]));
}

/** Readings of a snapshot, newest first. @throws ProblemError 404, 403. */
export async function listReadings(
  actor: Actor,
  snapshotId: string,
): Promise<{ items: ReadingLine[]; nextCursor: null }> {
  const { snapshot } = await snapshotFor(actor, snapshotId, 'explore.open');
  const rows = await Reading.findAll({
    where: { snapshotId: snapshot.id },
    order: [['createdAt', 'DESC']],
    limit: 200,
  });
  const [makers, jobOf] = await Promise.all([makersOf(rows), jobsOf(rows)]);
  const items = rows.map((row): ReadingLine => {
    const result = resultOf(row);
    return {
      id: row.id,
      state: row.state as ReadingLine['state'],
      attribute: row.attribute,
      attributeId: row.attributeId,
      filter: row.filter,
      laplacian: row.laplacian,
      seed: row.seed,
      moran: result?.moran?.row.value ?? null,
      explained: result?.explained ?? null,
      flagged: result?.flagged ?? null,
      observed: result?.observed ?? null,
      missing: result?.missing ?? null,
      createdAt: row.createdAt.toISOString(),
      createdBy: makers.get(row.createdBy ?? '') ?? null,
      href: hrefOf(row),
      job: jobOf.get(row.id) ?? null,
    };
  });
  return { items, nextCursor: null };
}

/** What an unfinished or failed reading answers with in place of numbers. */
const EMPTY: ReadingSummaryResult = {
  alpha: null,
  sigma: null,
  sigmaLikelihood: null,
  observed: 0,
  missing: 0,
  tested: 0,
  effectiveDegrees: null,
  moran: null,
  geary: null,
  smoothness: null,
  explained: null,
  typical: null,
  residual: null,
  method: '',
  flagged: 0,
  levels: null,
  warp: null,
  notes: [],
  seconds: 0,
};

/** One reading with everything global. @throws ProblemError 404, 403. */
export async function getReading(actor: Actor, id: string): Promise<ReadingView> {
  const { reading } = await readingFor(actor, id, 'explore.open');
  const attribute = await Attribute.findByPk(reading.attributeId, { attributes: ['sensitive'] });
  const { weightsId: _, ...options } = reading.options;
  return {
    ...EMPTY,
    ...resultOf(reading),
    id: reading.id,
    communityId: reading.communityId,
    snapshotId: reading.snapshotId,
    state: reading.state as ReadingView['state'],
    attribute: reading.attribute,
    attributeId: reading.attributeId,
    sensitive: attribute?.sensitive ?? false,
    filter: reading.filter,
    laplacian: reading.laplacian,
    options,
    seed: reading.seed,
    version: reading.version,
    createdAt: reading.createdAt.toISOString(),
    createdBy: (await makersOf([reading])).get(reading.createdBy ?? '') ?? null,
    finishedAt: reading.finishedAt?.toISOString() ?? null,
    href: hrefOf(reading),
    job: (await jobsOf([reading])).get(reading.id) ?? null,
  };
}
