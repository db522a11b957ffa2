import type { StartConstraint } from './constraint';

export const apart: StartConstraint = {
  name: 'never at the same time',
  level: 'hard',
  reason: 'it would run beside a pass that it must not meet: apart, the same song in two rooms, or loud beside quiet',
  next(board, attempt) {
    let start = attempt.start;
    const { minutes, apart: others } = board.problem.passes[attempt.pass]!;
    for (let moved = others.length > 0; moved;) {
      moved = false;
      for (const other of others) {
        if (board.start[other]! < 0 || board.start[other]! >= start + minutes || start >= board.end[other]!) continue;
        start = board.end[other]!;
        moved = true;
      }
    }
    return start;
  },
};
