import type { Rules } from '../contracts/head';
import type { Minutes } from '../domain/flavours';

export type PauseRules = Pick<Required<Rules>, 'meal' | 'mealAfter' | 'break' | 'breakAfter'>;

/**
 * The least minutes of pauses among so many minutes of work that follow each other in some room-days. Stretches of work between meals last
 * at most `mealAfter`; those between breaks at most `breakAfter`, or as long as the longest single item, which may stand alone. So the
 * work is in at least work ÷ that many stretches, and all but the last stretch of each room-day have a pause after them.
 */
export function leastPauses(rules: PauseRules, work: Minutes, longest: Minutes, roomDays: number): Minutes {
  const mealGaps = rules.meal > 0 ? Math.max(0, Math.ceil(work / rules.mealAfter) - roomDays) : 0;
  const breaks = rules.breakAfter > 0 && rules.break > 0;
  const breakGaps = breaks ? Math.max(0, Math.ceil(work / Math.max(rules.breakAfter, longest)) - roomDays) : 0;
  return mealGaps * rules.meal + Math.max(0, breakGaps - mealGaps) * rules.break;
}

/** The most minutes of work in a person's day of so many minutes: stretches of at most `mealAfter` with gaps of a meal between them. */
export function mostOfDay(rules: PauseRules, day: Minutes): Minutes {
  const { meal, mealAfter } = rules;
  if (meal === 0 || day <= mealAfter) return day;
  const rounds = Math.floor(day / (mealAfter + meal));
  return rounds * mealAfter + Math.min(mealAfter, day - rounds * (mealAfter + meal));
}

/** The most minutes of work that so long a room-day holds beside what blocks it, which may serve as a pause. */
export function mostOfRoomDay(rules: PauseRules, length: Minutes, blocked: Minutes, longest: Minutes): Minutes {
  let least = 0;
  let most = Math.max(1, length - blocked + 1);
  while (most - least > 1) {
    const middle = Math.floor((least + most) / 2);
    if (middle + Math.max(blocked, leastPauses(rules, middle, longest, 1)) <= length) least = middle;
    else most = middle;
  }
  return least;
}
