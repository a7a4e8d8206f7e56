import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '../database/connection';
import { columns, double, id, integer, optionalDouble, optionalText, reference, text } from './columns';

export class CommunityMember extends Model<
  InferAttributes<CommunityMember>,
  InferCreationAttributes<CommunityMember>
> {
  declare id: CreationOptional<string>;
  declare communityId: string;
  declare externalId: string;
}
CommunityMember.init(
  columns({
    id,
    communityId: reference,
    externalId: text,
  }),
  { sequelize, tableName: 'community_members' },
);

export class SnapshotMember extends Model<
  InferAttributes<SnapshotMember>,
  InferCreationAttributes<SnapshotMember>
> {
  declare snapshotId: string;
  declare ordinal: number;
  declare memberId: string;
  declare externalId: string;
  declare name: CreationOptional<string | null>;
  declare component: number;
  declare degree: number;
  declare strength: number;
  declare x: number;
  declare y: number;
}
SnapshotMember.init(
  columns({
    snapshotId: { ...reference, primaryKey: true },
    ordinal: { ...integer, primaryKey: true },
    memberId: reference,
    externalId: text,
    name: optionalText,
    component: integer,
    degree: integer,
    strength: double,
    x: double,
    y: double,
  }),
  { sequelize, tableName: 'snapshot_members' },
);

export class Tie extends Model<InferAttributes<Tie>, InferCreationAttributes<Tie>> {
  declare snapshotId: string;
  declare source: number;
  declare target: number;
  declare weight: number;
  declare kind: CreationOptional<string | null>;
  declare count: number;
}
Tie.init(
  columns({
    snapshotId: { ...reference, primaryKey: true },
    source: { ...integer, primaryKey: true },
    target: { ...integer, primaryKey: true },
    weight: double,
    kind: optionalText,
    count: integer,
  }),
  { sequelize, tableName: 'ties' },
);

export class AttributeValue extends Model<
  InferAttributes<AttributeValue>,
  InferCreationAttributes<AttributeValue>
> {
  declare attributeId: string;
  declare ordinal: number;
  declare value: CreationOptional<number | null>;
  declare label: CreationOptional<string | null>;
}
AttributeValue.init(
  columns({
    attributeId: { ...reference, primaryKey: true },
    ordinal: { ...integer, primaryKey: true },
    value: optionalDouble,
    label: optionalText,
  }),
  { sequelize, tableName: 'attribute_values' },
);

export class SnapshotArray extends Model<
  InferAttributes<SnapshotArray>,
  InferCreationAttributes<SnapshotArray>
> {
  declare snapshotId: string;
  declare name: string;
  declare type: 'int32' | 'float64' | 'float32';
  declare bytes: Buffer;
}
SnapshotArray.init(
  columns({
    snapshotId: { ...reference, primaryKey: true },
    name: { ...text, primaryKey: true },
    type: text,
    bytes: { type: DataTypes.BLOB, allowNull: false },
  }),
  { sequelize, tableName: 'snapshot_arrays' },
);
