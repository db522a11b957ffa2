import type { Conflict } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import type { NecessaryCondition } from './condition';
import { narrow } from './narrow';
import { couples } from './necessary/couples';
import { eventsApart, eventsOfAPerson } from './necessary/events';
import { leftOutByHand } from './necessary/left-out';
import { order } from './necessary/order';
import { personMinutes } from './necessary/person-minutes';
import { placement } from './necessary/placement';
import { ring } from './necessary/ring';
import { roomMinutes } from './necessary/room-minutes';
import { stateFile } from './statement';
import { viewOf } from './view';
import { reasonWords } from './words';

/** From what is plain to what takes many facts together. */
const CONDITIONS: readonly NecessaryCondition[] = [
  ring,
  eventsApart,
  eventsOfAPerson,
  leftOutByHand,
  placement,
  couples,
  roomMinutes,
  personMinutes,
  order,
];
const MOST_CONFLICTS = 12;

/**
 * Why no valid plan of a production exists: sets of facts that clash, each minimal (with any one of its facts dropped, that clash is gone)
 * and no two about the same pass. Empty where nothing is proven, which does not mean that a plan exists.
 * @param file its passes written out: give `{ ...file, passes: effectivePasses(file) }` where they are derived
 * @param stop asked between proofs; the conflicts found by then are returned
 */
export function explainImpossible(file: ProductionFile, stop: () => boolean): Conflict[] {
  const statement = stateFile(file);
  const conflicts: Conflict[] = [];
  const settled = new Set<string>();
  for (const condition of CONDITIONS) {
    let view = viewOf(statement, settled);
    for (const subject of condition.subjects(view)) {
      // An order without a place can have several reasons, one after another.
      for (;;) {
        if (conflicts.length >= MOST_CONFLICTS || (conflicts.length > 0 && stop())) return conflicts;
        if (condition.fails(view, subject) === null) break;
        const { facts, dropped } = narrow(statement, condition, subject, settled);
        const headline = condition.fails(viewOf(statement, dropped), subject) ?? condition.name;
        conflicts.push({ facts: named(facts), says: `${headline}: ${reasonWords(statement, condition.bare ? named(facts) : facts)}.` });
        for (const fact of facts) if (isSubject(fact)) settled.add(fact);
        view = viewOf(statement, settled);
      }
      if (conflicts.length === 0 && stop()) return conflicts;
    }
  }
  return conflicts;
}

/** A pass or an event, whose removal makes a clash go away for good. */
const isSubject = (fact: string): boolean => /^(passes|events)\.[^.]+$/.test(fact);

/** A field of a pass names the pass already. */
function named(facts: readonly string[]): string[] {
  return facts.filter((fact) => !facts.some((other) => other.startsWith(`${fact}.`))).sort();
}
