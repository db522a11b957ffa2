import type { ItemKind } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import type { PlanDay } from '../../planner/day';
import { toWall } from '../../time/wall';
import { clock, dayWords } from '../../time/words';
import type { Minutes, WallDate, WallTime } from '../flavours';

/** Printed documents as plain data: everything on them is decided here, the templates only set it. */

export type Paper = 'A4' | 'Letter';

/** Which plan a sheet shows, and when it was printed. A plan without a number is a draft, and the sheet says so. */
export interface SheetEdition {
  version: number | null;
  /** Wall clock of the production when the sheet was made. */
  printed: WallTime;
}

/** The wall clock of a zone at a moment given in milliseconds since 1970, to the minute. */
export function wallAt(milliseconds: number, timezone: string): WallTime {
  return toWall(Math.floor(milliseconds / 60_000), timezone);
}

/** What stands at the top of every page. */
export interface SheetHead {
  what: 'Run sheet' | 'Call sheet';
  /** The day of a run sheet, the name on a call sheet. */
  of: string;
  code: string;
  title: string;
  paper: Paper;
  /** `Version 3`, or `DRAFT`. */
  edition: string;
  draft: boolean;
  /** `printed Tue 1 December 2026 14:30`. */
  printed: string;
}

export function sheetHead(
  file: ProductionFile,
  { edition, paper }: { edition: SheetEdition; paper?: Paper },
  { what, of }: Pick<SheetHead, 'what' | 'of'>,
): SheetHead {
  const { code, title } = file.production;
  return {
    what,
    of,
    code,
    title,
    paper: paper ?? file.production.paper ?? 'A4',
    edition: edition.version === null ? 'DRAFT' : `Version ${edition.version}`,
    draft: edition.version === null,
    printed: `printed ${fullDate(edition.printed.slice(0, 10))} ${clock(edition.printed)}`,
  };
}

/** What stands at the foot of every page, beside its number, and in the title of the document. */
export function sheetFoot(head: SheetHead): string {
  return `${head.code} · ${head.what.toLowerCase()} ${head.of} · ${head.edition}`;
}

/** `2027-03-08` → `Mon 8 March 2027`. */
export function fullDate(date: WallDate): string {
  return `${dayWords(date)} ${date.slice(0, 4)}`;
}

/** A line of a run sheet that is worked through: it has room for the time it really took. */
export interface RunRow {
  is: 'row';
  kind: ItemKind;
  from: string;
  to: string;
  minutes: Minutes;
  /** Code of the song, empty where there is none. */
  code: string;
  /** Title of the song, or what the item is. */
  title: string;
  /** Parts and how they are captured, or what is done; a caution where it can hurt. */
  task: string;
  /** Short names; empty where everybody or nobody in particular is meant. */
  people: string[];
  setup: string;
  note: string;
}

/** A line between rows: who comes and who may go at a time. */
export interface PeopleMark {
  is: 'people';
  at: string;
  arrive: string[];
  release: string[];
}

/** A line between rows that does not move, drawn as a thick rule: who has to go, or what ends. */
export interface StopMark {
  is: 'stop';
  at: string;
  /** Short names of those who have to go; empty for anything else. */
  who: string[];
  says: string;
}

/** The line at which another date begins. */
export interface MidnightMark {
  is: 'midnight';
  at: string;
  says: string;
}

export type RunLine = RunRow | PeopleMark | StopMark | MidnightMark;

/** What goes on in another room at the same time. */
export interface Meanwhile {
  /** Empty where it is in no room. */
  room: string;
  from: string;
  to: string;
  says: string;
}

/** One room-day, already split into pages. */
export interface RunRoom {
  room: string;
  /** Open hours, loud hours, who works at the desk. */
  facts: string[];
  /** When the day is over: half the time, and nine times in ten; `null` where nothing is known. */
  ends: { half: string; nineInTen: string } | null;
  pages: RunPage[];
}

export interface RunPage {
  lines: RunLine[];
  meanwhile: Meanwhile[];
}

export interface RunSheet {
  head: SheetHead;
  date: WallDate;
  /** `Mon 8 March 2027`. */
  day: string;
  /** `day 1 of 4`. */
  count: string;
  rooms: RunRoom[];
  /** The day of all rooms as a drawing, for the last page. */
  threads: PlanDay;
}

/** One piece of a person's day: something to play, a pause, or time off. */
export interface CallLine {
  kind: 'pass' | 'pause' | 'other';
  from: string;
  to: string;
  code: string;
  title: string;
  /** The person's own parts in it. */
  part: string;
  /** Key, capo, tuning and, where it differs, the reference pitch. */
  key: string;
  /** Tempo, meter, click. */
  tempo: string;
  note: string;
}

export interface CallDay {
  day: string;
  count: string;
  room: string;
  arrive: string;
  ready: string;
  release: { earliest: string; likely: string; latest: string };
  /** Whether they go after midnight. */
  overnight: boolean;
  lines: CallLine[];
  /** True where the day goes on from the page before. */
  continued: boolean;
}

/** A fact with its label: door, parking, what to bring … */
export interface CallFact {
  label: string;
  says: string;
}

export interface CallPage {
  days: CallDay[];
  /** Place, things to bring and whom to ring; on the last page. */
  facts: CallFact[];
}

export interface CallSheet {
  head: SheetHead;
  person: string;
  name: string;
  plays: string;
  pages: CallPage[];
}
