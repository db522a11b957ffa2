import type { Rules } from '../../contracts/head';
import type { Pass } from '../../contracts/resources';
import type { Minutes, PassId, PersonId, RoomId } from '../../domain/flavours';
import type { Place } from './places';
import type { Edge, EventFacts, Pair, Statement } from './statement';

/**
 * A statement with some of its facts dropped. It notes which facts were asked for, so that facts that play no part in a clash are
 * known without trying each.
 */
export interface View {
  statement: Statement;
  /** Whether a fact holds. */
  has(fact: string): boolean;
  /** Facts that hold and were asked for. */
  asked: ReadonlySet<string>;
  /** Places already worked out under this view. */
  places: Map<PassId, Place[]>;
  /** The needed passes, once they are worked out. */
  needed?: readonly Pass[];
}

export function viewOf(statement: Statement, dropped: ReadonlySet<string>): View {
  const asked = new Set<string>();
  return {
    statement,
    asked,
    places: new Map(),
    has(fact) {
      if (dropped.has(fact)) return false;
      asked.add(fact);
      return true;
    },
  };
}

/** What a rule is when it is dropped: it asks for nothing. */
const FREE: Required<Rules> = {
  step: 1,
  mealAfter: Infinity,
  meal: 0,
  breakAfter: 0,
  break: 0,
  wrap: 0,
  listen: 0,
  reserve: 0,
  turnaround: 0,
  changeover: 0,
  oneRoomPerSong: false,
};

export function ruleOf<Name extends keyof Rules>(view: View, name: Name): Required<Rules>[Name] {
  const value = view.statement.rules[name];
  return value === FREE[name] || !view.has(`rules.${name}`) ? FREE[name] : value;
}

/** A field of a pass, unless it was dropped. */
export function fieldOf<Field extends 'pin' | 'uses' | 'voice' | 'loud' | 'quiet' | 'setup'>(
  view: View,
  pass: Pass,
  field: Field,
): Pass[Field] | undefined {
  return pass[field] !== undefined && view.has(`passes.${pass.id}.${field}`) ? pass[field] : undefined;
}

/** Where a pass must be: its room, else that of its set-up. */
export function roomIdOf(statement: Statement, pass: Pass): RoomId | undefined {
  return pass.room ?? (pass.setup === undefined ? undefined : statement.setups.get(pass.setup)?.room);
}

/** Everybody of a pass: its people and the operators of its room. */
export function castOf(statement: Statement, pass: Pass): ReadonlySet<PersonId> {
  return statement.casts.get(pass.id)!;
}

export function roundUp(view: View, minutes: Minutes): Minutes {
  const step = ruleOf(view, 'step');
  return Math.ceil(minutes / step) * step;
}

/** The minutes that the schedule uses. */
export function minutesOf(view: View, pass: Pass): Minutes {
  const { minutes } = pass;
  const likely = typeof minutes === 'number' ? minutes : minutes.length === 3 ? minutes[1] : minutes[0];
  return roundUp(view, likely);
}

export function eventsThatHold(view: View, events: readonly EventFacts[]): EventFacts[] {
  return events.filter(({ event }) => view.has(`events.${event.id}`));
}

export function edgesThatHold(view: View, edges: readonly Edge[]): Edge[] {
  return edges.filter((edge) => view.has(`passes.${edge.from}`) && view.has(`passes.${edge.to}`) && view.has(edge.fact));
}

export function pairsThatHold(view: View, pairs: readonly Pair[]): Pair[] {
  return pairs.filter((pair) => view.has(`passes.${pair.one}`) && view.has(`passes.${pair.other}`) && view.has(pair.fact));
}

/** Whether somebody left the pass out by hand. */
export function leftOut(view: View, pass: Pass): boolean {
  return pass.leftOut === true && view.has(`passes.${pass.id}.leftOut`);
}

/**
 * Whether every valid plan places the pass: it is a must, or one needs it by `after`, `before` or `together`. A pass that is left out by
 * hand is needed all the same where a must needs it.
 */
export function isNeeded(view: View, id: PassId): boolean {
  const { passes, priorities, edgesFrom, togetherWith } = view.statement;
  const waiting = [id];
  const seen = new Set(waiting);
  for (let next = waiting.pop(); next !== undefined; next = waiting.pop()) {
    const pass = passes.get(next);
    if (!pass || !view.has(`passes.${next}`)) continue;
    if (priorities.get(next) === 'must' && !leftOut(view, pass)) return true;
    const reach = (other: PassId, fact: string) => {
      if (seen.has(other) || !view.has(fact)) return;
      seen.add(other);
      waiting.push(other);
    };
    for (const edge of edgesFrom.get(next) ?? []) reach(edge.to, edge.fact);
    for (const pair of togetherWith.get(next) ?? []) reach(pair.one === next ? pair.other : pair.one, pair.fact);
  }
  return false;
}

/** The passes that every valid plan places, in the order of the file. */
export function neededPasses(view: View): readonly Pass[] {
  view.needed ??= [...view.statement.passes.values()].filter((pass) => isNeeded(view, pass.id));
  return view.needed;
}
