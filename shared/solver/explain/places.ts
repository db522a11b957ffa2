import type { Pass } from '../../contracts/resources';
import type { Minute, Minutes, WallDate } from '../../domain/flavours';
import { EVER, merged, NEVER, type Span } from '../model';
import { buildFromBare, mostWork, reserveFor } from './days';
import { common, without } from '../spans';
import { dayOf as calendarDay, type OpenWindow } from './statement';
import { castOf, eventsThatHold, fieldOf, minutesOf, roomIdOf, roundUp, ruleOf, type View } from './view';

/** Where a pass may start: from the first minute to the last, both included. */
export interface Place extends Span {
  /** The window of its room; null when the room's hours are dropped. */
  window: OpenWindow | null;
  /** The date of the room-day. A room without hours has one for each calendar day; null far from everything that the file speaks of. */
  date: WallDate | null;
}

/**
 * Every place that a pass can have as far as the facts that hold tell for it alone: its people, room, gear, pin and events, the loud
 * hours, limits, and what a room-day must hold beside it (rig, wrap, reserve, pauses). More may forbid a place; nothing else allows one.
 */
export function placesOf(view: View, pass: Pass): Place[] {
  const known = view.places.get(pass.id);
  if (known) return known;
  const places = workOut(view, pass);
  view.places.set(pass.id, places);
  return places;
}

function workOut(view: View, pass: Pass): Place[] {
  const { statement } = view;
  const roomId = roomIdOf(statement, pass);
  const facts = roomId === undefined ? undefined : statement.rooms.get(roomId);
  const minutes = minutesOf(view, pass);
  if (!facts || exceedsALimit(view, pass, minutes)) return [];
  const { room } = facts;
  const hoursKnown = view.has(`rooms.${room.id}.open`);
  const windows: OpenWindow[] = hoursKnown ? facts.windows : [{ from: NEVER, to: EVER, date: '', first: false }];
  const bounds = boundsOf(view, pass);
  const calendars = calendarsOf(view, pass);
  const busy = merged([
    ...eventsThatHold(view, facts.events),
    ...[...castOf(statement, pass)].flatMap((person) => eventsThatHold(view, statement.people.get(person)!.events)),
  ]);
  return windows.flatMap((window): Place[] => {
    const inWindow = hoursKnown ? insideOf(view, pass, window, minutes) : window;
    const day = dayOf(view, pass, hoursKnown ? window : null);
    if (!inWindow || !day) return [];
    const stretch = { from: Math.max(inWindow.from, bounds.from, day.from), to: Math.min(inWindow.to, bounds.to, day.to) };
    const free = calendars.reduce(common, without([stretch], busy));
    return free.flatMap((span): Place[] => {
      const from = onGrid(view, Math.max(span.from, bounds.at ?? NEVER));
      const to = Math.min(span.to - minutes, bounds.at ?? EVER);
      if (from > to) return [];
      return hoursKnown ? [{ from, to, window, date: window.date }] : byCalendarDay(view, { from, to });
    });
  });
}

/** The first minute on the grid at or after one; a minute near a clock change is left as it is. */
export function onGrid(view: View, minute: Minute): Minute {
  const step = ruleOf(view, 'step');
  if (step === 1 || minute <= NEVER || minute >= EVER) return minute;
  const { clock } = view.statement;
  const offset = clock.offsetAt(minute);
  const ofDay = (((minute + offset) % 1440) + 1440) % 1440;
  const over = ofDay % step;
  if (over === 0) return minute;
  const next = Math.min(ofDay + step - over, 1440) - ofDay + minute;
  return clock.offsetAt(next) === offset ? next : minute;
}

/** Whether it alone is more than a person, the room, the gear or a stretch of work may bear. */
function exceedsALimit(view: View, pass: Pass, minutes: Minutes): boolean {
  const { statement } = view;
  if (ruleOf(view, 'meal') > 0 && minutes > ruleOf(view, 'mealAfter')) return true;
  const cast = castOf(statement, pass);
  for (const id of cast) {
    const { limits } = statement.people.get(id)!.person;
    if (limits?.day !== undefined && minutes > limits.day && view.has(`people.${id}.limits`)) return true;
    if (limits?.voice === undefined || !pass.voice?.[id]) continue;
    const voice = fieldOf(view, pass, 'voice')?.[id] ?? 0;
    if (voice > limits.voice && view.has(`people.${id}.limits`)) return true;
  }
  const room = statement.rooms.get(roomIdOf(statement, pass) ?? '')?.room;
  const heads = [...cast].reduce((sum, id) => sum + (statement.people.get(id)!.person.size ?? 1), 0);
  if (room?.people !== undefined && heads > room.people && view.has(`rooms.${room.id}.people`)) return true;
  return (fieldOf(view, pass, 'uses') ?? []).some(({ gear }) => {
    const count = statement.gear.get(gear)?.gear.count ?? 1;
    return statement.gear.has(gear) && usedBy(pass, gear) > count && view.has(`gear.${gear}.count`);
  });
}

/** How many pieces of gear a pass uses. */
export function usedBy(pass: Pass, gear: string): number {
  return (pass.uses ?? []).reduce((sum, use) => sum + (use.gear === gear ? (use.count ?? 1) : 0), 0);
}

/** Earliest start, latest end and fixed start by its pin and by events. */
function boundsOf(view: View, pass: Pass): Span & { at: Minute | null } {
  const { statement } = view;
  const pin = fieldOf(view, pass, 'pin');
  let from = pin?.notBefore === undefined ? NEVER : statement.minuteOf(pin.notBefore);
  let to = pin?.notAfter === undefined ? EVER : statement.minuteOf(pin.notAfter);
  for (const one of pass.after ?? []) {
    const event = 'event' in one ? statement.events.get(one.event) : undefined;
    if (event && view.has(`passes.${pass.id}.after`) && view.has(`events.${event.event.id}`))
      from = Math.max(from, event.to + (one.lag ?? 0));
  }
  for (const one of pass.before ?? []) {
    const event = 'event' in one ? statement.events.get(one.event) : undefined;
    if (event && view.has(`passes.${pass.id}.before`) && view.has(`events.${event.event.id}`)) to = Math.min(to, event.from);
  }
  return { from, to, at: pin?.at === undefined ? null : statement.minuteOf(pin.at) };
}

/** Windows that bind it beside the room's: those of its people and its gear, and the loud hours. */
function calendarsOf(view: View, pass: Pass): Span[][] {
  const { statement } = view;
  const calendars: Span[][] = [];
  for (const id of castOf(statement, pass)) {
    const { windows } = statement.people.get(id)!;
    if (windows && view.has(`people.${id}.windows`)) calendars.push(windows);
  }
  for (const { gear } of fieldOf(view, pass, 'uses') ?? []) {
    const windows = statement.gear.get(gear)?.windows;
    if (windows && view.has(`gear.${gear}.windows`)) calendars.push(windows);
  }
  const room = statement.rooms.get(roomIdOf(statement, pass) ?? '');
  if (room?.loud && pass.loud === true && fieldOf(view, pass, 'loud') && view.has(`rooms.${room.room.id}.loud`)) calendars.push(room.loud);
  return calendars;
}

/** The part of an open window that the rig before and the wrap after leave; null where the window does not hold all of that. */
function insideOf(view: View, pass: Pass, window: OpenWindow, minutes: Minutes): Span | null {
  const room = view.statement.rooms.get(roomIdOf(view.statement, pass)!)!.room;
  const bare = window.first || room.standing === false;
  const setup = bare ? fieldOf(view, pass, 'setup') : undefined;
  const rig = setup === undefined ? 0 : buildFromBare(view, setup);
  const wrap = roundUp(view, ruleOf(view, 'wrap'));
  const reserve = reserveFor(view, minutes);
  const most = mostWork(view, room.id, window, Math.max(minutes, rig, wrap, reserve));
  if (rig + minutes + reserve + wrap > most) return null;
  return { from: window.from + rig, to: window.to - wrap };
}

/** When a pass pinned on a day may be: in a room-day of that date or, where the hours are dropped, on that calendar day; null = not here. */
function dayOf(view: View, pass: Pass, window: OpenWindow | null): Span | null {
  const day = fieldOf(view, pass, 'pin')?.day;
  if (day === undefined) return { from: NEVER, to: EVER };
  if (window) return window.date === day ? { from: NEVER, to: EVER } : null;
  return calendarDay(view.statement.clock, day);
}

/** Starts in a room without hours, split at the midnights of the days that the file speaks of. */
function byCalendarDay(view: View, starts: Span): Place[] {
  const stretches: { from: Minute; to: Minute; date: WallDate | null }[] = [];
  let at = NEVER;
  for (const day of view.statement.calendar) {
    stretches.push({ from: at, to: day.from, date: null }, day);
    at = day.to;
  }
  stretches.push({ from: at, to: EVER + 1, date: null });
  return stretches.flatMap(({ from, to, date }): Place[] => {
    const place = { from: Math.max(from, starts.from), to: Math.min(to - 1, starts.to), window: null, date };
    return place.from <= place.to ? [place] : [];
  });
}
