import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize';
import { sequelize } from '../database/connection';
import { columns, bool, optionalText, optionalTime, text, time } from './columns';

export class User extends Model<InferAttributes<User>, InferCreationAttributes<User>> {
  declare id: string;
  declare name: string;
  declare email: string;
  declare emailVerified: boolean;
  declare image: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}
User.init(
  columns({
    id: { ...text, primaryKey: true },
    name: text,
    email: text,
    emailVerified: bool,
    image: optionalText,
    createdAt: time,
    updatedAt: time,
  }),
  { sequelize, tableName: 'users' },
);

export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: string;
  declare token: string;
  declare userId: string;
  declare expiresAt: Date;
  declare ipAddress: CreationOptional<string | null>;
  declare userAgent: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}
Session.init(
  columns({
    id: { ...text, primaryKey: true },
    token: text,
    userId: text,
    expiresAt: time,
    ipAddress: optionalText,
    userAgent: optionalText,
    createdAt: time,
    updatedAt: time,
  }),
  { sequelize, tableName: 'sessions' },
);

export class Account extends Model<InferAttributes<Account>, InferCreationAttributes<Account>> {
  declare id: string;
  declare accountId: string;
  declare providerId: string;
  declare userId: string;
  declare accessToken: CreationOptional<string | null>;
  declare refreshToken: CreationOptional<string | null>;
  declare idToken: CreationOptional<string | null>;
  declare accessTokenExpiresAt: CreationOptional<Date | null>;
  declare refreshTokenExpiresAt: CreationOptional<Date | null>;
  declare scope: CreationOptional<string | null>;
  declare password: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}
Account.init(
  columns({
    id: { ...text, primaryKey: true },
    accountId: text,
    providerId: text,
    userId: text,
    accessToken: optionalText,
    refreshToken: optionalText,
    idToken: optionalText,
    accessTokenExpiresAt: optionalTime,
    refreshTokenExpiresAt: optionalTime,
    scope: optionalText,
    password: optionalText,
    createdAt: time,
    updatedAt: time,
  }),
  { sequelize, tableName: 'accounts' },
);

export class Verification extends Model<
  InferAttributes<Verification>,
  InferCreationAttributes<Verification>
> {
  declare id: string;
  declare identifier: string;
  declare value: string;
  declare expiresAt: Date;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}
Verification.init(
  columns({
    id: { ...text, primaryKey: true },
    identifier: text,
    value: text,
    expiresAt: time,
    createdAt: time,
    updatedAt: time,
  }),
  { sequelize, tableName: 'verifications' },
);
