import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize';
import type { ProblemDocument } from '@/lib/problem';
import { sequelize } from '../database/connection';
import {
  columns,
  bool,
  double,
  id,
  integer,
  optionalJson,
  optionalReference,
  optionalText,
  optionalTime,
  text,
  time,
} from './columns';

/** What a finished job made. */
export interface JobResult {
  kind: string;
  id: string;
  href: string;
}

export class Job extends Model<InferAttributes<Job>, InferCreationAttributes<Job>> {
  declare id: CreationOptional<string>;
  declare workspaceId: CreationOptional<string | null>;
  declare kind: string;
  declare targetId: string;
  declare state: CreationOptional<'queued' | 'running' | 'succeeded' | 'failed' | 'cancelled'>;
  declare progress: CreationOptional<number>;
  declare step: CreationOptional<string>;
  declare error: CreationOptional<ProblemDocument | null>;
  declare result: CreationOptional<JobResult | null>;
  declare attempts: CreationOptional<number>;
  declare cancelRequested: CreationOptional<boolean>;
  declare workerId: CreationOptional<string | null>;
  declare heartbeatAt: CreationOptional<Date | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare startedAt: CreationOptional<Date | null>;
  declare finishedAt: CreationOptional<Date | null>;
}
Job.init(
  columns({
    id,
    workspaceId: optionalReference,
    kind: text,
    targetId: text,
    state: { ...text, defaultValue: 'queued' },
    progress: { ...double, defaultValue: 0 },
    step: { ...text, defaultValue: 'Waiting for its turn' },
    error: optionalJson,
    result: optionalJson,
    attempts: { ...integer, defaultValue: 0 },
    cancelRequested: bool,
    workerId: optionalText,
    heartbeatAt: optionalTime,
    createdBy: optionalText,
    createdAt: time,
    startedAt: optionalTime,
    finishedAt: optionalTime,
  }),
  { sequelize, tableName: 'jobs' },
);

export class WorkerProcess extends Model<
  InferAttributes<WorkerProcess>,
  InferCreationAttributes<WorkerProcess>
> {
  declare id: string;
  declare startedAt: CreationOptional<Date>;
  declare heartbeatAt: CreationOptional<Date>;
}
WorkerProcess.init(
  columns({
    id: { ...text, primaryKey: true },
    startedAt: time,
    heartbeatAt: time,
  }),
  { sequelize, tableName: 'worker_processes' },
);

export class OutgoingMail extends Model<
  InferAttributes<OutgoingMail>,
  InferCreationAttributes<OutgoingMail>
> {
  declare id: CreationOptional<string>;
  declare to: string;
  declare subject: string;
  declare text: string;
  declare html: string;
  declare sentAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}
OutgoingMail.init(
  columns({
    id,
    to: { ...text, field: 'recipient' },
    subject: text,
    text,
    html: text,
    sentAt: optionalTime,
    createdAt: time,
  }),
  { sequelize, tableName: 'outgoing_mails' },
);
