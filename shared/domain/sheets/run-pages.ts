import { fillPages, linesOf, PAGE_MM } from './pages';
import type { Meanwhile, Paper, RunLine, RunPage, RunRow } from './sheet';

/** The most rows that can be read from a stand. */
const MOST_ROWS = 14;
/** Header of the page and labels of the columns, in millimetres; the set width of the columns is that of templates/print.css. */
const HEADER = 50;
const COLUMNS = { what: 68, people: 38, setup: 25, beside: 155 };
const LINE = 5.4;
const LOW = new Set<RunRow['kind']>(['meal', 'break', 'wrap', 'listen', 'reserve']);

export function heightOfRunLine(line: RunLine): number {
  if (line.is === 'people') return 1.6 + LINE * linesOf([...line.arrive, ...line.release, 'arrive', 'can go'].join(', '), COLUMNS.beside);
  if (line.is !== 'row') return 3.2 + LINE * linesOf(line.says, COLUMNS.beside, 14);
  const title = linesOf(`${line.code.repeat(2)} ${line.title}`, COLUMNS.what, 15) * 7.2;
  const below = [line.task, line.note].filter((text) => text !== '').reduce((sum, text) => sum + linesOf(text, COLUMNS.what) * LINE, 0);
  const people = linesOf(line.people.join(', '), COLUMNS.people) * LINE;
  const setup = linesOf(line.setup, COLUMNS.setup) * LINE;
  return 3.4 + Math.max(LOW.has(line.kind) ? 10.5 : 14, title + below, people, setup);
}

/** Splits a room-day into pages. What goes on elsewhere and the cautions stand on the last one, or on one of their own. */
export function runPages(lines: readonly RunLine[], meanwhile: Meanwhile[], cautions: string[], paper: Paper): RunPage[] {
  const room = PAGE_MM[paper].live - HEADER;
  const pages = fillPages(lines, heightOfRunLine, room, MOST_ROWS, (line) => line.is === 'row').map((page): RunPage => ({
    lines: page,
    meanwhile: [],
    cautions: [],
  }));
  const foot =
    (meanwhile.length > 0 ? 9 : 0) + meanwhile.reduce((sum, one) => sum + linesOf(one.says, 130) * LINE, 0) + cautions.length * 2 * LINE;
  const last = pages.at(-1)!;
  const used = last.lines.reduce((sum, line) => sum + heightOfRunLine(line), 0);
  if (used + foot <= room) return [...pages.slice(0, -1), { ...last, meanwhile, cautions }];
  return [...pages, { lines: [], meanwhile, cautions }];
}
