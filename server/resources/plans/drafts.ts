import type { z } from 'zod';
import type { Draft, draftRequest, Fault } from '../../../shared/contracts/api';
import type { PlanOutcome } from '../../../shared/contracts/plan';
import type { ProductionFile } from '../../../shared/contracts/resources';
import { fileOf } from '../../../shared/domain/changes';
import { effectivePasses } from '../../../shared/planner/derive';
import { checkPlan } from '../../../shared/solver/check/check';
import type { Context } from '../../context';
import type { Actor, Membership } from '../../http/actor';
import { Refusal } from '../../http/errors';
import { validId } from '../../http/validate';
import type { PlanModel } from '../../models/plans';
import { loadRows } from '../changes/rows';
import { lockProduction } from '../changes/service';

const MOST = 30;

/** Every rule of its production that a plan breaks, in words; none where it says that no plan can be made. */
export function brokenRules(file: ProductionFile, outcome: PlanOutcome): Fault[] {
  if (outcome.cost === null) return [];
  const { violations } = checkPlan({ ...file, passes: effectivePasses(file) }, outcome);
  return violations.map(({ rule, says }) => ({ path: `plan.${rule}`, expected: says }));
}

/** Keeps a plan as a draft: made from the production as it stands, and checked against it. */
export async function storeDraft(context: Context, actor: Actor, member: Membership, asked: z.infer<typeof draftRequest>): Promise<Draft> {
  const { db } = context;
  const { productionId } = member;
  const { outcome } = asked;
  return db.sequelize.transaction(async (transaction) => {
    const { revision } = await lockProduction(context, productionId, transaction);
    if (asked.inputRevision !== revision)
      throw new Refusal(
        'conflict',
        'The production has changed since this plan was begun. Solve again: the plan is then made from what is there now.',
      );
    const file = fileOf((await loadRows(db, productionId, transaction)).all());
    const broken = brokenRules(file, outcome);
    if (broken[0]) throw new Refusal('wrong-fields', `This plan breaks a rule: ${broken[0].expected} Solve again.`, broken);
    const plan = await db.plans.create(
      {
        productionId,
        inputRevision: revision,
        seed: asked.seed,
        iterations: asked.iterations,
        status: outcome.status,
        cost: outcome.cost?.total ?? null,
        bound: outcome.bound,
        outcome,
        file,
        createdBy: actor.userId,
        createdAt: context.now(),
      },
      { transaction },
    );
    return presentDraft(plan, null);
  });
}

function presentDraft(plan: PlanModel, version: number | null): Draft {
  return {
    id: plan.id,
    inputRevision: plan.inputRevision,
    seed: Number(plan.seed),
    iterations: Number(plan.iterations),
    createdAt: plan.createdAt.toISOString(),
    version,
    outcome: plan.outcome,
  };
}

async function versionNumbers({ db }: Context, productionId: string): Promise<Map<string, number>> {
  const versions = await db.versions.findAll({ where: { productionId }, attributes: ['planId', 'number'] });
  return new Map(versions.map(({ planId, number }) => [planId, number]));
}

/** The latest drafts, the newest first. */
export async function listDrafts(context: Context, { productionId }: Membership): Promise<Draft[]> {
  const numbers = await versionNumbers(context, productionId);
  const plans = await context.db.plans.findAll({
    where: { productionId },
    attributes: { exclude: ['file'] },
    order: [
      ['createdAt', 'DESC'],
      ['id', 'ASC'],
    ],
    limit: MOST,
  });
  return plans.map((plan) => presentDraft(plan, numbers.get(plan.id) ?? null));
}

export async function readDraft(context: Context, { productionId }: Membership, id: string | undefined): Promise<Draft> {
  const plan = await context.db.plans.findOne({ where: { productionId, id: validId(id) } });
  if (!plan) throw new Refusal('not-found', 'There is no such draft any more. Solve again on the page Plan.');
  return presentDraft(plan, (await versionNumbers(context, productionId)).get(plan.id) ?? null);
}
