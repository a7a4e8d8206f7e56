import { DataTypes } from 'sequelize';
import { v7 } from 'uuid';

/** A new opaque id; version 7, so that ids sort by time of making. */
export const newId = (): string => v7();

/** A copy of each definition: Sequelize writes the column name into what it is given. */
export const columns = <T extends Record<string, object>>(definitions: T): T =>
  Object.fromEntries(Object.entries(definitions).map(([name, definition]) => [name, { ...definition }])) as T;

/** Column definitions that most models share; use them through `columns`. */
export const id = { type: DataTypes.UUID, primaryKey: true, defaultValue: newId };
export const text = { type: DataTypes.TEXT, allowNull: false };
export const optionalText = { type: DataTypes.TEXT, allowNull: true };
export const reference = { type: DataTypes.UUID, allowNull: false };
export const optionalReference = { type: DataTypes.UUID, allowNull: true };
export const integer = { type: DataTypes.INTEGER, allowNull: false };
export const optionalInteger = { type: DataTypes.INTEGER, allowNull: true };
export const double = { type: DataTypes.DOUBLE, allowNull: false };
export const optionalDouble = { type: DataTypes.DOUBLE, allowNull: true };
export const bool = { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false };
export const json = { type: DataTypes.JSONB, allowNull: false };
export const optionalJson = { type: DataTypes.JSONB, allowNull: true };
export const time = { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW };
export const optionalTime = { type: DataTypes.DATE, allowNull: true };
export const day = { type: DataTypes.DATEONLY, allowNull: false };
