import type { PlanOutcome } from '../../../shared/contracts/plan';
import type { PersonId } from '../../../shared/domain/flavours';
import type { ProductionFile } from '../../../shared/contracts/resources';
import type { Context } from '../../context';
import { Refusal } from '../../http/errors';
import { validId } from '../../http/validate';
import type { CallModel } from '../../models/plans';

/** A plan with the production it is read with: all of it, so whoever shows it chooses what its reader may see. */
export interface PrintablePlan {
  file: ProductionFile;
  outcome: PlanOutcome;
  /** Null for a draft. */
  version: number | null;
  /** When it was published, or made. */
  at: Date;
}

/** The plan that a sheet names: a version's number, or `draft:` and the id of a draft. */
export async function printablePlan({ db }: Context, productionId: string, named: string): Promise<PrintablePlan> {
  if (named.startsWith('draft:')) {
    const plan = await db.plans.findOne({ where: { productionId, id: validId(named.slice('draft:'.length)) } });
    if (!plan) throw new Refusal('not-found', 'There is no such draft any more. Solve again on the page Plan.');
    return { file: plan.file, outcome: plan.outcome, version: null, at: plan.createdAt };
  }
  const number = /^[1-9]\d{0,8}$/.test(named) ? Number(named) : 0;
  const version = await db.versions.findOne({ where: { productionId, number }, include: [{ association: 'plan', required: true }] });
  if (!version) throw new Refusal('not-found', 'There is no such version. Choose one of those that were published.');
  const { outcome } = version.get('plan') as { outcome: PlanOutcome };
  return { file: version.file, outcome, version: version.number, at: version.publishedAt };
}

/** A person's calls in the newest published version, those that were cancelled since an earlier one too. */
export interface PublishedCalls {
  person: PersonId;
  version: number;
  publishedAt: Date;
  file: ProductionFile;
  outcome: PlanOutcome;
  /** By date. `uid` and `sequence` stay a call's own through all versions. */
  calls: CallModel[];
}

/** What the calendar of a person is written from; null while nothing was published. `personId` is the id of the row. */
export async function publishedCallsOf({ db }: Context, productionId: string, personId: string): Promise<PublishedCalls | null> {
  const version = await db.versions.findOne({
    where: { productionId },
    order: [['number', 'DESC']],
    include: [{ association: 'plan', required: true }],
  });
  const person = await db.rows.people.findOne({ where: { productionId, id: personId }, attributes: ['key'] });
  if (!version || !person) return null;
  const calls = await db.calls.findAll({ where: { versionId: version.id, personId }, order: [['date', 'ASC']] });
  const { outcome } = version.get('plan') as { outcome: PlanOutcome };
  return {
    person: String(person.get('key')),
    version: version.number,
    publishedAt: version.publishedAt,
    file: version.file,
    outcome,
    calls,
  };
}
