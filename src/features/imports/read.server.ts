import { Op } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { csvLine } from '@/lib/csv';
import { conflict, notFound } from '@/lib/problem';
import { Import, ImportProblem as ProblemRow, Job, sequelize, Snapshot } from '@/server/models';
import { communityFor, settleIds } from '@/features/network/index.server';
import { authorise, audit, workspaceIds } from '@/features/workspaces/index.server';
import type {
  FileRole,
  ImportCounts,
  ImportProblem,
  ImportView,
  ImportWarning,
  ProblemKind,
} from './imports';

const FIRST = 100;

export async function presentImport(row: Import): Promise<ImportView> {
  const [problems, job] = await Promise.all([
    ProblemRow.findAll({ where: { importId: row.id }, order: [['ordinal', 'ASC']], limit: FIRST }),
    Job.findOne({ where: { targetId: row.id, kind: 'import' }, order: [['createdAt', 'DESC']] }),
  ]);
  return {
    id: row.id,
    communityId: row.communityId,
    state: row.state as ImportView['state'],
    files: row.files.map(({ role, name, bytes }) => ({ role, name, bytes })),
    options: row.options,
    counts: row.counts as ImportCounts | null,
    warnings: (row.warnings ?? []) as unknown as ImportWarning[],
    problems: problems.map(({ file, line, column, value, reason }) => ({
      file: file as FileRole,
      line,
      column,
      value,
      reason,
    })),
    problemsTotal: row.problemsTotal,
    problemKinds: (row.problemKinds ?? []) as unknown as ProblemKind[],
    snapshotId: row.snapshotId,
    jobId: job?.id ?? null,
    createdAt: row.createdAt.toISOString(),
    finishedAt: row.finishedAt?.toISOString() ?? null,
  };
}

/** @throws ProblemError 404 for outsiders, 403 for roles that do not import */
export async function importFor(actor: Actor, id: string): Promise<Import> {
  const row = await Import.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!row) throw notFound();
  await authorise(actor, row.workspaceId, 'analysis.make');
  return row;
}

export async function listImports(actor: Actor, communityId: string): Promise<ImportView[]> {
  await communityFor(actor, communityId, 'analysis.make');
  const rows = await Import.findAll({ where: { communityId }, order: [['createdAt', 'DESC']], limit: 50 });
  return Promise.all(rows.map(presentImport));
}

/** Makes a checked import a snapshot that everyone sees. */
export async function acceptImport(actor: Actor, id: string): Promise<ImportView> {
  const row = await importFor(actor, id);
  await sequelize.transaction(async (transaction) => {
    const [count] = await Import.update(
      { state: 'accepted', finishedAt: new Date() },
      { where: { id, state: 'review' }, transaction },
    );
    if (count === 0) throw conflict('not-in-review', 'This import is not waiting for review.');
    await Snapshot.update({ state: 'ready' }, { where: { importId: id }, transaction });
    const { mappingRows } = (row.counts ?? {}) as Partial<ImportCounts>;
    if (mappingRows && row.snapshotId) await settleIds(row.snapshotId, transaction);
    await audit(
      {
        workspaceId: row.workspaceId,
        actorId: actor.userId,
        action: 'import.accept',
        targetKind: 'import',
        targetId: id,
      },
      transaction,
    );
  });
  return presentImport((await Import.findByPk(id))!);
}

/** Throws a checked import away; the report stays, the data goes. */
export async function discardImport(actor: Actor, id: string): Promise<ImportView> {
  const row = await importFor(actor, id);
  await sequelize.transaction(async (transaction) => {
    const [count] = await Import.update(
      { state: 'discarded', snapshotId: null, finishedAt: new Date() },
      { where: { id, state: 'review' }, transaction },
    );
    if (count === 0) throw conflict('not-in-review', 'This import is not waiting for review.');
    await Snapshot.destroy({ where: { importId: id, state: 'pending' }, transaction });
    await audit(
      {
        workspaceId: row.workspaceId,
        actorId: actor.userId,
        action: 'import.discard',
        targetKind: 'import',
        targetId: id,
      },
      transaction,
    );
  });
  return presentImport((await Import.findByPk(id))!);
}

/** A page of the refused rows of one kind. */
export async function problemPage(
  actor: Actor,
  id: string,
  { kind, limit, cursor }: { kind: number; limit: number; cursor: number },
): Promise<{ items: ImportProblem[]; nextCursor: string | null }> {
  await importFor(actor, id);
  const rows = await ProblemRow.findAll({
    where: { importId: id, kind, ordinal: { [Op.gte]: cursor } },
    order: [['ordinal', 'ASC']],
    limit: limit + 1,
  });
  return {
    items: rows.slice(0, limit).map(({ file, line, column, value, reason }) => ({
      file: file as FileRole,
      line,
      column: column ?? null,
      value: value ?? null,
      reason,
    })),
    nextCursor: rows.length > limit ? String(rows[limit]!.ordinal) : null,
  };
}

const CHUNK = 5_000;

/** Every refused row as CSV, streamed. */
export async function problemsCsv(actor: Actor, id: string): Promise<Response> {
  await importFor(actor, id);
  const encoder = new TextEncoder();
  let from = -1;
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const rows = await ProblemRow.findAll({
        where: { importId: id },
        order: [['ordinal', 'ASC']],
        limit: CHUNK,
        offset: Math.max(0, from),
      });
      const head = from < 0 ? csvLine(['file', 'line', 'column', 'value', 'reason']) : '';
      from = Math.max(0, from) + rows.length;
      controller.enqueue(
        encoder.encode(
          head + rows.map((row) => csvLine([row.file, row.line, row.column, row.value, row.reason])).join(''),
        ),
      );
      if (rows.length < CHUNK) controller.close();
    },
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/csv; charset=utf-8',
      'content-disposition': 'attachment; filename="refused-rows.csv"',
      'cache-control': 'no-store',
    },
  });
}
