import { EVER, holds } from '../model';
import type { StartConstraint } from './constraint';

export const stays: StartConstraint = {
  name: 'people stay within their windows',
  level: 'hard',
  reason: 'somebody it needs could not be there from arrival to release',
  next(board, attempt) {
    const { windows, away } = board.problem.people[attempt.person]!;
    if (windows === null) return attempt.start;
    let from = attempt.from[0]!;
    let to = attempt.to[0]!;
    for (let k = 1; k <= attempt.count; k++) {
      const goesOn = k < attempt.count && (away === null || attempt.from[k]! - to < away);
      if (goesOn) {
        to = attempt.to[k]!;
        continue;
      }
      if (!holds(windows, from, to)) {
        if (attempt.readyMoves && attempt.readyFrom === from) {
          const window = windows.find((one) => one.from <= attempt.start && attempt.end <= one.to);
          if (window && window.from > from) return attempt.start + window.from - from;
        }
        // Only a longer gap before the pass could split the stay.
        const before = attempt.at > 0 ? attempt.to[attempt.at - 1]! : EVER;
        return away !== null && before < EVER && attempt.start - before < away ? before + away : EVER;
      }
      if (k < attempt.count) {
        from = attempt.from[k]!;
        to = attempt.to[k]!;
      }
    }
    return attempt.start;
  },
};
