import { EVER } from '../model';
import type { StartConstraint } from './constraint';

export const dayLimit: StartConstraint = {
  name: 'longest day of a person',
  level: 'hard',
  reason: 'the day of somebody it needs would get too long',
  next(board, attempt) {
    const { day } = board.problem.people[attempt.person]!;
    if (day === null) return attempt.start;
    const excess = attempt.to[attempt.count - 1]! - attempt.from[0]! - day;
    if (excess <= 0) return attempt.start;
    // Starting later makes the day shorter only where the pass, or the ready minutes that move with it, comes first.
    const first = attempt.at === 0 || (attempt.readyMoves && attempt.from[0] === attempt.readyFrom);
    return first && attempt.at < attempt.count - 1 ? attempt.start + excess : EVER;
  },
};
