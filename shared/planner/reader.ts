import type { ProductionFile } from '../contracts/resources';
import type { Hours } from '../contracts/values';
import type { Minute, Minutes, WallTime } from '../domain/flavours';
import type { Span } from '../solver/model';

/** Turns ids of one list into positions; an id that is not there is -1. */
export type IndexOf = (id: string | undefined) => number;

export function indexOf(list: readonly { id: string }[]): IndexOf {
  const known = new Map(list.map(({ id }, i) => [id, i]));
  return (id) => (id === undefined ? -1 : (known.get(id) ?? -1));
}

/** What the parts of the reading share. */
export interface Reader {
  file: ProductionFile;
  minute(wall: WallTime): Minute;
  span(window: Hours): Span;
  room: IndexOf;
  person: IndexOf;
  setup: IndexOf;
  song: IndexOf;
  gear: IndexOf;
  event: IndexOf;
  /** A length rounded up to the step. */
  rounded(minutes: Minutes): Minutes;
}

/** Positions of the ids that exist, in order and each once. */
export function indices(ids: readonly string[] | undefined, of: IndexOf): number[] {
  const found = new Set((ids ?? []).map(of).filter((index) => index >= 0));
  return [...found].sort((a, b) => a - b);
}
