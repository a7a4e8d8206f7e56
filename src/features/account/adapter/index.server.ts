import type { BetterAuthOptions } from '@better-auth/core';
import {
  createAdapterFactory,
  type CleanedWhere,
  type CustomAdapter,
  type DBAdapter,
  type DBAdapterFactoryConfig,
} from '@better-auth/core/db/adapter';
import { type Sequelize, type Transaction } from 'sequelize';
import { authModels, type AuthModel } from './models.server';
import { toWhere } from './where.server';

type Row = Record<string, unknown>;
const plain = <T>(row: { get(options: { plain: true }): unknown } | null): T | null =>
  row ? (row.get({ plain: true }) as T) : null;

interface Names {
  getFieldName(of: { model: string; field: string }): string;
}

/** The methods that better-auth calls, on Sequelize models, in an optional transaction. */
function customAdapter(
  models: ReadonlyMap<string, AuthModel>,
  names: Names,
  transaction?: Transaction,
): CustomAdapter {
  const within = transaction ? { transaction } : {};
  const modelOf = (name: string): AuthModel => {
    const model = models.get(name);
    if (!model) throw new Error(`better-auth asked for a table that is not defined: ${name}`);
    return model;
  };
  const find = (model: string, where: CleanedWhere[] | undefined, select?: string[]) => ({
    where: toWhere(where, modelOf(model).name),
    // `select` and `sortBy` arrive as field names, everything else as column names.
    ...(select?.length ? { attributes: select.map((field) => names.getFieldName({ model, field })) } : {}),
    ...within,
  });
  /** The one row that a statement on a single row is about; locked, so that racers wait and then find it gone. */
  const lockOne = async (model: string, where: CleanedWhere[], t: Transaction) =>
    modelOf(model).findOne({
      where: toWhere(where, modelOf(model).name),
      transaction: t,
      lock: t.LOCK.UPDATE,
      skipLocked: false,
    });
  const inTransaction = <R>(model: string, work: (t: Transaction) => Promise<R>): Promise<R> =>
    transaction ? work(transaction) : modelOf(model).sequelize!.transaction(work);
  return {
    create: async ({ model, data }) => plain<never>(await modelOf(model).create(data as Row, within))!,
    findOne: async ({ model, where, select }) =>
      plain(await modelOf(model).findOne(find(model, where, select))),
    findMany: async <T>({
      model,
      where,
      limit,
      select,
      sortBy,
      offset,
    }: Parameters<CustomAdapter['findMany']>[0]) => {
      const rows = await modelOf(model).findAll({
        ...find(model, where, select),
        limit,
        ...(offset ? { offset } : {}),
        ...(sortBy
          ? { order: [[names.getFieldName({ model, field: sortBy.field }), sortBy.direction.toUpperCase()]] }
          : {}),
      });
      return rows.map((row) => row.get({ plain: true }) as T);
    },
    count: ({ model, where }) => modelOf(model).count(find(model, where)),
    update: async <T>({ model, where, update }: { model: string; where: CleanedWhere[]; update: T }) =>
      inTransaction(model, async (t) => {
        const row = await lockOne(model, where, t);
        return row ? plain<T>(await row.update(update as Row, { transaction: t })) : null;
      }),
    updateMany: async ({ model, where, update }) =>
      (await modelOf(model).update(update, find(model, where)))[0],
    delete: async ({ model, where }) => {
      await modelOf(model).destroy(find(model, where));
    },
    deleteMany: ({ model, where }) => modelOf(model).destroy(find(model, where)),
    consumeOne: async <T>({ model, where }: { model: string; where: CleanedWhere[] }) =>
      inTransaction(model, async (t) => {
        const row = await lockOne(model, where, t);
        if (!row) return null;
        await row.destroy({ transaction: t });
        return plain<T>(row);
      }),
    incrementOne: async <T>({
      model,
      where,
      increment,
      set,
    }: {
      model: string;
      where: CleanedWhere[];
      increment: Record<string, number>;
      set?: Row | undefined;
    }) =>
      inTransaction(model, async (t) => {
        const row = await lockOne(model, where, t);
        if (!row) return null;
        const sums = Object.entries(increment).map(([column, by]) => [
          column,
          Number(row.get(column) ?? 0) + by,
        ]);
        return plain<T>(await row.update({ ...Object.fromEntries(sums), ...set }, { transaction: t }));
      }),
  };
}

/**
 * better-auth's storage on Sequelize: real transactions, row locks for single-use rows, LIKE with its signs escaped.
 * Tables come by migration, never by sync.
 */
export function sequelizeAdapter(
  sequelize: Sequelize,
): (options: BetterAuthOptions) => DBAdapter<BetterAuthOptions> {
  return (options) => {
    const models = authModels(sequelize, options);
    const config = (transaction?: Transaction): DBAdapterFactoryConfig => ({
      adapterId: 'sequelize',
      adapterName: 'Sequelize',
      supportsJSON: false,
      supportsArrays: false,
      supportsDates: true,
      supportsBooleans: true,
      supportsNumericIds: true,
      customTransformOutput: ({ data, fieldAttributes }) =>
        // int8 comes as a string.
        fieldAttributes.bigint === true && typeof data === 'string' ? Number(data) : (data as unknown),
      transaction: transaction ? false : (work) => sequelize.transaction((t) => work(build(t))),
    });
    const build = (transaction?: Transaction): DBAdapter<BetterAuthOptions> =>
      createAdapterFactory({
        config: config(transaction),
        adapter: (names) => customAdapter(models, names, transaction),
      })(options);
    return build();
  };
}
