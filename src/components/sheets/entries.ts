import type { SheetsPlan } from '../../../shared/contracts/sheets';
import { may } from '../../../shared/domain/policy';
import type { Role } from '../../../shared/contracts/roles';
import { calledPeople, callSheet } from '../../../shared/domain/sheets/call-sheet';
import { dayCount, usedRoomDays } from '../../../shared/domain/sheets/room-days';
import { runSheet } from '../../../shared/domain/sheets/run-sheet';
import type { CallSheet, Paper, RunSheet } from '../../../shared/domain/sheets/sheet';
import { dayWords } from '../../../shared/time/words';
import type { SheetSubject } from '../../api/sheets';

/** One sheet of the list. */
export interface SheetEntry {
  id: string;
  subject: SheetSubject;
  label: string;
  /** Said quietly beside it: rooms of a day, days of a person. */
  aside: string;
}

export type SheetDocument = { kind: 'run'; sheet: RunSheet } | { kind: 'call'; sheet: CallSheet };

function runEntries({ file, outcome }: SheetsPlan): SheetEntry[] {
  const used = usedRoomDays(file, outcome.items);
  const dates = [...new Set(used.map(({ date }) => date))];
  return dates.map((date) => {
    const rooms = used.filter((day) => day.date === date).map(({ room }) => room.name ?? room.id);
    return {
      id: `run ${date}`,
      subject: { kind: 'run', date },
      label: dayWords(date),
      aside: [dayCount(date, dates), [...new Set(rooms)].join(', ')].join(' · '),
    };
  });
}

function callEntries({ file, outcome }: SheetsPlan, people: readonly string[]): SheetEntry[] {
  return people.map((person) => {
    const dates = [...new Set(outcome.calls.filter((call) => call.person === person).map(({ date }) => date))].sort();
    const known = file.people.find(({ id }) => id === person);
    return {
      id: `call ${person}`,
      subject: { kind: 'call', person },
      label: known?.name ?? known?.short ?? person,
      aside: dates.map((date) => dayWords(date).split(' ').slice(0, 2).join(' ')).join(', '),
    };
  });
}

/** What this reader may print: everything, or the call sheet of their own. */
export function sheetEntries(plan: SheetsPlan, role: Role): { runs: SheetEntry[]; calls: SheetEntry[] } {
  const called = calledPeople(plan.file, plan.outcome);
  if (may(role, 'print')) return { runs: runEntries(plan), calls: callEntries(plan, called) };
  return {
    runs: [],
    calls: callEntries(
      plan,
      called.filter((person) => person === plan.own),
    ),
  };
}

/** The document of a sheet, the same as the server prints it. */
export function documentOf(plan: SheetsPlan, subject: SheetSubject, paper: Paper, printed: string): SheetDocument | null {
  const edition = { version: plan.shown.version, printed };
  if (subject.kind === 'run') {
    const sheet = runSheet(plan.file, plan.outcome, { date: subject.date, edition, paper });
    return sheet && { kind: 'run', sheet };
  }
  const sheet = callSheet(plan.file, plan.outcome, { person: subject.person, edition, paper });
  return sheet && { kind: 'call', sheet };
}
