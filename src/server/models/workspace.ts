import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize';
import type { Role } from '@/lib/actor';
import { sequelize } from '../database/connection';
import {
  columns,
  bool,
  id,
  integer,
  json,
  optionalText,
  optionalTime,
  reference,
  text,
  time,
} from './columns';

export class Workspace extends Model<InferAttributes<Workspace>, InferCreationAttributes<Workspace>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare viewersSeeNames: CreationOptional<boolean>;
  declare smallestGroup: CreationOptional<number>;
  declare neighbourFloor: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare deletedAt: CreationOptional<Date | null>;
}
Workspace.init(
  columns({
    id,
    name: text,
    viewersSeeNames: bool,
    smallestGroup: { ...integer, defaultValue: 5 },
    neighbourFloor: { ...integer, defaultValue: 5 },
    createdAt: time,
    deletedAt: optionalTime,
  }),
  { sequelize, tableName: 'workspaces' },
);

export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare userId: string;
  declare role: Role;
  declare createdAt: CreationOptional<Date>;
  declare lastSeenAt: CreationOptional<Date | null>;
}
Membership.init(
  columns({
    id,
    workspaceId: reference,
    userId: text,
    role: text,
    createdAt: time,
    lastSeenAt: optionalTime,
  }),
  { sequelize, tableName: 'memberships' },
);

export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare email: string;
  declare role: Role;
  declare tokenHash: string;
  declare invitedBy: string;
  declare createdAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare acceptedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;
}
Invitation.init(
  columns({
    id,
    workspaceId: reference,
    email: text,
    role: text,
    tokenHash: text,
    invitedBy: text,
    createdAt: time,
    expiresAt: time,
    acceptedAt: optionalTime,
    revokedAt: optionalTime,
  }),
  { sequelize, tableName: 'invitations' },
);

export class ApiToken extends Model<InferAttributes<ApiToken>, InferCreationAttributes<ApiToken>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare userId: string;
  declare name: string;
  declare tokenHash: string;
  declare readOnly: CreationOptional<boolean>;
  declare createdAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;
}
ApiToken.init(
  columns({
    id,
    workspaceId: reference,
    userId: text,
    name: text,
    tokenHash: text,
    readOnly: bool,
    createdAt: time,
    expiresAt: time,
    lastUsedAt: optionalTime,
    revokedAt: optionalTime,
  }),
  { sequelize, tableName: 'api_tokens' },
);

export class AuditEntry extends Model<InferAttributes<AuditEntry>, InferCreationAttributes<AuditEntry>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare actorId: CreationOptional<string | null>;
  declare action: string;
  declare targetKind: string;
  declare targetId: CreationOptional<string | null>;
  declare detail: Record<string, unknown>;
  declare createdAt: CreationOptional<Date>;
}
AuditEntry.init(
  columns({
    id,
    workspaceId: reference,
    actorId: optionalText,
    action: text,
    targetKind: text,
    targetId: optionalText,
    detail: json,
    createdAt: time,
  }),
  { sequelize, tableName: 'audit_entries' },
);
