import type { MadePlan } from '../contracts/plan';
import type { ProductionFile } from '../contracts/resources';
import type { Minute, Minutes, PassId, WallDate } from '../domain/flavours';
import { passInWords } from '../domain/passes';
import { namesOf } from '../domain/sheets/names';
import { dayWords, length } from '../time/words';
import { zoneClock, type ZoneClock } from '../time/wall';
import { effectivePasses } from './derive';

/** Something about a plan to look at: two words, and the sentence. */
export interface PlanWarning {
  word: string;
  says: string;
}

/** A pass that the plan does without. */
export interface LeftOut {
  pass: PassId;
  words: string;
  byHand: boolean;
}

/** A plan in a few figures; times in minutes, chances 0 … 1. */
export interface PlanSummary {
  musts: { placed: number; all: number };
  odds: number;
  waiting: { total: Minutes; worst: { person: string; date: WallDate; minutes: Minutes } | null };
  changeovers: Minutes;
  leftOut: LeftOut[];
  warnings: PlanWarning[];
}

/** With less than this between somebody's release and the end of their window, a small slip loses them. Common practice, no source. */
const THIN: Minutes = 30;
const WEEKDAY = 3;
const DAY: Minutes = 1440;

export function planSummary(file: ProductionFile, plan: MadePlan): PlanSummary {
  const zone = zoneClock(file.production.timezone);
  const names = namesOf(file);
  const passes = effectivePasses(file);
  const placed = new Set(plan.items.filter(({ kind }) => kind === 'pass').map(({ id }) => id));
  const musts = passes.filter((pass) => pass.priority === 'must' && !pass.leftOut);
  const worst = plan.calls.reduce<MadePlan['calls'][number] | null>(
    (most, call) => (call.waiting > (most?.waiting ?? 0) ? call : most),
    null,
  );
  const leftOut = passes
    .filter((pass) => pass.leftOut || plan.unplaced.includes(pass.id))
    .map((pass) => ({ pass: pass.id, words: passInWords(file, pass), byHand: pass.leftOut ?? false }));
  return {
    musts: { placed: musts.filter(({ id }) => placed.has(id)).length, all: musts.length },
    odds: plan.odds.musts,
    waiting: {
      total: plan.calls.reduce((sum, { waiting }) => sum + waiting, 0),
      worst: worst && { person: names.short(worst.person), date: worst.date, minutes: worst.waiting },
    },
    changeovers: plan.items
      .filter(({ kind }) => kind === 'changeover')
      .reduce((sum, { start, end }) => sum + minutesBetween(start, end, zone), 0),
    leftOut,
    warnings: [...leftOutWarning(leftOut), ...thinWarning(file, plan, zone), ...overrunWarning(file, plan, zone)],
  };
}

function minuteOf(wall: string, zone: ZoneClock): number {
  const minute = zone.minuteOf(wall);
  return minute === 'gap' ? Number.NaN : minute;
}

const minutesBetween = (from: string, to: string, zone: ZoneClock): Minutes => minuteOf(to, zone) - minuteOf(from, zone);

function leftOutWarning(leftOut: LeftOut[]): PlanWarning[] {
  const some = leftOut.filter(({ byHand }) => !byHand);
  if (some.length === 0) return [];
  const shown = some.slice(0, 2).map(({ words }) => words);
  const more = some.length > shown.length ? ` and ${some.length - shown.length} more` : '';
  return [{ word: `${some.length} left out`, says: shown.join(', ') + more }];
}

/** The person who would be lost first when the day slips: released shortly before they have to go, while the room stays open. */
function thinWarning(file: ProductionFile, plan: MadePlan, zone: ZoneClock): PlanWarning[] {
  const names = namesOf(file);
  const thin = plan.calls.flatMap((call) => {
    const release = minuteOf(call.release, zone);
    const windows = file.people.find(({ id }) => id === call.person)?.windows ?? [];
    const own = windows.find(({ from, to }) => minuteOf(from, zone) < release && release <= minuteOf(to, zone));
    if (!own || !opensBeyond(file, own.to, zone)) return [];
    const slack = minuteOf(own.to, zone) - release;
    return slack < THIN ? [{ call, slack }] : [];
  });
  const [first] = thin.sort((a, b) => a.slack - b.slack);
  if (!first) return [];
  const day = dayWords(first.call.date).slice(0, WEEKDAY);
  return [{ word: 'reserve thin', says: `${day}: ${length(first.slack)} before ${names.short(first.call.person)} leaves` }];
}

/** Whether any room is still open after that time, so that somebody leaves while work goes on. */
function opensBeyond(file: ProductionFile, wall: string, zone: ZoneClock): boolean {
  const at = minuteOf(wall, zone);
  return file.rooms.some((room) => room.open.some(({ from, to }) => minuteOf(from, zone) < at && at < minuteOf(to, zone)));
}

/** The room-day that most often goes on past its hours: its ninth day in ten ends after the room closes. */
function overrunWarning(file: ProductionFile, plan: MadePlan, zone: ZoneClock): PlanWarning[] {
  const late = plan.odds.days.flatMap((day) => {
    const room = file.rooms.find(({ id }) => id === day.room);
    const open = room?.open.filter(({ from }) => from.slice(0, 10) === day.date) ?? [];
    if (!room || open.length === 0) return [];
    const opens = Math.min(...open.map(({ from }) => minuteOf(from, zone)));
    const closes = Math.max(...open.map(({ to }) => minuteOf(to, zone)));
    const over = endOf(day.date, day.p90, opens, zone) - closes;
    return over > 0 ? [{ day, over }] : [];
  });
  const [first] = late.sort((a, b) => b.over - a.over);
  if (!first) return [];
  const day = dayWords(first.day.date).slice(0, WEEKDAY);
  const says = `${day}: 1 in 10 ends past ${first.day.p90}`;
  return [{ word: 'may run over', says }];
}

/** The minute at which a room-day ends by the clock; a time before it opens is one after midnight. */
function endOf(date: WallDate, ends: string, opens: Minute, zone: ZoneClock): Minute {
  const minute = minuteOf(`${date}T${ends}`, zone);
  return minute < opens ? minute + DAY : minute;
}
