import { fillPages, headerExtra, linesOf, PAGE_MM } from './pages';
import type { Meanwhile, RunLine, RunPage, RunRoom, RunRow, SheetHead } from './sheet';

/** The most rows that can be read from a stand. */
const MOST_ROWS = 14;
/** Millimetres of templates/print.css: header with the labels of the columns, lines of text, the clock of a row, widths of the columns. */
const HEADER = 44;
const BODY = 5.3;
const TITLE = { first: 7.7, next: 6 };
const CLOCK = 12.3;
const PADDING = { row: 3.1, low: 2.1 };
const COLUMNS = { what: 71, people: 33, setup: 21, beside: 155 };
const LOW = new Set<RunRow['kind']>(['meal', 'break', 'wrap', 'listen', 'reserve', 'event']);

export function heightOfRunLine(line: RunLine): number {
  if (line.is === 'people') return 2.2 + BODY * linesOf([...line.arrive, ...line.release, 'arrive', 'can go'].join(', '), COLUMNS.beside);
  if (line.is !== 'row')
    return 3.4 + 6.2 * linesOf([...('who' in line ? line.who : []), line.says].join(', '), COLUMNS.beside, { points: 14, bold: true });
  const title = TITLE.first + (linesOf(`${line.code.repeat(2)} ${line.title}`, COLUMNS.what, { points: 15 }) - 1) * TITLE.next;
  const below = [line.task, line.note].filter((text) => text !== '').reduce((sum, text) => sum + linesOf(text, COLUMNS.what) * BODY, 0);
  const people = linesOf(line.people.join(', '), COLUMNS.people, { bold: true }) * BODY;
  const setup = linesOf(line.setup, COLUMNS.setup) * BODY;
  return (LOW.has(line.kind) ? PADDING.low : PADDING.row) + Math.max(CLOCK, title + below, people, setup);
}

/** A last page of marks without a row would be torn from what they belong to: it takes the last row along. */
function withoutOrphans(pages: RunLine[][]): RunLine[][] {
  const last = pages.at(-1)!;
  const before = pages.at(-2);
  if (!before || last.some((line) => line.is === 'row')) return pages;
  const from = before.findLastIndex((line) => line.is === 'row');
  return from <= 0 ? pages : [...pages.slice(0, -2), before.slice(0, from), [...before.slice(from), ...last]];
}

/** Splits a room-day into pages. What goes on elsewhere stands on the last one, or on one of its own. */
export function runPages(
  lines: readonly RunLine[],
  meanwhile: Meanwhile[],
  head: SheetHead,
  of: Pick<RunRoom, 'room' | 'facts'>,
): RunPage[] {
  const extra = headerExtra(`${head.code} ${head.title}`, [
    { text: of.room, column: 60, points: 20, bold: true },
    { text: of.facts.join(' · '), column: 105 },
  ]);
  const room = PAGE_MM[head.paper].live - HEADER - extra;
  const filled = fillPages(lines, heightOfRunLine, room, MOST_ROWS, (line) => line.is === 'row');
  const pages = withoutOrphans(filled).map((page): RunPage => ({ lines: page, meanwhile: [] }));
  const foot = 9 + meanwhile.reduce((sum, one) => sum + linesOf(one.says, 130) * BODY, 0);
  const last = pages.at(-1)!;
  const used = last.lines.reduce((sum, line) => sum + heightOfRunLine(line), 0);
  if (meanwhile.length === 0 || used + foot <= room) return [...pages.slice(0, -1), { ...last, meanwhile }];
  return [...pages, { lines: [], meanwhile }];
}
