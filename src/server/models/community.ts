import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize';
import { sequelize } from '../database/connection';
import {
  columns,
  bool,
  day,
  double,
  id,
  integer,
  json,
  optionalJson,
  optionalReference,
  optionalText,
  optionalTime,
  reference,
  text,
  time,
} from './columns';

/** One uploaded file as kept in object storage. */
export interface ImportFile {
  role: 'ties' | 'members' | 'mapping';
  name: string;
  key: string;
  bytes: number;
  sha256: string;
}

export class Community extends Model<InferAttributes<Community>, InferCreationAttributes<Community>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare name: string;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}
Community.init(
  columns({
    id,
    workspaceId: reference,
    name: text,
    createdBy: optionalText,
    createdAt: time,
  }),
  { sequelize, tableName: 'communities' },
);

export class Import extends Model<InferAttributes<Import>, InferCreationAttributes<Import>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare communityId: string;
  declare state: 'received' | 'checking' | 'review' | 'accepted' | 'discarded' | 'failed' | 'cancelled';
  declare options: Record<string, unknown>;
  declare files: ImportFile[];
  declare fingerprint: string;
  declare counts: CreationOptional<Record<string, unknown> | null>;
  declare warnings: CreationOptional<Record<string, unknown>[] | null>;
  declare problemsTotal: CreationOptional<number>;
  declare problemKinds: CreationOptional<Record<string, unknown>[] | null>;
  declare snapshotId: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
}
Import.init(
  columns({
    id,
    workspaceId: reference,
    communityId: reference,
    state: text,
    options: json,
    files: json,
    fingerprint: text,
    counts: optionalJson,
    warnings: optionalJson,
    problemsTotal: { ...integer, defaultValue: 0 },
    problemKinds: optionalJson,
    snapshotId: optionalReference,
    createdBy: optionalText,
    createdAt: time,
    finishedAt: optionalTime,
  }),
  { sequelize, tableName: 'imports' },
);

export class ImportProblem extends Model<
  InferAttributes<ImportProblem>,
  InferCreationAttributes<ImportProblem>
> {
  declare importId: string;
  declare ordinal: number;
  declare file: string;
  declare line: number;
  declare column: CreationOptional<string | null>;
  declare value: CreationOptional<string | null>;
  declare reason: string;
  declare kind: CreationOptional<number>;
}
ImportProblem.init(
  columns({
    importId: { ...reference, primaryKey: true },
    ordinal: { ...integer, primaryKey: true },
    file: text,
    line: integer,
    column: optionalText,
    value: optionalText,
    reason: text,
    kind: { ...integer, defaultValue: 0 },
  }),
  { sequelize, tableName: 'import_problems' },
);

export class Snapshot extends Model<InferAttributes<Snapshot>, InferCreationAttributes<Snapshot>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare communityId: string;
  declare importId: CreationOptional<string | null>;
  declare takenOn: string;
  declare label: string;
  declare state: CreationOptional<'pending' | 'ready'>;
  declare members: number;
  declare ties: number;
  declare totalWeight: number;
  declare components: number;
  declare largestComponent: number;
  declare isolated: number;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}
Snapshot.init(
  columns({
    id,
    workspaceId: reference,
    communityId: reference,
    importId: optionalReference,
    takenOn: day,
    label: text,
    state: { ...text, defaultValue: 'pending' },
    members: integer,
    ties: integer,
    totalWeight: double,
    components: integer,
    largestComponent: integer,
    isolated: integer,
    createdBy: optionalText,
    createdAt: time,
  }),
  { sequelize, tableName: 'snapshots' },
);

export class Attribute extends Model<InferAttributes<Attribute>, InferCreationAttributes<Attribute>> {
  declare id: CreationOptional<string>;
  declare snapshotId: string;
  declare ordinal: number;
  declare name: string;
  declare type: 'number' | 'label';
  declare direction: CreationOptional<'higher-better' | 'higher-worse' | 'neither'>;
  declare sensitive: CreationOptional<boolean>;
  declare observed: number;
  declare summary: Record<string, unknown>;
  declare countOf: CreationOptional<string | null>;
}
Attribute.init(
  columns({
    id,
    snapshotId: reference,
    ordinal: integer,
    name: text,
    type: text,
    direction: { ...text, defaultValue: 'neither' },
    sensitive: bool,
    observed: integer,
    summary: json,
    countOf: optionalText,
  }),
  { sequelize, tableName: 'attributes' },
);
