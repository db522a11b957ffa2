import { EVER } from '../model';
import type { StartConstraint } from './constraint';

export const voice: StartConstraint = {
  name: 'voice minutes a day',
  level: 'hard',
  reason: 'somebody would sing more than the voice bears in a day',
  next(board, attempt) {
    const { people, passes } = board.problem;
    const limit = people[attempt.person]!.voice;
    if (limit === null) return attempt.start;
    let sum = 0;
    for (let k = 0; k < attempt.count; k++) {
      const ref = attempt.ref[k]!;
      if (ref < 0) continue;
      for (const { person, minutes } of passes[ref]!.voice) if (person === attempt.person) sum += minutes;
    }
    return sum > limit ? EVER : attempt.start;
  },
};
