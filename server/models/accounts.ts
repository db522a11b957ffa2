import { type CreationOptional, type InferAttributes, type InferCreationAttributes, type Model, type Sequelize } from 'sequelize';
import { columns, createdAt, id, maybeMoment, maybeWords, moment, uuid, words } from './columns';

/** A person with an account; without e-mail and password a trial user of this machine. */
export interface UserModel extends Model<InferAttributes<UserModel>, InferCreationAttributes<UserModel>> {
  id: CreationOptional<string>;
  email: string | null;
  name: string;
  passwordHash: string | null;
}

/** A signed-in device; a token is good only while its session is neither ended nor expired. */
export interface SessionModel extends Model<InferAttributes<SessionModel>, InferCreationAttributes<SessionModel>> {
  id: CreationOptional<string>;
  userId: string;
  createdAt: CreationOptional<Date>;
  expiresAt: Date;
  endedAt: Date | null;
}

export function accountModels(sequelize: Sequelize) {
  return {
    users: sequelize.define<UserModel>(
      'user',
      columns({
        id,
        email: maybeWords,
        name: words,
        passwordHash: maybeWords,
      }),
      { tableName: 'users' },
    ),
    sessions: sequelize.define<SessionModel>(
      'session',
      columns({
        id,
        userId: uuid,
        createdAt,
        expiresAt: moment,
        endedAt: maybeMoment,
      }),
      { tableName: 'sessions', timestamps: false },
    ),
  };
}
