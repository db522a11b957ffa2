import type { MadePlan, PlanCall, PlanItem } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import { zoneClock } from '../../time/wall';
import { clock, dateOfWall } from '../../time/words';
import type { PersonId, WallTime } from '../flavours';
import type { Names } from './names';
import type { RoomDay } from './room-days';
import { fullDate, type MidnightMark, type PeopleMark, type StopMark } from './sheet';

/** A mark with its full time, before it is put between the rows. */
export interface TimedMark {
  time: WallTime;
  mark: PeopleMark | StopMark | MidnightMark;
}

function stop(time: WallTime, says: string, who: string[] = []): TimedMark {
  return { time, mark: { is: 'stop', at: clock(time), who, says } };
}

/** Where a room-day goes past midnight, a line says which date begins. */
function midnights(day: RoomDay): TimedMark[] {
  const dates = [...new Set(day.items.flatMap((item) => [dateOfWall(item.start), dateOfWall(item.end)]))].sort();
  return dates
    .slice(1)
    .map((date) => ({ time: `${date}T00:00`, mark: { is: 'midnight', at: '00:00', says: fullDate(date) } }) satisfies TimedMark)
    .filter((mark) => day.items.some((item) => item.end > mark.time));
}

/**
 * The end of the windows that hold a stay; those that touch or overlap are one.
 * @returns `null` where no window holds it: then nothing says that they must go.
 */
export function windowEnd(
  windows: readonly { from: WallTime; to: WallTime }[] | undefined,
  stay: { from: WallTime; to: WallTime },
): WallTime | null {
  let end: WallTime | null = null;
  for (const window of [...(windows ?? [])].sort((a, b) => (a.from < b.from ? -1 : 1))) {
    const holds = end === null ? window.from <= stay.from && stay.from < window.to : window.from <= end;
    if (holds && (end === null || window.to > end)) end = window.to;
  }
  return end !== null && end >= stay.to ? end : null;
}

/** Whether an item is work of that person: it names them, or it is a pass of a room that they operate. */
export function isOwn(item: PlanItem, person: PersonId, operators: readonly PersonId[] | undefined): boolean {
  if (item.kind === 'pass') return item.people.includes(person) || (operators ?? []).includes(person);
  return (item.kind === 'event' || item.kind === 'listen') && item.people.includes(person);
}

const ownItems = (day: RoomDay, person: PersonId) => day.items.filter((item) => isOwn(item, person, day.room.operators));

/** The calls of those who arrive while a set-up is built, to get ready for it; the rig's own row names them with their times. */
export function readyArrivals(item: PlanItem, day: RoomDay, plan: MadePlan, names: Names): PlanCall[] {
  if (item.kind !== 'rig') return [];
  const ready = new Set(names.readyFor(item.setup));
  return plan.calls
    .filter((call) => call.date === day.date && ready.has(call.person) && item.start <= call.arrive && call.arrive < item.end)
    .sort((a, b) => (a.arrive < b.arrive ? -1 : a.arrive > b.arrive ? 1 : 0));
}

/** Short names by time. */
function byTime(calls: readonly PlanCall[], timeOf: (call: PlanCall) => WallTime | null, names: Names): Map<WallTime, string[]> {
  const at = new Map<WallTime, string[]>();
  for (const call of calls) {
    const time = timeOf(call);
    if (time !== null) at.set(time, [...(at.get(time) ?? []), names.short(call.person)]);
  }
  return at;
}

/** A stop is worth a line where so many minutes or fewer lie between a planned release and it (common practice, no source). */
const NEAR = 120;

/** What must be over by a time of this day: people who go, loud hours that end, hired things that leave, collections. */
function hardStops(day: RoomDay, calls: readonly PlanCall[], file: ProductionFile, names: Names): TimedMark[] {
  const zone = zoneClock(file.production.timezone);
  const length = (from: WallTime, to: WallTime) => {
    const [start, end] = [zone.minuteOf(from), zone.minuteOf(to)];
    return start === 'gap' || end === 'gap' ? 0 : end - start;
  };
  const within = (time: WallTime) => day.open.from < time && time < day.open.to;
  const windowEnds = byTime(
    calls,
    (call) => {
      const end = windowEnd(names.person(call.person)?.windows, { from: call.arrive, to: call.release });
      return end !== null && within(end) && length(call.release, end) <= NEAR ? end : null;
    },
    names,
  );
  const leaving = [...windowEnds].map(([time, who]) => stop(time, who.length > 1 ? 'leave' : 'leaves', who));
  const quiet = (day.room.loud ?? []).filter((window) => within(window.to)).map((window) => stop(window.to, 'no loud work from here'));
  const passes = day.items.flatMap((item) => (item.kind === 'pass' ? (names.pass(item.id) ?? []) : []));
  const used = new Set(passes.flatMap((pass) => (pass.uses ?? []).map((use) => use.gear)));
  const hired = file.gear
    .filter((gear) => used.has(gear.id))
    .flatMap((gear) =>
      (gear.windows ?? []).filter((window) => within(window.to)).map((window) => stop(window.to, `${gear.name ?? gear.id} goes`)),
    );
  const bounding = new Set(passes.flatMap((pass) => (pass.before ?? []).flatMap((what) => ('event' in what ? [what.event] : []))));
  const events = file.events
    .filter((event) => event.room !== day.room.id && within(event.from) && bounding.has(event.id))
    .map((event) => stop(event.from, event.name ?? event.id));
  return [...leaving, ...quiet, ...hired, ...events];
}

/**
 * All marks of a room-day in order of time. Somebody who works in two rooms on one date arrives in the room of their first item and
 * leaves from that of their last.
 * @param sameDate all room-days of that date.
 */
export function marksOf(day: RoomDay, sameDate: readonly RoomDay[], file: ProductionFile, plan: MadePlan, names: Names): TimedMark[] {
  const calls = plan.calls.filter((call) => call.date === day.date && ownItems(day, call.person).length > 0);
  const first = (call: PlanCall, where: RoomDay) => ownItems(where, call.person)[0]?.start ?? '9999';
  const last = (call: PlanCall, where: RoomDay) => ownItems(where, call.person).at(-1)?.end ?? '';
  const named = new Set(day.items.flatMap((item) => readyArrivals(item, day, plan, names)));
  const arriving = calls.filter((call) => !named.has(call) && sameDate.every((other) => first(call, day) <= first(call, other)));
  const leaving = calls.filter((call) => sameDate.every((other) => last(call, day) >= last(call, other)));
  const arrivals = byTime(arriving, (call) => call.arrive, names);
  const releases = byTime(leaving, (call) => call.release, names);
  const people = [...new Set([...arrivals.keys(), ...releases.keys()])].map((time): TimedMark => ({
    time,
    mark: { is: 'people', at: clock(time), arrive: arrivals.get(time) ?? [], release: releases.get(time) ?? [] },
  }));
  // At the same time the stop stands last, as the rule under everything that had to be over.
  return [...midnights(day), ...people, ...hardStops(day, calls, file, names)].sort((a, b) =>
    a.time < b.time ? -1 : a.time > b.time ? 1 : 0,
  );
}
