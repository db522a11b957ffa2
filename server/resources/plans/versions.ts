import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type { publishRequest, PublishedPlan, Version } from '../../../shared/contracts/api';
import type { PlanCall } from '../../../shared/contracts/plan';
import { wordedCalls } from '../../../shared/domain/calendar/call-text';
import { fileOf } from '../../../shared/domain/changes';
import { callChanges } from '../../../shared/planner/callChanges';
import type { Context } from '../../context';
import type { Actor, Membership } from '../../http/actor';
import { Refusal } from '../../http/errors';
import type { PlanModel, VersionModel } from '../../models/plans';
import { loadRows } from '../changes/rows';
import { lockProduction } from '../changes/service';
import { nextCalls } from './calls';
import { brokenRules } from './drafts';

async function demandPlan({ db }: Context, productionId: string, id: string, transaction: Transaction): Promise<PlanModel> {
  const plan = await db.plans.findOne({ where: { productionId, id }, transaction });
  if (!plan) throw new Refusal('not-found', 'There is no such draft any more. Solve again, then publish.');
  const published = await db.versions.findOne({ where: { planId: id }, attributes: ['number'], transaction });
  if (published) throw new Refusal('conflict', `This plan is already published as version ${published.number}.`);
  if (plan.cost === null)
    throw new Refusal('wrong-fields', 'This draft is no plan: it could not be made. Mend what clashes and solve again.');
  return plan;
}

/** Publishes a draft: gives it the next number, freezes it with the production of this moment, and carries its calls on. */
export async function publish(
  context: Context,
  actor: Actor,
  { productionId }: Membership,
  asked: z.infer<typeof publishRequest>,
): Promise<Version> {
  const { db } = context;
  return db.sequelize.transaction(async (transaction) => {
    const { revision } = await lockProduction(context, productionId, transaction);
    const plan = await demandPlan(context, productionId, asked.plan, transaction);
    const rows = await loadRows(db, productionId, transaction);
    const file = fileOf(rows.all());
    const broken = plan.inputRevision === revision ? [] : brokenRules(file, plan.outcome);
    if (broken[0])
      throw new Refusal(
        'conflict',
        `The production has changed since this plan was made, and it no longer holds: ${broken[0].expected} Solve again, then publish.`,
        broken,
      );
    const last = await db.versions.findOne({ where: { productionId }, order: [['number', 'DESC']], transaction });
    const before = last ? await db.calls.findAll({ where: { versionId: last.id }, transaction }) : [];
    const personOf = (id: string) => rows.keyOf('people', id) ?? '';
    const earlier = before.filter((call) => call.status === 'called').map((call) => planCallOf(call, personOf(call.personId)));
    const now = context.now();
    const version = await db.versions.create(
      {
        productionId,
        number: (last?.number ?? 0) + 1,
        planId: plan.id,
        fileRevision: revision,
        file,
        changes: callChanges(last ? earlier : null, plan.outcome.calls),
        note: asked.note ?? null,
        publishedBy: actor.userId,
        byName: actor.name,
        publishedAt: now,
      },
      { transaction },
    );
    const wordsBefore = last ? await wordsOf(context, last, transaction) : null;
    const words = wordedCalls(file, plan.outcome);
    const planned = plan.outcome.calls.map((call) => {
      const key = `${call.person} ${call.date}`;
      return { call, personId: rows.idOf('people', call.person) ?? '', worded: words.get(key) !== wordsBefore?.get(key) };
    });
    await db.calls.bulkCreate(
      nextCalls(before, planned, now).map((call) => ({ ...call, productionId, versionId: version.id })),
      { transaction },
    );
    return presentVersion(version);
  });
}

/** What the calendars said of every call of a version. */
async function wordsOf({ db }: Context, { file, planId }: VersionModel, transaction: Transaction): Promise<Map<string, string>> {
  const { outcome } = await db.plans.findOne({ where: { id: planId }, rejectOnEmpty: true, transaction });
  return wordedCalls(file, outcome);
}

const planCallOf = ({ date, arrive, ready, release, working, waiting }: Omit<PlanCall, 'person'>, person: string): PlanCall => ({
  person,
  date,
  arrive,
  ready,
  release,
  working,
  waiting,
});

function presentVersion(version: VersionModel): Version {
  return {
    number: version.number,
    plan: version.planId,
    publishedAt: version.publishedAt.toISOString(),
    by: version.byName,
    note: version.note,
    changes: version.changes,
  };
}

/** Every published version, the newest first. */
export async function listVersions({ db }: Context, { productionId }: Membership): Promise<Version[]> {
  const versions = await db.versions.findAll({
    where: { productionId },
    attributes: { exclude: ['file'] },
    order: [['number', 'DESC']],
  });
  return versions.map(presentVersion);
}

export async function readVersion({ db }: Context, { productionId }: Membership, named: string | undefined): Promise<PublishedPlan> {
  const number = /^[1-9]\d{0,8}$/.test(named ?? '') ? Number(named) : 0;
  const version = await db.versions.findOne({
    where: { productionId, number },
    attributes: { exclude: ['file'] },
    include: [{ association: 'plan', required: true }],
  });
  if (!version) throw new Refusal('not-found', 'There is no such version. Choose one of those that were published.');
  const { inputRevision, outcome } = version.get('plan') as PlanModel;
  return { ...presentVersion(version), inputRevision, outcome };
}
