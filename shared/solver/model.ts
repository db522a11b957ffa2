import type { Rules, Weights } from '../contracts/head';
import type { Priority } from '../contracts/values';
import type { EventId, GearId, Minute, Minutes, PassId, PersonId, RoomId, SetupId, WallDate } from '../domain/flavours';

/**
 * The problem that the solver works on: a production file with its defaults applied, ids turned into indices (positions in the lists
 * below), wall clock into elapsed minutes and calendars merged. Nothing in it changes while a plan is made. Spans hold their first
 * minute and not their last. `null` stands for "no restriction".
 */
export interface Problem {
  zone: string;
  rules: Required<Rules>;
  weights: Required<Weights>;
  /** Lengths of the items that rules ask for, rounded up to the step. */
  lengths: { meal: Minutes; break: Minutes; wrap: Minutes; listen: Minutes };
  rooms: RoomModel[];
  /** Room-days by date, then by opening, then by room: the order in which work can be laid forward. */
  days: RoomDay[];
  /** Calendar dates of room-days and events, in order. */
  dates: WallDate[];
  people: PersonModel[];
  passes: PassModel[];
  setups: SetupModel[];
  /** Minutes, rounded up to the step, from set-up `a` to set-up `b`: `changeovers[a * setups.length + b]`. */
  changeovers: Int32Array;
  events: EventModel[];
  gear: GearModel[];
  /** Stretches whose wall clock is shown a second time in autumn: no item may begin or end in them, as it could not be written down. */
  hidden: Span[];
}

export interface Span {
  from: Minute;
  to: Minute;
}

export interface RoomModel {
  id: RoomId;
  standing: boolean;
  /** Minutes from first to last item after which overtime counts; `null` = never. */
  standard: Minutes | null;
  /** Most people in it. */
  people: number | null;
  operators: number[];
  /** Its room-days in order of time. */
  days: number[];
  loud: Span[] | null;
  /** Rooms that hear this one or are heard by it: loud work in one is never beside quiet work in the other. */
  hears: number[];
  /** Events that block it, by start. */
  events: number[];
}

/** One `open` window of a room. */
export interface RoomDay extends Span {
  room: number;
  date: WallDate;
  /** Position of the date in `Problem.dates`. */
  dateIndex: number;
  /** Position in the room's list of `open` windows as written in the file. */
  written: number;
  /** Days of one layer can be filled side by side; a later layer never holds an earlier room-day of the same room or an earlier date. */
  layer: number;
  /** Where items may start: minutes `m` with `from ≤ m ≤ to` and `(m - phase) % step = 0`; mostly one stretch. */
  grid: GridStretch[];
}

export interface GridStretch extends Span {
  /** Any minute on the grid. */
  phase: Minute;
}

export interface PersonModel {
  id: PersonId;
  /** Sure and maybe windows, merged. */
  windows: Span[] | null;
  /** Sure windows, merged. */
  sure: Span[] | null;
  /** Most voice minutes a date. */
  voice: Minutes | null;
  /** Longest time from arrival to release on a date. */
  day: Minutes | null;
  /** A gap this long is time off. */
  away: Minutes | null;
  /** How many heads it counts. */
  size: number;
  /** Weight of one waited minute (the person's fee times the production's weight). */
  waiting: number;
  /** Passes that need the person, operators included. */
  passes: number[];
  /** Events that name the person, by start. */
  events: number[];
}

export interface GearModel {
  id: GearId;
  count: number;
  windows: Span[] | null;
  /** Passes that use it. */
  passes: number[];
}

export interface SetupModel {
  id: SetupId;
  /** Minutes to build it in a bare room, rounded up to the step. */
  rig: Minutes;
  /** Who must be there before the rig ends, and how long; never longer than the rig. */
  ready: { person: number; minutes: Minutes }[];
  keepUntilApproved: boolean;
}

export interface Dependency {
  pass: number;
  approved: boolean;
  lag: Minutes;
}

export interface PassModel {
  id: PassId;
  /** -1 where the file gives none. */
  song: number;
  /** -1 where neither pass nor set-up names a room that exists: the pass cannot be placed. */
  room: number;
  /** -1 = needs none and disturbs none. */
  setup: number;
  /** Likely minutes, rounded up to the step. */
  minutes: Minutes;
  /** Low, likely and high as given. */
  estimate: readonly [Minutes, Minutes, Minutes];
  priority: Priority;
  /** Cost points when it is not placed; 0 for a must. */
  unplaced: number;
  /** Left out by hand: never placed. */
  leftOut: boolean;
  /** Its people and the room's operators, in order of index. */
  people: number[];
  /** The same as a bit set, 32 people a word. */
  mask: Uint32Array;
  heads: number;
  loud: boolean;
  quiet: boolean;
  voice: { person: number; minutes: Minutes }[];
  uses: { gear: number; count: number }[];
  /** Its own `after` and the `before` of others, one entry a pass and kind. */
  after: Dependency[];
  /** Passes that come after it. */
  followers: number[];
  /** Passes that start with it, itself included; empty where it goes alone. */
  together: number[];
  /** Passes that never run at the same time: apart, one song in two rooms, loud beside quiet. Both ways. */
  apart: number[];
  /** Earliest start and latest end by pins and events. */
  notBefore: Minute;
  notAfter: Minute;
  /** Fixed start. */
  at: Minute | null;
  /** Fixed date of its room-day. */
  date: WallDate | null;
  /**
   * Where it may start as far as it alone tells: open hours less the wrap, loud hours, pins, gear and people's windows, and events that
   * block its room or people. In order of time.
   */
  starts: StartStretch[];
  /** The room-days of `starts`, each once. */
  days: number[];
}

/** A stretch of possible starts in one room-day; both ends are on the grid and may be taken. */
export interface StartStretch extends Span {
  day: number;
}

export interface EventModel extends Span {
  id: EventId;
  /** -1 = in no room. */
  room: number;
  people: number[];
  /** Kind `listen`: what was captured before is approved. */
  approves: boolean;
  /** The date of the call it makes: that of the room-day it lies in, else that of its start. */
  dateIndex: number;
}

/** Bounds that stand for "no bound"; far beyond any calendar. */
export const EVER: Minute = 1_000_000_000;
export const NEVER: Minute = -1_000_000_000;

/** Whether one of the merged windows holds the whole stretch. */
export function holds(windows: readonly Span[] | null, from: Minute, to: Minute): boolean {
  if (windows === null) return true;
  for (const window of windows) if (window.from <= from && to <= window.to) return true;
  return false;
}

/** Minutes of the stretch that lie in the merged windows. */
export function within(windows: readonly Span[] | null, from: Minute, to: Minute): Minutes {
  if (windows === null) return to - from;
  let sum = 0;
  for (const window of windows) {
    const start = window.from > from ? window.from : from;
    const end = window.to < to ? window.to : to;
    if (end > start) sum += end - start;
  }
  return sum;
}

/** Windows in order, those that touch or overlap made one. */
export function merged(windows: readonly Span[]): Span[] {
  const result: Span[] = [];
  for (const { from, to } of [...windows].sort((a, b) => a.from - b.from)) {
    const last = result.at(-1);
    if (last && from <= last.to) last.to = Math.max(last.to, to);
    else result.push({ from, to });
  }
  return result;
}

/** Whether two bit sets share a member. */
export function meet(a: Uint32Array, b: Uint32Array): boolean {
  for (let word = 0; word < a.length; word++) if ((a[word]! & b[word]!) !== 0) return true;
  return false;
}
