import { fillPages, headerExtra, linesOf, PAGE_MM } from './pages';
import type { CallDay, CallFact, CallLine, CallPage, SheetHead } from './sheet';

/** Heights in millimetres, those of templates/print.css. */
const HEADER = 37;
const DAY_HEAD = 35;
const LINE = 5.3;
const COLUMNS = { what: 74, key: 27, tempo: 39, fact: 63 };
/** The most lines of one day on a page. */
const MOST_LINES = 12;

function heightOfLine(line: CallLine): number {
  if (line.kind === 'pause') return 7.8;
  const what = 7.7 + (linesOf(`${line.code.repeat(2)} ${line.title}`, COLUMNS.what, { points: 15 }) - 1) * 6;
  const below = [line.part, line.note].filter((text) => text !== '').reduce((sum, text) => sum + linesOf(text, COLUMNS.what) * LINE, 0);
  return 2.6 + Math.max(9, what + below, linesOf(line.key, COLUMNS.key) * LINE, linesOf(line.tempo, COLUMNS.tempo) * LINE);
}

function heightOfDay(day: CallDay): number {
  return (day.continued ? 14 : DAY_HEAD) + day.lines.reduce((sum, line) => sum + heightOfLine(line), 0);
}

export function heightOfFacts(facts: readonly CallFact[]): number {
  const heights = facts.map((fact) => linesOf(fact.says, COLUMNS.fact) * LINE + 1.2);
  const total = heights.reduce((sum, height) => sum + height, 0);
  // Two columns as even as whole facts allow.
  let left = 0;
  let least = total;
  for (const height of heights) {
    left += height;
    least = Math.min(least, Math.max(left, total - left));
  }
  return 6 + least;
}

/** A day that is longer than a page goes on under its date on the next one. */
function split(day: CallDay, room: number): CallDay[] {
  return fillPages(day.lines, heightOfLine, room - DAY_HEAD, MOST_LINES).map((lines, index) => ({ ...day, lines, continued: index > 0 }));
}

/** Puts the days on pages, a day never torn where it fits one page, and the facts on the first page that has room for them. */
export function callPages(days: readonly CallDay[], facts: CallFact[], head: SheetHead, plays: string): CallPage[] {
  const extra = headerExtra(`${head.code} ${head.title}`, [
    { text: head.of, column: 185, points: 38, bold: true },
    { text: plays, column: 115 },
  ]);
  const room = PAGE_MM[head.paper].live - HEADER - extra;
  const pieces = days.flatMap((day) => split(day, room));
  const pages = fillPages(pieces, heightOfDay, room);
  const left = pages.map((page) => room - page.reduce((sum, day) => sum + heightOfDay(day), 0));
  const roomy = left.findIndex((millimetres) => millimetres >= heightOfFacts(facts));
  const filled = pages.map((page, index): CallPage => ({ days: page, facts: index === roomy ? facts : [] }));
  return roomy < 0 ? [...filled, { days: [], facts }] : filled;
}
