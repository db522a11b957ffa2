import type { DayItem } from '../../shared/planner/day';
import { fitText, textWidth, wrapText } from './text';

/** A run of text in a label. `soft` is the quieter ink. */
export interface LabelRun {
  x: number;
  text: string;
  bold: boolean;
  soft: boolean;
}
export interface LabelLine {
  /** Base line. */
  y: number;
  size: number;
  runs: LabelRun[];
}
/** The words in a block; no line where the block is too low for any. */
export interface BlockLabel {
  lines: LabelLine[];
  /** Where the mark of a pinned pass stands (its middle). */
  pin: { x: number; y: number } | null;
}

interface Type {
  title: number;
  line: number;
  least: number;
}

const INSET = 10;
const PIN_ROOM = 16;
/** Space between the code and the title. */
const CODE_GAP = 8;
/** Space between the words and the times behind them. */
const TIMES_GAP = 12;
const LEADING = 1.22;
/** How much of a line's size stands above and below the base line. */
const ABOVE = 0.78;
const BELOW = 0.24;

const lineHeight = (size: number): number => size * LEADING;

/** Words for a block of that size: as many lines as fit, at least one that is small, none that leaves the block. */
export function labelOf(
  item: DayItem,
  block: { x: number; y: number; width: number; height: number },
  type: Type,
  plain: boolean,
): BlockLabel {
  const size = titleSize(block.height, type);
  const room = block.width - INSET - (item.pinned ? PIN_ROOM : 4);
  if (size === null || room < size * 2) return { lines: [], pin: item.pinned ? pinAt(block) : null };

  const soft = item.kind !== 'pass' && item.kind !== 'event';
  const titleAt = plain ? size : Math.min(size, type.line + 1);
  const times = timesOf(item, block.width - INSET - 4, type.line);
  const withTimes = block.height >= lineHeight(titleAt) + lineHeight(type.line) + 4;
  const spare = block.height - 4 - (withTimes ? lineHeight(type.line) : 0);
  const most = Math.max(1, Math.min(3, Math.floor(spare / lineHeight(titleAt))));
  const indent = item.code === null ? 0 : textWidth(item.code, titleAt, true) + CODE_GAP;
  const codeFits = indent < room - titleAt * 2;
  const words = codeFits ? wrapText(item.label, room, titleAt, most, indent) : [];
  const height = Math.max(1, words.length) * lineHeight(titleAt) + (withTimes ? lineHeight(type.line) : 0);
  const top = block.y + (block.height - height < 10 ? (block.height - height) / 2 : 4);
  const x = block.x + INSET;

  const lines: LabelLine[] = [];
  const baseline = (index: number, at: number): number =>
    top + index * lineHeight(titleAt) + (lineHeight(at) - at * (ABOVE + BELOW)) / 2 + at * ABOVE;
  const first: LabelRun[] = [];
  if (item.code !== null) first.push({ x, text: codeFits ? item.code : fitText(item.code, room, titleAt, true), bold: true, soft: false });
  if (words[0] !== undefined) first.push({ x: x + indent, text: words[0], bold: false, soft });
  if (first.length > 0) lines.push({ y: baseline(0, titleAt), size: titleAt, runs: first });
  words.slice(1).forEach((text, index) => {
    lines.push({ y: baseline(index + 1, titleAt), size: titleAt, runs: [{ x, text, bold: false, soft }] });
  });
  const beside = withTimes || !plain ? null : timesBeside(lines, item, x + room);
  if (beside) lines[0]!.runs.push(beside);
  if (withTimes && times !== '') {
    lines.push({ y: baseline(Math.max(1, words.length), type.line), size: type.line, runs: [{ x, text: times, bold: false, soft: true }] });
  }
  return { lines, pin: item.pinned ? pinAt(block) : null };
}

/** Where there is room for one line only, the times stand behind its words. */
function timesBeside(lines: LabelLine[], item: DayItem, right: number): LabelRun | null {
  const [line] = lines;
  const last = line?.runs.at(-1);
  if (!line || !last || lines.length > 1) return null;
  const text = `${item.starts}–${item.ends}`;
  const x = last.x + textWidth(last.text, line.size, last.bold) + TIMES_GAP;
  return x + textWidth(text, line.size) <= right ? { x, text, bold: false, soft: true } : null;
}

/** The times of an item, with the word for its pin where there is room for it (the mark stands in any case). */
function timesOf(item: DayItem, width: number, size: number): string {
  const times = `${item.starts}–${item.ends}`;
  const pinned = `${times} · pinned`;
  return item.pinned && textWidth(pinned, size) <= width ? pinned : fitText(times, width, size);
}

/** The size of a block's title: full where there is room, smaller down to the least, none below. */
function titleSize(height: number, type: Type): number | null {
  if (height >= lineHeight(type.title)) return type.title;
  const size = Math.floor(height / (ABOVE + BELOW) / 0.5) * 0.5;
  return size >= type.least ? Math.min(size, type.title) : null;
}

function pinAt(block: { x: number; y: number; width: number; height: number }): { x: number; y: number } {
  return { x: block.x + block.width - PIN_ROOM / 2, y: block.y + Math.min(12, block.height / 2) };
}

/** The box that a line of words fills. */
export function lineBox(line: LabelLine): { x: number; y: number; width: number; height: number } {
  const left = Math.min(...line.runs.map(({ x }) => x));
  const right = Math.max(...line.runs.map(({ x, text, bold }) => x + textWidth(text, line.size, bold)));
  return { x: left, y: line.y - line.size * ABOVE, width: right - left, height: line.size * (ABOVE + BELOW) };
}
