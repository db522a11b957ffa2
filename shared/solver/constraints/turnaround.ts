import { EVER } from '../model';
import type { StartConstraint } from './constraint';

export const turnaround: StartConstraint = {
  name: 'turnaround between dates',
  level: 'hard',
  reason: 'somebody it needs would have too short a night',
  next(board, attempt) {
    const least = board.problem.rules.turnaround;
    const release = attempt.to[attempt.count - 1]!;
    if (attempt.after < release + least) return EVER;
    const deficit = attempt.before + least - attempt.from[0]!;
    if (deficit <= 0) return attempt.start;
    const first = attempt.at === 0 || (attempt.readyMoves && attempt.from[0] === attempt.readyFrom);
    return first ? attempt.start + deficit : EVER;
  },
};
