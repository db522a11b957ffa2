import type { Minute } from '../../shared/domain/flavours';
import type { DayThread } from '../../shared/planner/day';
import type { Stay } from '../../shared/planner/threads';
import type { RoomMark } from './layout';

/** A vertical stretch of a thread. */
export interface Stretch {
  top: number;
  bottom: number;
}
export interface ThickStretch extends Stretch {
  mark: RoomMark;
}

/** One person's thread as shapes: thin where they wait, medium where they get ready, thick where they play, nothing where they rest. */
export interface ThreadShape {
  person: string;
  x: number;
  thick: number;
  wait: Stretch[];
  ready: Stretch[];
  play: ThickStretch[];
  /** Rings at arrivals, bars at releases. */
  arrivals: number[];
  releases: number[];
}

interface Place {
  x: number;
  y: (at: Minute) => number;
  thick: number;
  markOf: (room: string | null) => RoomMark;
}

/** Thick stretches stand a little apart, so that two passes in a row are two. */
const TOP_GAP = 2;
const BOTTOM_GAP = 3;

export function threadShapes(thread: DayThread, { x, y, thick, markOf }: Place): ThreadShape {
  const stretches = <As extends 'play' | 'ready'>(as: As) =>
    thread.stays.flatMap(({ marks }) =>
      marks
        .filter((mark) => mark.as === as)
        .map((mark) => ({
          top: y(mark.from) + TOP_GAP,
          bottom: Math.max(y(mark.from) + TOP_GAP + 2, y(mark.to) - BOTTOM_GAP),
          room: mark.room,
        })),
    );
  return {
    person: thread.person,
    x,
    thick,
    wait: thread.stays.flatMap((stay) => awake(stay).map(({ from, to }) => ({ top: y(from), bottom: y(to) }))),
    ready: stretches('ready').map(({ top, bottom }) => ({ top, bottom })),
    play: stretches('play').map(({ top, bottom, room }) => ({ top, bottom, mark: markOf(room) })),
    arrivals: thread.stays.map(({ arrive }) => y(arrive)),
    releases: thread.stays.map(({ release }) => y(release)),
  };
}

/** A stay without its meals and breaks: the thin line goes under everything else and is broken only there. */
function awake(stay: Stay): { from: Minute; to: Minute }[] {
  const pieces: { from: Minute; to: Minute }[] = [];
  let from = stay.arrive;
  for (const rest of stay.marks.filter(({ as }) => as === 'rest')) {
    if (rest.from > from) pieces.push({ from, to: rest.from });
    from = Math.max(from, rest.to);
  }
  if (stay.release > from) pieces.push({ from, to: stay.release });
  return pieces;
}
