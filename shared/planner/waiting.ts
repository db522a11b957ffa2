import type { MadePlan, PlanCall } from '../contracts/plan';
import type { ProductionFile } from '../contracts/resources';
import { DEFAULT_RULES } from '../domain/defaults';
import type { Minute, Minutes, PersonId, WallDate, WallTime } from '../domain/flavours';
import { clock as clockOf, length } from '../time/words';
import { zoneClock, type ZoneClock } from '../time/wall';
import { minuteOf } from './dayNotes';
import { itemNamer, type ItemNamer } from './itemNames';
import { staysOf, type TimedItem } from './threads';

const MOST_NAMES = 3;

/** A stretch in which somebody who is called has nothing to do. */
export interface Gap {
  from: WallTime;
  to: WallTime;
  minutes: Minutes;
  /** When, how long, what they wait for, and what goes on meanwhile where they are. */
  says: string;
}
/** What one person waits on one date. */
export interface Wait {
  person: PersonId;
  date: WallDate;
  /** As their call says. Pauses beyond what a stay earns count as waiting too, so it may be more than the gaps. */
  waiting: Minutes;
  gaps: Gap[];
}

/** Who waits in a plan, when, and for what: every call with waiting, the longest first. */
export function whoWaits(file: ProductionFile, plan: Pick<MadePlan, 'items' | 'calls'>): Wait[] {
  const zone = zoneClock(file.production.timezone);
  const items = plan.items.map((item): TimedItem => {
    // Who is named at a rig or changeover waits there as far as their call goes, unless they get ready.
    const people = item.kind === 'rig' || item.kind === 'changeover' ? [] : item.people;
    return { ...item, people, from: minuteOf(zone, item.start), to: minuteOf(zone, item.end) };
  });
  items.sort((one, other) => one.from - other.from || one.to - other.to);
  const names = itemNamer(file);
  const waits = plan.calls
    .filter(({ waiting }) => waiting > 0)
    .map((call): Wait => ({ person: call.person, date: call.date, waiting: call.waiting, gaps: gapsOf(file, zone, items, call, names) }));
  return waits.sort((one, other) => other.waiting - one.waiting || (one.date < other.date ? -1 : 1));
}

function gapsOf(file: ProductionFile, zone: ZoneClock, items: readonly TimedItem[], call: PlanCall, names: ItemNamer): Gap[] {
  const person = file.people.find(({ id }) => id === call.person);
  if (!person) return [];
  const times = { arrive: minuteOf(zone, call.arrive), release: minuteOf(zone, call.release) };
  const around = items.filter((item) => item.to > times.arrive && item.from < times.release);
  return staysOf(person, around, times, file).flatMap(({ arrive, marks }) => {
    const works = marks.filter(({ as }) => as !== 'rest');
    let at = arrive;
    return works.flatMap((own, position): Gap[] => {
      const gap = { from: at, to: own.from };
      at = Math.max(at, own.to);
      const rooms = new Set(works.slice(0, position + 1).map(({ room }) => room));
      const meanwhile = around.filter((item) => rooms.has(item.room ?? null) && item.from < gap.to && item.to > gap.from);
      const rest = restIn(file, meanwhile, gap);
      const minutes = gap.to - gap.from - rest;
      if (minutes <= 0) return [];
      const next = around.find((item) => item.from === own.from && item.people.includes(person.id));
      const wall = { from: zone.wallOf(gap.from), to: zone.wallOf(gap.to) };
      const work = meanwhile.filter(({ kind }) => kind !== 'meal' && kind !== 'break');
      const goesOn = work.length > 0 ? `; meanwhile ${work.slice(0, MOST_NAMES).map(names).join(', ')}` : '';
      const wait = `${length(minutes)}${rest > 0 ? ' besides the pauses' : ''}`;
      const says = `${clockOf(wall.from)}–${clockOf(wall.to)}, ${wait} until ${next ? names(next) : 'the rig'}${goesOn}`;
      return [{ ...wall, minutes, says }];
    });
  });
}

/** Meals and breaks in a gap; one that is longer than the rules ask for is waiting beyond that. */
function restIn(file: ProductionFile, items: readonly TimedItem[], gap: { from: Minute; to: Minute }): Minutes {
  const rules = { ...DEFAULT_RULES, ...file.production.rules };
  return items.reduce((sum, item) => {
    if (item.kind !== 'meal' && item.kind !== 'break') return sum;
    const inside = Math.min(item.to, gap.to) - Math.max(item.from, gap.from);
    return sum + Math.min(inside, item.kind === 'meal' ? rules.meal : rules.break);
  }, 0);
}
