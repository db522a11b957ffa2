import { type CreationOptional, type InferAttributes, type InferCreationAttributes, type Model, type Sequelize } from 'sequelize';
import type { Role } from '../../shared/contracts/roles';
import { columns, createdAt, id, maybeJson, maybeMoment, maybeUuid, maybeWhole, moment, uuid, whole, words } from './columns';

export interface MemberModel extends Model<InferAttributes<MemberModel>, InferCreationAttributes<MemberModel>> {
  id: CreationOptional<string>;
  productionId: string;
  userId: string;
  role: Role;
  personId: string | null;
}

export interface InvitationModel extends Model<InferAttributes<InvitationModel>, InferCreationAttributes<InvitationModel>> {
  id: CreationOptional<string>;
  productionId: string;
  email: string;
  role: Role;
  personId: string | null;
  tokenHash: string;
  invitedBy: string;
  createdAt: CreationOptional<Date>;
  expiresAt: Date;
  acceptedAt: Date | null;
}

/** A private address: a calendar of one person or a guest's look. The token itself is not kept. */
export interface LinkModel extends Model<InferAttributes<LinkModel>, InferCreationAttributes<LinkModel>> {
  id: CreationOptional<string>;
  productionId: string;
  kind: 'calendar' | 'guest';
  personId: string | null;
  tokenHash: string;
  createdBy: string;
  createdAt: CreationOptional<Date>;
  revokedAt: Date | null;
  lastUsedAt: Date | null;
}

/** One applied change; `before` and `after` hold the fields it named (or, for a whole row, all of them). */
export interface HistoryModel extends Model<InferAttributes<HistoryModel>, InferCreationAttributes<HistoryModel>> {
  id: CreationOptional<string>;
  productionId: string;
  changeId: string;
  revision: number;
  /** Place within the batch. */
  ordinal: number;
  base: number | null;
  userId: string;
  byName: string;
  at: Date;
  resource: string;
  key: string;
  op: string;
  before: Record<string, unknown> | null;
  after: Record<string, unknown> | null;
}

export interface StartingPointModel extends Model<InferAttributes<StartingPointModel>, InferCreationAttributes<StartingPointModel>> {
  slug: string;
  hash: string;
  title: string;
  summary: string;
  songs: number;
  people: number;
  days: number;
  source: string;
  position: number;
}

export function productionModels(sequelize: Sequelize) {
  return {
    members: sequelize.define<MemberModel>('member', columns({ id, productionId: uuid, userId: uuid, role: words, personId: maybeUuid }), {
      tableName: 'members',
    }),
    invitations: sequelize.define<InvitationModel>(
      'invitation',
      columns({
        id,
        productionId: uuid,
        email: words,
        role: words,
        personId: maybeUuid,
        tokenHash: words,
        invitedBy: uuid,
        createdAt,
        expiresAt: moment,
        acceptedAt: maybeMoment,
      }),
      { tableName: 'invitations', timestamps: false },
    ),
    links: sequelize.define<LinkModel>(
      'link',
      columns({
        id,
        productionId: uuid,
        kind: words,
        personId: maybeUuid,
        tokenHash: words,
        createdBy: uuid,
        createdAt,
        revokedAt: maybeMoment,
        lastUsedAt: maybeMoment,
      }),
      { tableName: 'links', timestamps: false },
    ),
    history: sequelize.define<HistoryModel>(
      'historyEntry',
      columns({
        id,
        productionId: uuid,
        changeId: uuid,
        revision: whole,
        ordinal: whole,
        base: maybeWhole,
        userId: uuid,
        byName: words,
        at: moment,
        resource: words,
        key: words,
        op: words,
        before: maybeJson,
        after: maybeJson,
      }),
      { tableName: 'history', timestamps: false },
    ),
    startingPoints: sequelize.define<StartingPointModel>(
      'startingPoint',
      columns({
        slug: { ...words, primaryKey: true },
        hash: words,
        title: words,
        summary: words,
        songs: whole,
        people: whole,
        days: whole,
        source: words,
        position: whole,
      }),
      { tableName: 'starting_points', createdAt: false },
    ),
  };
}
