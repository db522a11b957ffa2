import type { NecessaryCondition } from '../condition';
import { placesOf } from '../places';
import { isNeeded, neededPasses } from '../view';
import { passWords } from '../words';

/** Every pass that must be placed has a place for itself: free people, an open room, gear, loud hours, its pin, and room for rig and wrap. */
export const placement: NecessaryCondition = {
  name: 'placement',
  subjects: (view) => neededPasses(view).map(({ id }) => id),
  fails(view, subject) {
    const pass = view.statement.passes.get(subject)!;
    if (!isNeeded(view, subject) || placesOf(view, pass).length > 0) return null;
    return `There is no time for ${passWords(view.statement, subject)}`;
  },
};
