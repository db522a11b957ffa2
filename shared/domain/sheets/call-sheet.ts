import type { MadePlan, PlanCall, PlanItem } from '../../contracts/plan';
import type { ProductionFile, Song } from '../../contracts/resources';
import { type ZoneClock, zoneClock } from '../../time/wall';
import { clock, dateOfWall, length } from '../../time/words';
import type { PersonId, WallDate } from '../flavours';
import { callFacts } from './call-facts';
import { callPages } from './call-pages';
import { isOwn } from './marks';
import { type Names, namesOf } from './names';
import { ownParts, passWords } from './pass-words';
import { releaseRange } from './release';
import { dayCount, type RoomDay, usedDates, usedRoomDays } from './room-days';
import { type CallDay, type CallLine, type CallSheet, fullDate, type Paper, type SheetEdition, sheetHead } from './sheet';

export interface CallSheetRequest {
  person: PersonId;
  edition: SheetEdition;
  paper?: Paper;
}

/** A gap between two items of a person that is worth a line of its own, in minutes (common practice, no source). */
const WORTH_A_LINE = 20;

/**
 * The call sheet of one person over all their dates: when to come, be ready and go, what to play, what to bring, whom to ring.
 * It holds nobody else's facts, and no money.
 * @returns `null` when the plan does not call that person.
 */
export function callSheet(file: ProductionFile, plan: MadePlan, request: CallSheetRequest): CallSheet | null {
  const days = callDays(file, plan, request.person);
  if (days.length === 0) return null;
  const person = namesOf(file).person(request.person);
  const name = person?.name ?? person?.short ?? request.person;
  const head = sheetHead(file, request, { what: 'Call sheet', of: name });
  const plays = (person?.plays ?? []).join(', ');
  const facts = callFacts(file, plan, request.person);
  const pages = callPages(
    days.map(({ day }) => day),
    facts,
    head,
    plays,
  );
  return { head, person: request.person, name, plays, pages };
}

/** Every call of a person in order of time, with what their day holds. */
export function callDays(file: ProductionFile, plan: MadePlan, person: PersonId): { call: PlanCall; day: CallDay }[] {
  const names = namesOf(file);
  const zone = zoneClock(file.production.timezone);
  const roomDays = usedRoomDays(file, plan.items);
  const dates = usedDates(file, plan.items);
  return plan.calls
    .filter((call) => call.person === person)
    .sort((a, b) => (a.arrive < b.arrive ? -1 : 1))
    .map((call) => ({ call, day: callDay(call, file, plan, roomDays, dates, names, zone) }));
}

/** Everybody whom the plan calls, in the order of the people of the production. */
export function calledPeople(file: ProductionFile, plan: MadePlan): PersonId[] {
  const called = new Set(plan.calls.map((call) => call.person));
  const listed = file.people.map((person) => person.id).filter((id) => called.has(id));
  return [...listed, ...[...called].filter((id) => !listed.includes(id))];
}

function callDay(
  call: PlanCall,
  file: ProductionFile,
  plan: MadePlan,
  roomDays: readonly RoomDay[],
  dates: readonly WallDate[],
  names: Names,
  zone: ZoneClock,
): CallDay {
  const range = releaseRange(file, plan, call, names, zone);
  const here = roomDays.filter((day) => day.date === call.date && day.items.some((item) => isOwn(item, call.person, day.room.operators)));
  return {
    day: fullDate(call.date),
    count: dayCount(call.date, dates),
    room: here.map((day) => day.room.name ?? day.room.id).join(', '),
    arrive: clock(call.arrive),
    ready: clock(call.ready),
    release: { earliest: clock(range.earliest), likely: clock(range.likely), latest: clock(range.latest) },
    overnight: dateOfWall(call.release) !== dateOfWall(call.ready),
    lines: dayLines(call, here, file, plan, names, zone),
    continued: false,
  };
}

/** The person's own day in order: getting ready, passes, events, meals within the stay, and gaps that are long enough to go for a walk. */
function dayLines(
  call: PlanCall,
  here: readonly RoomDay[],
  file: ProductionFile,
  plan: MadePlan,
  names: Names,
  zone: ZoneClock,
): CallLine[] {
  const several = here.length > 1;
  const inStay = (item: PlanItem) => call.arrive <= item.start && item.end <= call.release;
  const known = new Set(here.flatMap((day) => day.items));
  const entries = here.flatMap((day) =>
    day.items
      .filter((item) => isOwn(item, call.person, day.room.operators) || (isRest(item, call.person) && inStay(item)))
      .map((item) => ({ item, line: lineOf(item, call.person, file, names, several ? (day.room.name ?? day.room.id) : '') })),
  );
  for (const item of plan.items)
    if (item.kind === 'event' && item.people.includes(call.person) && inStay(item) && !known.has(item))
      entries.push({ item, line: lineOf(item, call.person, file, names, '') });
  entries.sort((a, b) => (a.item.start < b.item.start ? -1 : a.item.start > b.item.start ? 1 : 0));
  const lines: CallLine[] = [];
  let until = call.arrive;
  for (const { item, line } of entries) {
    const [from, to] = [zone.minuteOf(until), zone.minuteOf(item.start)];
    const gap = from === 'gap' || to === 'gap' ? 0 : to - from;
    if (lines.length === 0 && gap > 0) lines.push(plain('other', until, item.start, 'Set up and line check'));
    else if (gap >= WORTH_A_LINE) lines.push(plain('pause', until, item.start, `free, ${length(gap)}`));
    lines.push(line);
    if (item.end > until) until = item.end;
  }
  return lines;
}

function isRest(item: PlanItem, person: PersonId): boolean {
  return (item.kind === 'meal' || item.kind === 'break') && (item.people.length === 0 || item.people.includes(person));
}

function plain(kind: CallLine['kind'], from: string, to: string, title: string): CallLine {
  return { kind, from: clock(from), to: clock(to), code: '', title, part: '', key: '', tempo: '', note: '' };
}

function lineOf(item: PlanItem, person: PersonId, file: ProductionFile, names: Names, room: string): CallLine {
  if (item.kind === 'meal') return plain('pause', item.start, item.end, 'Meal');
  if (item.kind === 'break') return plain('pause', item.start, item.end, 'Break');
  if (item.kind === 'listen') return plain('other', item.start, item.end, 'Listen');
  if (item.kind === 'event') return plain('other', item.start, item.end, names.event(item.id));
  const song = names.song(names.pass(item.id)?.song);
  const { code, title, own, parts } = passWords(file, item, names);
  const mine = parts.filter((part) => part.players?.includes(person));
  const needs = [...new Set(mine.flatMap((part) => part.needs ?? []))];
  return {
    kind: 'pass',
    from: clock(item.start),
    to: clock(item.end),
    code,
    title,
    part: ownParts(mine) || own,
    key: song ? keyWords(song, file) : '',
    tempo: song ? tempoWords(song) : '',
    note: [room, needs.length > 0 ? `needs ${needs.join(', ')}` : ''].filter((text) => text !== '').join(' · '),
  };
}

/** `D · capo 2 · DADGAD · A = 442` (the pitch only where it differs from the production's). */
function keyWords(song: Song, file: ProductionFile): string {
  const pitch = song.pitch !== undefined && song.pitch !== file.production.pitch ? `A = ${song.pitch}` : '';
  const capo = song.capo ? `capo ${song.capo}` : '';
  return [song.key ?? '', capo, song.tuning ?? '', pitch].filter((text) => text !== '').join(' · ');
}

/** `96 · 4/4 · click`; a free song has no click unless it says so. */
function tempoWords(song: Song): string {
  const tempo = song.free
    ? song.tempo === undefined
      ? 'free'
      : `free, about ${song.tempo}`
    : song.tempo === undefined
      ? ''
      : `${song.tempo}`;
  const click = song.click === true ? 'click' : song.click === false ? 'no click' : '';
  return [tempo, song.meter ?? '', click].filter((text) => text !== '').join(' · ');
}
