import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize';
import { sequelize } from '../database/connection';
import {
  columns,
  bool,
  id,
  integer,
  json,
  optionalDouble,
  optionalInteger,
  optionalJson,
  optionalText,
  optionalTime,
  reference,
  text,
  time,
} from './columns';

export class Grouping extends Model<InferAttributes<Grouping>, InferCreationAttributes<Grouping>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare communityId: string;
  declare snapshotId: string;
  declare name: string;
  declare method: 'fiedler' | 'spectral' | 'louvain';
  declare laplacian: 'combinatorial' | 'normalised' | 'regularised';
  declare cut: CreationOptional<'sign' | 'median' | 'sweep' | null>;
  declare options: Record<string, unknown>;
  declare seed: number;
  declare state: CreationOptional<'queued' | 'ready' | 'failed'>;
  declare k: CreationOptional<number | null>;
  declare result: CreationOptional<Record<string, unknown> | null>;
  declare version: string;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
}
Grouping.init(
  columns({
    id,
    workspaceId: reference,
    communityId: reference,
    snapshotId: reference,
    name: text,
    method: text,
    laplacian: text,
    cut: optionalText,
    options: json,
    seed: integer,
    state: { ...text, defaultValue: 'queued' },
    k: optionalInteger,
    result: optionalJson,
    version: text,
    createdBy: optionalText,
    createdAt: time,
    finishedAt: optionalTime,
  }),
  { sequelize, tableName: 'groupings' },
);

export class GroupingMember extends Model<
  InferAttributes<GroupingMember>,
  InferCreationAttributes<GroupingMember>
> {
  declare groupingId: string;
  declare ordinal: number;
  declare groupIndex: CreationOptional<number | null>;
  declare vector: CreationOptional<number | null>;
}
GroupingMember.init(
  columns({
    groupingId: { ...reference, primaryKey: true },
    ordinal: { ...integer, primaryKey: true },
    groupIndex: optionalInteger,
    vector: optionalDouble,
  }),
  { sequelize, tableName: 'grouping_members' },
);

export class Reading extends Model<InferAttributes<Reading>, InferCreationAttributes<Reading>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare communityId: string;
  declare snapshotId: string;
  declare attributeId: string;
  declare attribute: string;
  declare filter: Record<string, unknown>;
  declare laplacian: 'combinatorial' | 'normalised' | 'regularised';
  declare options: Record<string, unknown>;
  declare seed: number;
  declare state: CreationOptional<'queued' | 'ready' | 'failed'>;
  declare result: CreationOptional<Record<string, unknown> | null>;
  declare version: string;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
}
Reading.init(
  columns({
    id,
    workspaceId: reference,
    communityId: reference,
    snapshotId: reference,
    attributeId: reference,
    attribute: text,
    filter: json,
    laplacian: text,
    options: json,
    seed: integer,
    state: { ...text, defaultValue: 'queued' },
    result: optionalJson,
    version: text,
    createdBy: optionalText,
    createdAt: time,
    finishedAt: optionalTime,
  }),
  { sequelize, tableName: 'readings' },
);

export class ReadingMember extends Model<
  InferAttributes<ReadingMember>,
  InferCreationAttributes<ReadingMember>
> {
  declare readingId: string;
  declare ordinal: number;
  declare value: CreationOptional<number | null>;
  declare smoothed: CreationOptional<number | null>;
  declare standardError: CreationOptional<number | null>;
  declare departure: CreationOptional<number | null>;
  declare leverage: CreationOptional<number | null>;
  declare z: CreationOptional<number | null>;
  declare p: CreationOptional<number | null>;
  declare q: CreationOptional<number | null>;
  declare observed: boolean;
  declare tested: boolean;
  declare neighbours: number;
  declare localI: CreationOptional<number | null>;
  declare localExpectation: CreationOptional<number | null>;
  declare localVariance: CreationOptional<number | null>;
  declare localZ: CreationOptional<number | null>;
  declare localP: CreationOptional<number | null>;
  declare localQ: CreationOptional<number | null>;
  declare localPermutationP: CreationOptional<number | null>;
  declare quadrant: CreationOptional<'HH' | 'LL' | 'HL' | 'LH' | null>;
}
ReadingMember.init(
  columns({
    readingId: { ...reference, primaryKey: true },
    ordinal: { ...integer, primaryKey: true },
    value: optionalDouble,
    smoothed: optionalDouble,
    standardError: optionalDouble,
    departure: optionalDouble,
    leverage: optionalDouble,
    z: optionalDouble,
    p: optionalDouble,
    q: optionalDouble,
    observed: bool,
    tested: bool,
    neighbours: integer,
    localI: optionalDouble,
    localExpectation: optionalDouble,
    localVariance: optionalDouble,
    localZ: optionalDouble,
    localP: optionalDouble,
    localQ: optionalDouble,
    localPermutationP: optionalDouble,
    quadrant: optionalText,
  }),
  { sequelize, tableName: 'reading_members' },
);
