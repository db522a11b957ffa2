import type { Minute } from '../../shared/domain/flavours';
import type { DayItem, PlanDay } from '../../shared/planner/day';
import { labelOf, lineBox, type BlockLabel } from './labels';
import { threadShapes, type ThreadShape } from './threadShapes';
import { fitText, textWidth } from './text';

/**
 * Presence threads as geometry: time runs downwards, one column of blocks per room at the left, one thin line per person at the right.
 * Pure: the same day and width give the same shapes on screen, in the preview and in print. All lengths are px of the drawing.
 */

export type DrawingMode = 'screen' | 'print';
export interface DrawingOptions {
  mode: DrawingMode;
  width: number;
}

export interface Rect {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** How a thick stretch tells its room where there are several: filled, hollow, or rungs. */
export type RoomMark = 'filled' | 'hollow' | 'rungs';
const ROOM_MARKS: readonly RoomMark[] = ['filled', 'hollow', 'rungs'];

export interface Block extends Rect {
  item: DayItem;
  /** How the block is drawn: `plain` has a wash and an ink bar, `words` nothing but its label. */
  as: 'plain' | 'dotted' | 'hairline' | 'words';
  /** How far the wash goes: over the threads where there is one room. */
  wash: number;
  label: BlockLabel;
  /** Where the hour lines behind are cleared away, so that none runs through the words. */
  cleared: Rect[];
}

export interface Lane {
  x: number;
  width: number;
  title: string;
  mark: RoomMark;
  titled: boolean;
}

export interface ThreadName {
  person: string;
  /** Where the text starts, and how it is turned, in degrees. */
  x: number;
  y: number;
  angle: number;
  text: string;
  called: boolean;
}

export interface DayDrawing {
  width: number;
  height: number;
  /** Left end of the hour lines and of the blocks. */
  left: number;
  threadsLeft: number;
  threadsRight: number;
  hours: { at: Minute; y: number; label: string }[];
  lanes: Lane[];
  blocks: Block[];
  names: ThreadName[];
  threads: ThreadShape[];
}

/** Sizes of type and strokes. Nothing is set smaller than 11 px on screen. */
export const TYPE = {
  screen: { title: 14, line: 12, least: 11, hour: 14, name: 12 },
  print: { title: 15, line: 13, least: 12, hour: 15, name: 13 },
} as const;

/** px per minute: what the look draws, and the most that short items may stretch a day. */
const SCALE = 0.92;
const MOST_SCALE = 1.5;
const CLOCK_COLUMN = 48;
const LANE_GAP = 10;
const LEAST_LANE = 100;
/** Blocks are given this much before the threads are set further apart than they must. */
const GOOD_LANE = 170;
const PITCH = { most: 20, least: 13 };
/** With more people than this, only those who are called are drawn. */
const ALL_NAMED = 14;
const EDGE = 8;
const NAME_MOST = 78;
/** How far right of its thread a name begins, in sizes. */
const NAME_START = 0.3;
const BELOW = 14;

/** px per minute for a day, so that its shortest item still holds one line. */
export function minuteHeight(day: Pick<PlanDay, 'shortest'>, mode: DrawingMode): number {
  const line = TYPE[mode].least + 2.8;
  return Math.min(MOST_SCALE, Math.max(SCALE, line / day.shortest));
}

const drawn = (day: PlanDay): PlanDay['threads'] =>
  day.threads.length <= ALL_NAMED ? day.threads : day.threads.filter(({ stays }) => stays.length > 0);

/** Rooms that get a column: those in which something is drawn, or the first of an empty day; a last one for what happens in no room. */
export function columns(day: PlanDay): { room: string | null; title: string }[] {
  const items = day.items.filter(({ beside }) => !beside);
  const busy = day.rooms.filter(({ id }) => items.some(({ room }) => room === id));
  const rooms = (busy.length > 0 ? busy : day.rooms.slice(0, 1)).map(({ id, name }) => ({ room: id as string | null, title: name }));
  const known = new Set(rooms.map(({ room }) => room));
  const astray = items.some(({ room }) => room === null || !known.has(room));
  return astray ? [...rooms, { room: null, title: 'Elsewhere' }] : rooms;
}

/** The least width at which a day's blocks can be read. */
export function leastWidth(day: PlanDay, mode: DrawingMode): number {
  const { right, pitch } = threadRoom(day, mode, 0);
  return CLOCK_COLUMN + columns(day).length * (LEAST_LANE + LANE_GAP) + pitch * drawn(day).length + right;
}

interface ThreadRoom {
  pitch: number;
  /** Turn of the names, in degrees, so that neighbours stand apart. */
  angle: number;
  names: string[];
  header: number;
  /** Room that the last names need beyond their thread. */
  right: number;
}

function threadRoom(day: PlanDay, mode: DrawingMode, width: number): ThreadRoom {
  const threads = drawn(day);
  const lanes = columns(day).length;
  const size = TYPE[mode].name;
  const free = width - CLOCK_COLUMN - EDGE - lanes * (GOOD_LANE + LANE_GAP);
  const pitch = Math.min(PITCH.most, Math.max(PITCH.least, Math.floor(free / Math.max(1, threads.length))));
  const turn = Math.asin(Math.min(1, (size * 0.9) / pitch));
  const names = threads.map(({ short }) => fitText(short, NAME_MOST, size));
  const longest = Math.max(0, ...names.map((name) => textWidth(name, size)));
  const start = size * NAME_START;
  const beyond = names.map((name, index) => start + textWidth(name, size) * Math.cos(turn) - (names.length - 1 - index) * pitch);
  return {
    pitch,
    angle: (-turn * 180) / Math.PI,
    names,
    header: Math.ceil(longest * Math.sin(turn)) + size,
    right: Math.max(EDGE, Math.ceil(Math.max(0, ...beyond))),
  };
}

/** Lays a day out. */
export function layoutDay(day: PlanDay, { mode, width }: DrawingOptions): DayDrawing {
  const type = TYPE[mode];
  const scale = minuteHeight(day, mode);
  const threads = drawn(day);
  const cols = columns(day);
  const { pitch, angle, names, header, right } = threadRoom(day, mode, width);
  const titled = cols.length > 1;
  const top = header + 14;
  const y = (at: Minute): number => top + (at - day.from) * scale;
  const threadsRight = width - right + (threads.length > 0 ? pitch / 2 : 0);
  const threadsLeft = threadsRight - pitch * threads.length;
  const laneWidth = (threadsLeft - CLOCK_COLUMN) / cols.length - LANE_GAP;
  const lanes = cols.map(({ title }, index): Lane => ({
    x: CLOCK_COLUMN + index * (laneWidth + LANE_GAP),
    width: laneWidth,
    title: fitText(title, laneWidth - 16, type.line, true),
    mark: ROOM_MARKS[index % ROOM_MARKS.length]!,
    titled,
  }));
  const laneOf = (item: DayItem): number => {
    const index = cols.findIndex(({ room }) => room === item.room);
    return index < 0 ? cols.length - 1 : index;
  };
  const blocks = day.items
    .filter(({ from, to, beside }) => from < to && !beside)
    .map((item): Block => {
      const lane = lanes[laneOf(item)]!;
      const rect = { x: lane.x, y: y(item.from), width: lane.width, height: Math.max(2, (item.to - item.from) * scale - 1.5) };
      const as = shapeOf(item);
      const label = labelOf(item, rect, type, as === 'plain');
      const wash = titled ? lane.width : threadsRight - lane.x;
      return { ...rect, item, as, wash, label, cleared: as === 'words' ? label.lines.map(lineBox) : [rect] };
    });
  return {
    width,
    height: Math.ceil(y(day.to) + BELOW),
    left: CLOCK_COLUMN,
    threadsLeft,
    threadsRight,
    hours: day.hours.map(({ at, label }) => ({ at, y: y(at), label })),
    lanes,
    blocks,
    names: threads.map(({ person, stays }, index) => ({
      person,
      x: threadsLeft + (index + 0.5) * pitch + type.name * NAME_START,
      y: top - 11,
      angle,
      text: names[index]!,
      called: stays.length > 0,
    })),
    threads: threads.map((thread, index) =>
      threadShapes(thread, {
        x: threadsLeft + (index + 0.5) * pitch,
        y,
        thick: Math.min(7, pitch - 6),
        markOf: (room) => (titled ? markOf(room, cols) : 'filled'),
      }),
    ),
  };
}

function markOf(room: string | null, cols: { room: string | null }[]): RoomMark {
  const index = cols.findIndex((column) => column.room === room);
  return ROOM_MARKS[(index < 0 ? cols.length - 1 : index) % ROOM_MARKS.length]!;
}

function shapeOf(item: DayItem): Block['as'] {
  switch (item.kind) {
    case 'pass':
    case 'listen':
    case 'event':
      return 'plain';
    case 'rig':
    case 'changeover':
      return 'dotted';
    case 'reserve':
      return 'hairline';
    case 'meal':
    case 'break':
    case 'wrap':
      return 'words';
  }
}
