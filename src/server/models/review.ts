import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import type { Role } from '@/lib/actor';
import { sequelize } from '../database/connection';
import {
  columns,
  bool,
  id,
  integer,
  json,
  optionalReference,
  optionalText,
  optionalTime,
  reference,
  text,
  time,
} from './columns';

export class Case extends Model<InferAttributes<Case>, InferCreationAttributes<Case>> {
  declare id: CreationOptional<string>;
  declare number: number;
  declare workspaceId: string;
  declare communityId: string;
  declare snapshotId: string;
  declare readingId: string;
  declare memberId: string;
  declare ordinal: number;
  declare state: CreationOptional<'open' | 'watching' | 'closed'>;
  declare assigneeId: CreationOptional<string | null>;
  declare priority: CreationOptional<'low' | 'normal' | 'high'>;
  declare dueOn: CreationOptional<string | null>;
  declare decision: CreationOptional<string | null>;
  declare reason: CreationOptional<string | null>;
  declare evidence: Record<string, unknown>;
  declare version: CreationOptional<number>;
  declare openedBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare decidedAt: CreationOptional<Date | null>;
  declare decidedBy: CreationOptional<string | null>;
  /** Who proposed to escalate; a second person confirms. */
  declare escalationBy: CreationOptional<string | null>;
}
Case.init(
  columns({
    id,
    number: integer,
    workspaceId: reference,
    communityId: reference,
    snapshotId: reference,
    readingId: reference,
    memberId: reference,
    ordinal: integer,
    state: { ...text, defaultValue: 'open' },
    assigneeId: optionalText,
    priority: { ...text, defaultValue: 'normal' },
    dueOn: { type: DataTypes.DATEONLY, allowNull: true },
    decision: optionalText,
    reason: optionalText,
    evidence: json,
    version: { ...integer, defaultValue: 1 },
    openedBy: optionalText,
    createdAt: time,
    decidedAt: optionalTime,
    decidedBy: optionalText,
    escalationBy: optionalText,
  }),
  { sequelize, tableName: 'cases' },
);

export class CaseEvent extends Model<InferAttributes<CaseEvent>, InferCreationAttributes<CaseEvent>> {
  declare id: CreationOptional<string>;
  declare caseId: string;
  declare workspaceId: string;
  declare actorId: CreationOptional<string | null>;
  declare kind: string;
  declare body: Record<string, unknown>;
  declare createdAt: CreationOptional<Date>;
}
CaseEvent.init(
  columns({
    id,
    caseId: reference,
    workspaceId: reference,
    actorId: optionalText,
    kind: text,
    body: json,
    createdAt: time,
  }),
  { sequelize, tableName: 'case_events' },
);

export class View extends Model<InferAttributes<View>, InferCreationAttributes<View>> {
  declare id: CreationOptional<string>;
  declare workspaceId: string;
  declare communityId: string;
  declare snapshotId: CreationOptional<string | null>;
  declare name: string;
  declare note: CreationOptional<string>;
  declare place: 'map' | 'members';
  declare state: Record<string, unknown>;
  declare follow: CreationOptional<boolean>;
  declare visibility: CreationOptional<'private' | 'workspace'>;
  declare pinned: CreationOptional<boolean>;
  declare ownerId: string;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}
View.init(
  columns({
    id,
    workspaceId: reference,
    communityId: reference,
    snapshotId: optionalReference,
    name: text,
    note: { ...text, defaultValue: '' },
    place: text,
    state: json,
    follow: bool,
    visibility: { ...text, defaultValue: 'private' },
    pinned: bool,
    ownerId: text,
    version: { ...integer, defaultValue: 1 },
    createdAt: time,
    updatedAt: time,
  }),
  { sequelize, tableName: 'views' },
);

export class ViewShare extends Model<InferAttributes<ViewShare>, InferCreationAttributes<ViewShare>> {
  declare id: CreationOptional<string>;
  declare viewId: string;
  declare userId: CreationOptional<string | null>;
  declare role: CreationOptional<Role | null>;
  declare canEdit: CreationOptional<boolean>;
  declare createdBy: string;
  declare createdAt: CreationOptional<Date>;
}
ViewShare.init(
  columns({
    id,
    viewId: reference,
    userId: optionalText,
    role: optionalText,
    canEdit: bool,
    createdBy: text,
    createdAt: time,
  }),
  { sequelize, tableName: 'view_shares' },
);

export class ViewComment extends Model<InferAttributes<ViewComment>, InferCreationAttributes<ViewComment>> {
  declare id: CreationOptional<string>;
  declare viewId: string;
  declare authorId: string;
  declare body: string;
  declare createdAt: CreationOptional<Date>;
}
ViewComment.init(
  columns({
    id,
    viewId: reference,
    authorId: text,
    body: text,
    createdAt: time,
  }),
  { sequelize, tableName: 'view_comments' },
);
