import type { MadePlan } from '../../../shared/contracts/plan';
import type { ProductionFile } from '../../../shared/contracts/resources';
import { namesOf } from '../../../shared/domain/sheets/names';
import { whoWaits } from '../../../shared/planner/waiting';
import { dayWords } from '../../../shared/time/words';

/** One person's waiting over the days, the longest day first. */
export interface PersonWaits {
  name: string;
  minutes: number;
  days: { title: string; minutes: number; gaps: string[] }[];
}

/** Who waits in a plan, whoever waits longest first. */
export function waitsOf(file: ProductionFile, plan: MadePlan): PersonWaits[] {
  const names = namesOf(file);
  const byPerson = new Map<string, PersonWaits>();
  for (const { person, date, waiting, gaps } of whoWaits(file, plan)) {
    const entry = byPerson.get(person) ?? { name: names.short(person), minutes: 0, days: [] };
    entry.minutes += waiting;
    entry.days.push({ title: dayWords(date), minutes: waiting, gaps: gaps.map(({ says }) => says) });
    byPerson.set(person, entry);
  }
  return [...byPerson.values()].sort((a, b) => b.minutes - a.minutes);
}
