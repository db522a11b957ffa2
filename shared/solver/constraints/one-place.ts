import { EVER } from '../model';
import type { StartConstraint } from './constraint';

/** Asked before the new items join the person's list. */
export const onePlace: StartConstraint = {
  name: 'one place at a time',
  level: 'hard',
  reason: 'somebody it needs is somewhere else then',
  next(_board, attempt) {
    const { start, end, readyFrom, readyTo, readyMoves } = attempt;
    for (let k = 0; k < attempt.count; k++) {
      const from = attempt.from[k]!;
      const to = attempt.to[k]!;
      if (from < end && start < to) return to;
      if (readyFrom >= 0 && from < readyTo && readyFrom < to) return readyMoves ? start + to - readyFrom : EVER;
    }
    return start;
  },
};
