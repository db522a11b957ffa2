import type { NecessaryCondition } from '../condition';
import { isNeeded, leftOut } from '../view';
import { passWords } from '../words';

/** What a must needs before it or beside it is not left out by hand. */
export const leftOutByHand: NecessaryCondition = {
  name: 'left out by hand',
  bare: true,
  subjects: ({ statement }) => [...statement.passes.values()].filter((pass) => pass.leftOut === true).map(({ id }) => id),
  fails(view, subject) {
    const pass = view.statement.passes.get(subject)!;
    if (!leftOut(view, pass) || !isNeeded(view, subject)) return null;
    return `${passWords(view.statement, subject)} is left out, but a must pass needs it`;
  },
};
