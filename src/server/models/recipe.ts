import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize';
import { sequelize } from '../database/connection';
import { bool, columns, id, json, reference, text, time } from './columns';

/** Choices about an import, kept under a name. */
export class ImportRecipe extends Model<
  InferAttributes<ImportRecipe>,
  InferCreationAttributes<ImportRecipe>
> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare communityId: string;
  declare name: string;
  declare options: Record<string, unknown>;
  /** Whether everyone who imports in the workspace sees it. */
  declare shared: CreationOptional<boolean>;
  declare createdBy: string;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}
ImportRecipe.init(
  columns({
    id,
    workspaceId: reference,
    communityId: reference,
    name: text,
    options: json,
    shared: bool,
    createdBy: text,
    createdAt: time,
    updatedAt: time,
  }),
  { sequelize, tableName: 'import_recipes' },
);
