import { Op, Transaction } from 'sequelize';
import type { Change, ChangesResponse } from '../../../shared/contracts/changes';
import type { Reader } from '../../../shared/domain/policy';
import type { Context } from '../../context';
import { Refusal } from '../../http/errors';
import { Batch, type Effect } from './apply';
import { demandNoNewFault, rowsNamed } from './faults';
import type { HistoryModel } from '../../models/productions';
import { loadRows, presentRows, saveRows, type Rows } from './rows';

/** Who writes, and in which production. */
export interface Writer extends Reader {
  productionId: string;
  userId: string;
  name: string;
}

/** Takes the production for this transaction alone: batches are applied one after another. */
export async function lockProduction(context: Context, productionId: string, transaction: Transaction) {
  const production = await context.db.productions.findByPk(productionId, {
    attributes: ['id', 'revision'],
    transaction,
    // Weaker than a lock for deleting: rows that only refer to the production need not wait.
    lock: transaction.LOCK.NO_KEY_UPDATE,
  });
  if (!production) throw new Refusal('not-found', 'This production was deleted. Go back to the start page.');
  return production;
}

/** Applies a batch, all or none, in a transaction of its own. */
export function applyChanges(context: Context, writer: Writer, changes: readonly Change[]): Promise<ChangesResponse> {
  return context.db.sequelize.transaction((transaction) => applyWithin(context, writer, changes, transaction));
}

/** Applies a batch within a transaction that the caller began: an import makes its production in the same one. */
export async function applyWithin(
  context: Context,
  writer: Writer,
  changes: readonly Change[],
  transaction: Transaction,
): Promise<ChangesResponse> {
  const { db } = context;
  const { productionId } = writer;
  const production = await lockProduction(context, productionId, transaction);
  const before = await loadRows(db, productionId, transaction);
  const fresh = await notYetApplied(context, productionId, changes, transaction);
  if (fresh.length === 0) return { revision: production.revision, rows: presentRows(rowsNamed(before, changes), writer), overwritten: [] };

  const batch = new Batch(before.copy(), writer, production.revision === 0);
  for (const change of fresh) batch.apply(change);
  demandNoNewFault(before, batch.rows, batch.touched);

  const revision = production.revision + 1;
  const now = context.now();
  const touched = [...batch.touched];
  for (const row of touched) row.revision = revision;
  const overwritten = await overwrittenBy(context, writer, batch.effects, transaction);
  await saveRows(db, productionId, batch.rows, touched, { now, transaction });
  await writeHistory(context, writer, batch.effects, { revision, now, transaction });
  await db.productions.update({ revision, updatedAt: now }, { where: { id: productionId }, transaction });
  const answered = new Set([...touched, ...rowsNamed(batch.rows, changes)]);
  return { revision, rows: presentRows([...answered], writer), overwritten };
}

/** The changes whose ids the history does not know, each id once. */
async function notYetApplied(
  { db }: Context,
  productionId: string,
  changes: readonly Change[],
  transaction: Transaction,
): Promise<Change[]> {
  const byId = new Map([...changes].reverse().map((change) => [change.id, change]));
  const applied = await db.history.findAll({
    attributes: ['changeId'],
    where: { productionId, changeId: [...byId.keys()] },
    transaction,
    raw: true,
  });
  for (const { changeId } of applied) byId.delete(changeId);
  return changes.filter((change) => byId.get(change.id) === change);
}

const same = (a: unknown, b: unknown) => JSON.stringify(a ?? null) === JSON.stringify(b ?? null);

/** Fields that somebody else wrote after the revision a change was made on, with another value: the later one wins, and both are told. */
async function overwrittenBy(
  { db }: Context,
  writer: Writer,
  effects: readonly Effect[],
  transaction: Transaction,
): Promise<ChangesResponse['overwritten']> {
  const based = effects.filter(({ change }) => change.op === 'update' && change.base !== undefined);
  if (based.length === 0) return [];
  const oldest = Math.min(...based.map(({ change }) => change.base ?? 0));
  const since = await db.history.findAll({
    where: {
      productionId: writer.productionId,
      revision: { [Op.gt]: oldest },
      userId: { [Op.ne]: writer.userId },
      resource: [...new Set(based.map(({ change }) => change.resource))],
      key: [...new Set(based.map(({ change }) => change.key))],
    },
    transaction,
  });
  return based.flatMap(({ change, before, after }) =>
    Object.keys(change.fields).flatMap((field) => {
      const wasWritten = since.some((entry) => isLater(entry, change) && entry.after !== null && field in entry.after);
      if (!wasWritten || same(before?.[field], after?.[field])) return [];
      return [{ change: change.id, resource: change.resource, key: change.key, field, was: before?.[field] ?? null }];
    }),
  );
}

const isLater = (entry: HistoryModel, change: Change) =>
  entry.resource === change.resource && entry.key === change.key && entry.revision > (change.base ?? 0);

async function writeHistory(
  { db }: Context,
  writer: Writer,
  effects: readonly Effect[],
  at: { revision: number; now: Date; transaction: Transaction },
): Promise<void> {
  await db.history.bulkCreate(
    effects.map(({ change, before, after }, ordinal) => ({
      productionId: writer.productionId,
      changeId: change.id,
      revision: at.revision,
      ordinal,
      base: change.base ?? null,
      userId: writer.userId,
      byName: writer.name,
      at: at.now,
      resource: change.resource,
      key: change.key,
      op: change.op,
      before,
      after,
    })),
    { returning: false, transaction: at.transaction },
  );
}

/** The production as it is now, read as one picture. */
export async function readProduction(context: Context, productionId: string): Promise<{ revision: number; rows: Rows }> {
  return context.db.sequelize.transaction({ isolationLevel: Transaction.ISOLATION_LEVELS.REPEATABLE_READ }, async (transaction) => {
    const production = await context.db.productions.findByPk(productionId, { attributes: ['revision'], transaction });
    if (!production) throw new Refusal('not-found', 'This production was deleted. Go back to the start page.');
    return { revision: production.revision, rows: await loadRows(context.db, productionId, transaction) };
  });
}
