import type { MadePlan, PlanCall, PlanOutcome } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import type { PersonId } from '../flavours';
import { callFacts } from '../sheets/call-facts';
import { callDays } from '../sheets/call-sheet';
import { namesOf } from '../sheets/names';
import type { CallDay, CallFact } from '../sheets/sheet';

/** The words of a call in a calendar. They change only when the call or what it is about changes, never with the version alone. */
export interface CallText {
  summary: string;
  location: string;
  description: string;
}

/** Facts of the call sheet that are worth having on a phone; food and access stay on paper. */
const CARRIED = new Set(['Door', 'Parking', 'Phone', 'Late?', 'Bring', 'Wear', 'Ears']);

function describe(day: CallDay, facts: readonly CallFact[]): string {
  const { earliest, likely, latest } = day.release;
  const range = earliest === latest ? likely : `about ${likely} (${earliest}–${latest})`;
  const lines = day.lines.map((line) => {
    const what = [line.code, line.title].filter((text) => text !== '').join(' ');
    const details = [line.part, line.key, line.tempo, line.note].filter((text) => text !== '').join(' · ');
    return `${line.from} ${what}${details === '' ? '' : `: ${details}`}`;
  });
  return [
    `Ready to play ${day.ready}, free to go ${range}`,
    ...lines,
    '',
    ...facts.map(({ label, says }) => `${label}${label.endsWith('?') ? '' : ':'} ${says}`),
  ]
    .join('\n')
    .trim();
}

/** What a calendar is called in somebody's list of calendars. */
export function calendarName(file: ProductionFile, person: PersonId): string {
  return `${file.production.title}: ${namesOf(file).short(person)}`;
}

export function summaryOf(file: ProductionFile): string {
  return `${file.production.title}: call`;
}

/** The words of every call of a plan, by person and date, as one string each: what differs was worded anew. */
export function wordedCalls(file: ProductionFile, plan: PlanOutcome): Map<string, string> {
  if (plan.cost === null) return new Map();
  const people = [...new Set(plan.calls.map((call) => call.person))];
  return new Map(
    people.flatMap((person) =>
      callTexts(file, plan, person).map(({ call, text }): [string, string] => [`${person} ${call.date}`, JSON.stringify(text)]),
    ),
  );
}

/** The words of every call of one person. */
export function callTexts(file: ProductionFile, plan: MadePlan, person: PersonId): { call: PlanCall; text: CallText }[] {
  const { place } = file.production;
  const facts = callFacts(file, plan, person).filter((fact) => CARRIED.has(fact.label));
  const address = [place?.name, place?.address].filter(Boolean).join(', ');
  return callDays(file, plan, person).map(({ call, day }) => ({
    call,
    text: {
      summary: summaryOf(file),
      location: [address, day.room].filter((text) => text !== '').join(', '),
      description: describe(day, facts),
    },
  }));
}
