import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';
import type { CallChange } from '../../shared/contracts/api';
import type { PlanOutcome } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { columns, createdAt, id, json, large, maybeNumber, maybeWords, moment, number, uuid, whole, words } from './columns';

/** A draft: what planning answered for one revision. Never changed. */
export interface PlanModel extends Model<InferAttributes<PlanModel>, InferCreationAttributes<PlanModel>> {
  id: CreationOptional<string>;
  productionId: string;
  inputRevision: number;
  /** Eight bytes: the driver gives them as text. */
  seed: number | string;
  iterations: number | string;
  status: PlanOutcome['status'];
  cost: number | null;
  bound: number | null;
  outcome: PlanOutcome;
  /** The production of that revision, which the plan was made for and is printed with. */
  file: ProductionFile;
  createdBy: string;
  createdAt: CreationOptional<Date>;
}

/** A published plan with the production as it was then. Never changed. */
export interface VersionModel extends Model<InferAttributes<VersionModel>, InferCreationAttributes<VersionModel>> {
  id: CreationOptional<string>;
  productionId: string;
  number: number;
  planId: string;
  fileRevision: number;
  file: ProductionFile;
  changes: CallChange[];
  note: string | null;
  publishedBy: string;
  byName: string;
  publishedAt: Date;
}

/** When one person is called on one date, as one version says it. */
export interface CallModel extends Model<InferAttributes<CallModel>, InferCreationAttributes<CallModel>> {
  id: CreationOptional<string>;
  productionId: string;
  versionId: string;
  personId: string;
  date: string;
  arrive: string;
  ready: string;
  release: string;
  working: number;
  waiting: number;
  uid: string;
  sequence: number;
  status: 'called' | 'cancelled';
  /** When times or status of this call last changed. */
  changedAt: Date;
}

export interface ConfirmationModel extends Model<InferAttributes<ConfirmationModel>, InferCreationAttributes<ConfirmationModel>> {
  id: CreationOptional<string>;
  productionId: string;
  callId: string;
  answer: 'confirmed' | 'declined';
  note: string | null;
  at: CreationOptional<Date>;
}

export function planModels(sequelize: Sequelize) {
  const frozen = { timestamps: false };
  return {
    plans: sequelize.define<PlanModel>(
      'plan',
      columns({
        id,
        productionId: uuid,
        inputRevision: whole,
        seed: large,
        iterations: large,
        status: words,
        cost: maybeNumber,
        bound: maybeNumber,
        outcome: json,
        file: json,
        createdBy: uuid,
        createdAt,
      }),
      { tableName: 'plans', ...frozen },
    ),
    versions: sequelize.define<VersionModel>(
      'version',
      columns({
        id,
        productionId: uuid,
        number: whole,
        planId: uuid,
        fileRevision: whole,
        file: json,
        changes: json,
        note: maybeWords,
        publishedBy: uuid,
        byName: words,
        publishedAt: moment,
      }),
      { tableName: 'versions', ...frozen },
    ),
    calls: sequelize.define<CallModel>(
      'call',
      columns({
        id,
        productionId: uuid,
        versionId: uuid,
        personId: uuid,
        date: words,
        arrive: words,
        ready: words,
        release: words,
        working: number,
        waiting: number,
        uid: uuid,
        sequence: whole,
        status: words,
        changedAt: moment,
      }),
      { tableName: 'calls', ...frozen },
    ),
    confirmations: sequelize.define<ConfirmationModel>(
      'confirmation',
      columns({ id, productionId: uuid, callId: uuid, answer: words, note: maybeWords, at: { ...moment, defaultValue: DataTypes.NOW } }),
      { tableName: 'confirmations', ...frozen },
    ),
  };
}
