import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { MadePlan, PlanOutcome } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { calendarName, callTexts } from '../../shared/domain/calendar/call-text';
import { callSheet, calledPeople } from '../../shared/domain/sheets/call-sheet';
import { documentName } from '../../shared/domain/sheets/file-names';
import { runSheet, runSheetDates } from '../../shared/domain/sheets/run-sheet';
import { type SheetEdition, wallAt } from '../../shared/domain/sheets/sheet';
import { uidOf } from '../calendar/uid';
import { writeCalendar } from '../calendar/write';
import { SheetPress } from './press';

export interface WriteSheetsOptions {
  now: Date;
  /** The Chromium to print with; absent = Debian's. */
  chromium?: string;
}

/**
 * Writes a plan that nobody has published to a folder: a run sheet for each day, a call sheet and a calendar for each person. The
 * sheets say that it is a draft, the calls are tentative.
 * @returns the names of the files, in the order written; none where there is no plan.
 */
export async function writeSheets(
  file: ProductionFile,
  outcome: PlanOutcome,
  folder: string,
  { now, chromium }: WriteSheetsOptions,
): Promise<string[]> {
  if (outcome.cost === null) return [];
  await mkdir(folder, { recursive: true });
  const names: string[] = [];
  const write = async (name: string, content: Uint8Array | string) => {
    await writeFile(path.join(folder, name), content);
    names.push(name);
  };
  const press = new SheetPress(chromium);
  try {
    for (const { name, content } of sheetsOf(file, outcome, press, now)) await write(name, await content());
  } finally {
    await press.close();
  }
  for (const person of calledPeople(file, outcome))
    await write(
      documentName({ code: file.production.code, version: null, person }, 'CALLS.ics'),
      draftCalendar(file, outcome, person, now),
    );
  return names;
}

function* sheetsOf(
  file: ProductionFile,
  plan: MadePlan,
  press: SheetPress,
  now: Date,
): Generator<{ name: string; content: () => Promise<Uint8Array> }> {
  const { code, timezone } = file.production;
  const edition: SheetEdition = { version: null, printed: wallAt(now.getTime(), timezone) };
  for (const date of runSheetDates(file, plan)) {
    const sheet = runSheet(file, plan, { date, edition });
    if (sheet) yield { name: documentName({ code, version: null, date }, 'RUN-SHEET.pdf'), content: () => press.runSheet(sheet) };
  }
  for (const person of calledPeople(file, plan)) {
    const sheet = callSheet(file, plan, { person, edition });
    if (sheet) yield { name: documentName({ code, version: null, person }, 'CALL-SHEET.pdf'), content: () => press.callSheet(sheet) };
  }
}

function draftCalendar(file: ProductionFile, plan: MadePlan, person: string, now: Date): string {
  const { code, title, timezone } = file.production;
  return writeCalendar({
    name: calendarName(file, person),
    timezone,
    events: callTexts(file, plan, person).map(({ call, text }) => ({
      uid: uidOf(code, title, person, call.date),
      sequence: 0,
      changedAt: now,
      status: 'tentative',
      from: call.arrive,
      to: call.release,
      ...text,
    })),
  });
}
