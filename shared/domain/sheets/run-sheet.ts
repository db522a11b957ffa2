import type { ItemKind, MadePlan, PlanItem } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import { type PlanDay, planDays } from '../../planner/day';
import type { ZoneClock } from '../../time/wall';
import { zoneClock } from '../../time/wall';
import { clock } from '../../time/words';
import { DEFAULT_RULES } from '../defaults';
import type { Minutes, RoomId, WallDate } from '../flavours';
import { marksOf, readyArrivals, type TimedMark } from './marks';
import { meanwhileOf } from './meanwhile';
import { type Names, namesOf } from './names';
import { passWords, taskOf } from './pass-words';
import { runPages } from './run-pages';
import { dayCount, type RoomDay, usedDates, usedRoomDays } from './room-days';
import { fullDate, type Paper, type RunLine, type RunRoom, type RunRow, type RunSheet, type SheetEdition, sheetHead } from './sheet';

export interface RunSheetRequest {
  date: WallDate;
  /** One room; absent = every room of the day. */
  room?: RoomId;
  edition: SheetEdition;
  paper?: Paper;
}

/**
 * The run sheet of one date: the clock, what is played, by whom, in which set-up, the reserve, the stops that do not move, and room to
 * write what really happened.
 * @returns `null` when the plan uses no room (or not that room) on that date.
 */
export function runSheet(file: ProductionFile, plan: MadePlan, request: RunSheetRequest): RunSheet | null {
  const all = usedRoomDays(file, plan.items);
  const sameDate = all.filter((day) => day.date === request.date);
  const wanted = sameDate.filter((day) => request.room === undefined || day.room.id === request.room);
  const threads = planDays(file, plan).find((day) => day.date === request.date);
  if (wanted.length === 0 || !threads) return null;
  const names = namesOf(file);
  const zone = zoneClock(file.production.timezone);
  const head = sheetHead(file, request, { what: 'Run sheet', of: fullDate(request.date) });
  return {
    head,
    date: request.date,
    day: head.of,
    count: dayCount(request.date, usedDates(file, plan.items)),
    rooms: wanted.map((day): RunRoom => {
      const reading = { day, all, file, plan, names, zone };
      const rows = day.items.map((item) => ({ item, row: rowOf(item, reading) }));
      const lines = weave(rows, marksOf(day, sameDate, file, plan, names));
      const of = { room: day.room.name ?? day.room.id, facts: roomFacts(day, names) };
      return { ...of, ends: endsOf(day, plan, file), pages: runPages(lines, meanwhileOf(day, sameDate, reading), head, of) };
    }),
    threads: cropped(threads),
  };
}

/** A sheet shows one day only, so its drawing begins and ends with that day's own work, at full hours. */
function cropped(day: PlanDay): PlanDay {
  const first = Math.min(...day.items.map((item) => item.from));
  const last = Math.max(...day.items.map((item) => item.to));
  const from = day.hours.findLast((hour) => hour.at <= first)?.at ?? first;
  const to = day.hours.find((hour) => hour.at >= last)?.at ?? last;
  return { ...day, from, to, hours: day.hours.filter((hour) => from <= hour.at && hour.at <= to) };
}

/** The dates that have a run sheet. */
export function runSheetDates(file: ProductionFile, plan: MadePlan): WallDate[] {
  return usedDates(file, plan.items);
}

function lengthOf(item: PlanItem, zone: ZoneClock): Minutes {
  const [from, to] = [zone.minuteOf(item.start), zone.minuteOf(item.end)];
  return from === 'gap' || to === 'gap' ? 0 : to - from;
}

const PLAIN_TITLES: Record<Exclude<ItemKind, 'pass' | 'event'>, string> = {
  rig: 'Rig',
  changeover: 'Change',
  meal: 'Meal',
  break: 'Break',
  listen: 'Listen',
  reserve: 'Reserve',
  wrap: 'Wrap',
};

/** What a row is made from. */
interface Reading {
  day: RoomDay;
  all: readonly RoomDay[];
  file: ProductionFile;
  plan: MadePlan;
  names: Names;
  zone: ZoneClock;
}

function rowOf(item: PlanItem, { day, all, file, plan, names, zone }: Reading): RunRow {
  const operators = new Set(day.room.operators ?? []);
  const row: RunRow = {
    is: 'row',
    kind: item.kind,
    from: clock(item.start),
    to: clock(item.end),
    minutes: lengthOf(item, zone),
    code: '',
    title: '',
    task: '',
    people: item.people.filter((person) => !operators.has(person)).map((person) => names.short(person)),
    setup: names.setup(item.setup),
    note: '',
  };
  if (item.kind === 'pass') {
    const pass = names.pass(item.id);
    const words = passWords(file, item, names);
    return {
      ...row,
      code: words.code,
      title: words.title,
      task: taskOf(words),
      setup: names.setup(item.setup ?? pass?.setup),
      note: pass?.note ?? '',
    };
  }
  if (item.kind === 'event') return { ...row, title: names.event(item.id) };
  return {
    ...row,
    title: PLAIN_TITLES[item.kind],
    setup: '',
    task: plainTask(item, day, all, names),
    note: cautionFor(item),
    people: item.kind === 'rig' ? gettingReady(item, day, plan, names) : row.people,
  };
}

/** Who gets ready while a set-up is built, in the order in which they come. */
function gettingReady(item: PlanItem, day: RoomDay, plan: MadePlan, names: Names): string[] {
  return readyArrivals(item, day, plan, names).map((call) => `${names.short(call.person)} ${clock(call.arrive)}`);
}

/** What is done in an item that is no pass: which set-up is built, out of which. */
function plainTask(item: PlanItem, day: RoomDay, all: readonly RoomDay[], names: Names): string {
  if (item.kind === 'rig') return names.setup(item.setup);
  if (item.kind === 'wrap') return 'names, copies, notes';
  if (item.kind === 'listen') return 'to what was captured before';
  if (item.kind !== 'changeover') return '';
  const before = all
    .filter((other) => other.room.id === day.room.id && other.open.from <= day.open.from)
    .flatMap((other) => other.items)
    .filter((other) => other.setup !== undefined && other.start < item.start)
    .at(-1);
  return before?.setup === undefined || before.setup === item.setup
    ? `to ${names.setup(item.setup)}`
    : `${names.setup(before.setup)} → ${names.setup(item.setup)}`;
}

/** The usual caution where building and moving can hurt (common practice, no source; local rules and licensed people come first). */
function cautionFor(item: PlanItem): string {
  if (item.kind === 'rig') return 'two to lift, walkways clear, mute before patching';
  return item.kind === 'changeover' ? 'lift by two, mute to patch' : '';
}

function roomFacts(day: RoomDay, names: Names): string[] {
  const loud = (day.room.loud ?? []).filter((window) => window.to > day.open.from && window.from < day.open.to);
  const desk = (day.room.operators ?? []).map((person) => names.short(person));
  return [
    `open ${clock(day.open.from)}–${clock(day.open.to)}`,
    ...loud.map((window) =>
      window.from <= day.open.from ? `loud until ${clock(window.to)}` : `loud ${clock(window.from)}–${clock(window.to)}`,
    ),
    ...(desk.length > 0 ? [`at the desk: ${desk.join(', ')}`] : []),
  ];
}

/** The end of the day by the odds (clock times), later onto the grid of the plan's step: never finer than what was planned. */
function endsOf(day: RoomDay, plan: MadePlan, file: ProductionFile): RunRoom['ends'] {
  const odds = plan.odds.days.find((one) => one.room === day.room.id && one.date === day.date);
  if (!odds) return null;
  const step = file.production.rules?.step ?? DEFAULT_RULES.step;
  const onGrid = (time: string) => {
    const [hour = 0, minute = 0] = time.split(':').map(Number);
    const later = (Math.ceil((hour * 60 + minute) / step) * step) % 1440;
    return [Math.floor(later / 60), later % 60].map((figure) => String(figure).padStart(2, '0')).join(':');
  };
  return { half: onGrid(odds.p50), nineInTen: onGrid(odds.p90) };
}

/** Puts the marks between the rows by the clock: a mark at the start of a row stands before it. */
function weave(rows: readonly { item: PlanItem; row: RunRow }[], marks: readonly TimedMark[]): RunLine[] {
  const lines: RunLine[] = [];
  let next = 0;
  for (const { item, row } of rows) {
    for (let mark = marks[next]; mark !== undefined && mark.time <= item.start; mark = marks[++next]) lines.push(mark.mark);
    lines.push(row);
  }
  return [...lines, ...marks.slice(next).map((mark) => mark.mark)];
}
