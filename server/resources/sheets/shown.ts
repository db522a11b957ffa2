import { Op } from 'sequelize';
import type { SheetChoice, SheetsPlan } from '../../../shared/contracts/sheets';
import { may } from '../../../shared/domain/policy';
import { readableFile } from '../../../shared/domain/readable';
import type { Context } from '../../context';
import type { Membership } from '../../http/actor';
import { Refusal } from '../../http/errors';
import { printablePlan } from '../plans/published';

/** Every plan that this member may print: the versions, and before them a draft that is newer than all of them. */
async function choicesOf({ db }: Context, member: Membership): Promise<SheetChoice[]> {
  const { productionId } = member;
  const versions = await db.versions.findAll({
    where: { productionId },
    attributes: ['number', 'planId', 'publishedAt'],
    order: [['number', 'DESC']],
  });
  const published = versions.map(({ number, publishedAt }): SheetChoice => ({
    named: String(number),
    version: number,
    at: publishedAt.toISOString(),
  }));
  if (!may(member.role, 'readDrafts')) return published;
  const draft = await db.plans.findOne({
    where: { productionId, cost: { [Op.ne]: null } },
    attributes: ['id', 'createdAt'],
    order: [['createdAt', 'DESC']],
  });
  const newest = versions[0];
  if (!draft || (newest && (draft.createdAt <= newest.publishedAt || versions.some(({ planId }) => planId === draft.id)))) return published;
  return [{ named: `draft:${draft.id}`, version: null, at: draft.createdAt.toISOString() }, ...published];
}

/** What the page of sheets shows: the plan named, else the newest version, else the newest draft. */
export async function sheetsPlanOf(context: Context, member: Membership, named: string | undefined): Promise<SheetsPlan> {
  const choices = await choicesOf(context, member);
  const wanted = named ?? (choices.find(({ version }) => version !== null) ?? choices[0])?.named;
  if (wanted === undefined) throw new Refusal('not-found', 'Nothing is published yet. Publish a plan first.');
  const drafted = wanted.startsWith('draft:');
  if (drafted && !may(member.role, 'readDrafts'))
    throw new Refusal('not-allowed', 'Drafts are for the crew. Wait until the plan is published, or ask the producer.');
  const { file, outcome, version, at } = await printablePlan(context, member.productionId, wanted);
  if (outcome.cost === null)
    throw new Refusal('conflict', 'This draft is no plan: there is nothing to print. Solve again on the page Plan.');
  return {
    choices,
    shown: { named: wanted, version, at: at.toISOString() },
    file: readableFile(member, file),
    outcome,
    own: member.person,
  };
}
