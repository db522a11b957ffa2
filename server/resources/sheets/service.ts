import { may } from '../../../shared/domain/policy';
import type { MadePlan } from '../../../shared/contracts/plan';
import type { ProductionFile } from '../../../shared/contracts/resources';
import { callSheet } from '../../../shared/domain/sheets/call-sheet';
import { documentName } from '../../../shared/domain/sheets/file-names';
import { runSheet } from '../../../shared/domain/sheets/run-sheet';
import { type Paper, type SheetEdition, wallAt } from '../../../shared/domain/sheets/sheet';
import type { Context } from '../../context';
import type { Membership } from '../../http/actor';
import { Refusal } from '../../http/errors';
import type { VersionModel } from '../../models/plans';
import { BusyError, NoBrowserError, PrintError } from '../../sheets/pdf';
import { printablePlan } from '../plans/published';

export interface PrintedSheet {
  name: string;
  content: Uint8Array;
}

interface Asked {
  /** A version's number, or `draft:` and the id of a draft; absent = the newest version. */
  version?: string;
  paper?: Paper;
}

interface Printable {
  file: ProductionFile;
  plan: MadePlan;
  edition: SheetEdition;
}

async function newestVersion({ db }: Context, productionId: string): Promise<string> {
  const newest = await db.versions.max<number | null, VersionModel>('number', { where: { productionId } });
  if (newest === null)
    throw new Refusal('not-found', 'Nothing is published yet. Publish a plan first, or print a draft from the page Sheets.');
  return String(newest);
}

async function printable(context: Context, member: Membership, asked: Asked): Promise<Printable> {
  const named = asked.version ?? (await newestVersion(context, member.productionId));
  const { file, outcome, version } = await printablePlan(context, member.productionId, named);
  if (outcome.cost === null)
    throw new Refusal('conflict', 'This draft is no plan: there is nothing to print. Solve again on the page Plan.');
  return { file, plan: outcome, edition: { version, printed: wallAt(context.now().getTime(), file.production.timezone) } };
}

/** Prints, and says in words what is missing where it cannot be done. */
async function printed({ log }: Context, work: Promise<Uint8Array>): Promise<Uint8Array> {
  try {
    return await work;
  } catch (error) {
    if (error instanceof NoBrowserError || error instanceof BusyError) throw new Refusal('cannot-print', error.message);
    if (error instanceof PrintError) {
      log.error({ err: error }, 'a sheet could not be printed');
      throw new Refusal('cannot-print', 'The sheet could not be printed this time. Try again; if it stays so, start Redpoll again.');
    }
    throw error;
  }
}

export async function printRunSheet(
  context: Context,
  member: Membership,
  asked: Asked & { date: string; room?: string },
): Promise<PrintedSheet> {
  const { file, plan, edition } = await printable(context, member, asked);
  const { date, room, paper } = asked;
  const sheet = runSheet(file, plan, { date, edition, ...(room === undefined ? {} : { room }), ...(paper === undefined ? {} : { paper }) });
  if (!sheet) throw new Refusal('not-found', 'This plan uses no such room on that date. Choose one of the days on the page Sheets.');
  const { code } = file.production;
  const name = documentName({ code, version: edition.version, date, ...(room === undefined ? {} : { room }) }, 'RUN-SHEET.pdf');
  return { name, content: await printed(context, context.press.runSheet(sheet)) };
}

/** Who may not print everything prints the call sheet of their own, from a published version. */
function demandOwn(member: Membership, person: string | null, asked: Asked): asserts person is string {
  if (may(member.role, 'print')) {
    if (person === null) throw new Refusal('wrong-fields', 'The address: person should be the id of somebody whom the plan calls.');
    return;
  }
  if (person === null || person !== member.person || asked.version?.startsWith('draft:'))
    throw new Refusal('not-allowed', 'You may print your own call sheet of a published plan. Ask the producer for anything else.');
}

export async function printCallSheet(context: Context, member: Membership, asked: Asked & { person?: string }): Promise<PrintedSheet> {
  const person = asked.person ?? member.person;
  demandOwn(member, person, asked);
  const { file, plan, edition } = await printable(context, member, asked);
  const sheet = callSheet(file, plan, { person, edition, ...(asked.paper === undefined ? {} : { paper: asked.paper }) });
  if (!sheet) throw new Refusal('not-found', 'This plan does not call that person. Choose one of the people on the page Sheets.');
  const name = documentName({ code: file.production.code, version: edition.version, person }, 'CALL-SHEET.pdf');
  return { name, content: await printed(context, context.press.callSheet(sheet)) };
}
