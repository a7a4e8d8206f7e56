import type { BetterAuthOptions } from '@better-auth/core';
import { getAuthTables, type DBFieldAttribute } from 'better-auth/db';
import {
  DataTypes,
  type ModelAttributeColumnOptions,
  type ModelStatic,
  type Model,
  type Sequelize,
} from 'sequelize';

export type AuthModel = ModelStatic<Model<Record<string, unknown>>>;

function columnType({ type, bigint }: DBFieldAttribute): ModelAttributeColumnOptions['type'] {
  if (type === 'number') return bigint ? DataTypes.BIGINT : DataTypes.DOUBLE;
  if (type === 'boolean') return DataTypes.BOOLEAN;
  return type === 'date' ? DataTypes.DATE : DataTypes.TEXT;
}

/**
 * Sequelize models of better-auth's tables, by table name, columns as better-auth names them in the database.
 * @param serial ids are numbers that the database gives
 */
export function authModels(sequelize: Sequelize, options: BetterAuthOptions): ReadonlyMap<string, AuthModel> {
  const serial = options.advanced?.database?.generateId === 'serial';
  const models = new Map<string, AuthModel>();
  for (const [key, table] of Object.entries(getAuthTables(options))) {
    const id: ModelAttributeColumnOptions = serial
      ? { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true }
      : { type: DataTypes.TEXT, primaryKey: true };
    const columns: Record<string, ModelAttributeColumnOptions> = { id };
    for (const [name, field] of Object.entries(table.fields)) {
      const refersToId = serial && field.references?.field === 'id';
      columns[field.fieldName ?? name] = {
        type: refersToId ? DataTypes.INTEGER : columnType(field),
        allowNull: field.required === false,
        ...(field.unique ? { unique: true } : {}),
      };
    }
    const name = table.modelName || key;
    // Not `sequelize.models`: the product's own models of the same tables stand there.
    models.set(
      name,
      sequelize.define(`auth:${name}`, columns, { tableName: name, timestamps: false, underscored: false }),
    );
  }
  return models;
}
