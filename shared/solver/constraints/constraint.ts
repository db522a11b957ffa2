import type { Minute } from '../../domain/flavours';
import type { Attempt } from '../attempt';
import type { Board } from '../board';

/** Levels compare in order and are never folded into weights: no hard breach, then every must, then the cost. */
export type Level = 'hard' | 'musts' | 'soft';

/** A rule of the contract by name, with its reason in words. */
export interface Constraint {
  name: string;
  level: Level;
  /** Why a pass cannot stand where this rule forbids it, as the end of a sentence. */
  reason: string;
}

/**
 * A hard rule that says where a pass may start: the first minute at or after `attempt.start` at which this rule does not speak against
 * it, or `EVER`. The answer may be too early for other rules; the search for a start asks all of them until none moves it.
 */
export interface StartConstraint extends Constraint {
  next(board: Board, attempt: Attempt): Minute;
}
