import type { Minute, Minutes } from '../../domain/flavours';
import type { Board } from '../board';
import type { StartConstraint } from './constraint';

/** The first start at or after `start` from which `count` of a piece of gear are free for the whole pass. */
function freeFrom(board: Board, gear: number, count: number, start: Minute, minutes: Minutes): Minute {
  const { passes } = board.problem;
  const owned = board.problem.gear[gear]!.count;
  const users = board.problem.gear[gear]!.passes;
  for (let at = start; ;) {
    // Use only rises where a pass begins, so the peak within the stretch lies at its start or at the start of another user.
    let clash = false;
    let release = Infinity;
    for (let i = -1; i < users.length && !clash; i++) {
      const point = i < 0 ? at : board.start[users[i]!]!;
      if (point < at || point >= at + minutes) continue;
      let used = count;
      let ends = Infinity;
      for (const user of users) {
        if (board.start[user]! < 0 || board.start[user]! > point || point >= board.end[user]!) continue;
        for (const use of passes[user]!.uses) if (use.gear === gear) used += use.count;
        ends = Math.min(ends, board.end[user]!);
      }
      if (used > owned) {
        clash = true;
        release = ends;
      }
    }
    if (!clash) return at;
    at = Math.max(release, at + 1);
  }
}

export const gearCount: StartConstraint = {
  name: 'gear is there once only',
  level: 'hard',
  reason: 'gear it uses is in use elsewhere then',
  next(board, attempt) {
    const pass = board.problem.passes[attempt.pass]!;
    let start = attempt.start;
    for (let i = 0; i < pass.uses.length; i++) {
      const later = freeFrom(board, pass.uses[i]!.gear, pass.uses[i]!.count, start, pass.minutes);
      if (later > start) {
        start = later;
        i = -1;
      }
    }
    return start;
  },
};
