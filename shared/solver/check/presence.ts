import type { Person } from '../../contracts/resources';
import type { Minute, Minutes, PersonId, WallDate } from '../../domain/flavours';
import type { Item, Reading } from './reading';
import { lengthOf, mergeSpans, overlap, type Span } from './spans';

/** Something that a person belongs to: a pass, an event, a listen that names them, or their minutes of getting ready. */
export interface Own extends Item {
  readying: boolean;
}
/** From an arrival to a release, split at gaps of at least the person's `away`. */
export interface Stay extends Span {
  /** Minutes in own items, getting ready among them. */
  work: Minutes;
  waiting: Minutes;
}
/** A person on one date. */
export interface PersonDay {
  person: Person;
  date: WallDate;
  /** By start. */
  own: Own[];
  stays: Stay[];
  arrive: Minute;
  /** The start of the first item other than getting ready. */
  ready: Minute;
  release: Minute;
}

/** Every person's days, by person and then by date: what their calls must say. */
export function personDays(reading: Reading): PersonDay[] {
  return [...reading.people.values()].flatMap(({ person }) => {
    const byDate = new Map<WallDate, Own[]>();
    for (const own of ownItems(reading, person.id)) {
      const date = dateOf(reading, own);
      byDate.set(date, [...(byDate.get(date) ?? []), own]);
    }
    return [...byDate].sort(([one], [other]) => (one < other ? -1 : 1)).map(([date, own]) => personDay(reading, person, date, own));
  });
}

/** The date of the room-day in which it lies, past midnight too; an event elsewhere has the date on which it starts. */
function dateOf(reading: Reading, own: Own): WallDate {
  if (own.roomDay) return own.roomDay.date;
  const days = own.room === undefined ? [] : (reading.rooms.get(own.room)?.days ?? []);
  return days.find((day) => day.from <= own.from && own.to <= day.to)?.date ?? own.start.slice(0, 10);
}

function ownItems(reading: Reading, person: PersonId): Own[] {
  const named = [...reading.items.filter((item) => item.kind === 'pass' || item.kind === 'listen'), ...reading.events.values()]
    .filter((item) => item.people.includes(person))
    .map((item): Own => ({ ...item, readying: false }));
  const passes = named.filter((item) => item.kind === 'pass');
  const readying = reading.items.flatMap((rig): Own[] => {
    const minutes = (rig.setup === undefined ? undefined : reading.setups.get(rig.setup)?.ready?.[person]) ?? 0;
    if (rig.kind !== 'rig' || minutes <= 0 || !playsIn(reading, person, rig)) return [];
    const called = passes.some((pass) => pass.roomDay !== undefined && pass.roomDay === rig.roomDay && pass.from >= rig.to);
    if (!called) return [];
    const from = Math.max(rig.from, rig.to - minutes);
    return [{ ...rig, from, start: reading.clock.wallOf(from), readying: true }];
  });
  return [...readying, ...named].sort((one, other) => one.from - other.from || one.to - other.to);
}

/** Whether the person has a part in a later pass on the set-up that is rigged. */
function playsIn(reading: Reading, person: PersonId, rig: Item): boolean {
  return [...reading.placed].some(([id, item]) => {
    const pass = reading.passes.get(id);
    return pass !== undefined && item.from >= rig.to && pass.setup === rig.setup && item.people.includes(person);
  });
}

function personDay(reading: Reading, person: Person, date: WallDate, own: Own[]): PersonDay {
  const spans: (Span & { work: Minutes })[] = [];
  for (const item of own) {
    const last = spans.at(-1);
    if (!last || (person.away !== undefined && item.from - last.to >= person.away)) {
      spans.push({ from: item.from, to: item.to, work: lengthOf(item) });
      continue;
    }
    last.to = Math.max(last.to, item.to);
    last.work += lengthOf(item);
  }
  const stays = spans.map((stay): Stay => {
    const rest = restWithin(reading, person.id, own, stay);
    return { ...stay, waiting: Math.max(0, lengthOf(stay) - stay.work - rest) };
  });
  const first = own.find((item) => !item.readying) ?? own[0]!;
  return { person, date, own, stays, arrive: stays[0]!.from, ready: first.from, release: stays.at(-1)!.to };
}

/** Minutes of a stay that are rest: meals and breaks in it that hold for the person, up to what its length earns. */
function restWithin(reading: Reading, person: PersonId, own: readonly Own[], stay: Span): Minutes {
  const { meal, mealAfter, breakAfter } = reading.rules;
  const rooms = new Set(own.map((item) => item.room));
  const pauses = (kind: 'meal' | 'break'): Minutes => {
    const held = reading.items.filter((item) => {
      const forThem = item.people.length === 0 ? rooms.has(item.room) : item.people.includes(person);
      const inside = item.from >= stay.from && item.to <= stay.to;
      return item.kind === kind && forThem && inside && !own.some((work) => overlap(work, item));
    });
    return mergeSpans(held).reduce((sum, span) => sum + lengthOf(span), 0);
  };
  const meals = meal === 0 ? 0 : Math.min(pauses('meal'), Math.ceil(lengthOf(stay) / mealAfter) * meal);
  const breaks = breakAfter === 0 ? 0 : Math.min(pauses('break'), Math.floor(lengthOf(stay) / breakAfter) * reading.rules.break);
  return meals + breaks;
}
