import type { NecessaryCondition } from '../condition';
import { coupleOf, fits } from '../couples';
import { placesOf } from '../places';
import { isNeeded, neededPasses } from '../view';
import { passWords } from '../words';

/** Every two passes that must be placed and bind each other have a place each that suits both. */
export const couples: NecessaryCondition = {
  name: 'couples',
  subjects(view) {
    const needed = neededPasses(view);
    return needed.flatMap((one, i) => needed.slice(i + 1).map((other) => `${one.id} ${other.id}`));
  },
  fails(view, subject) {
    const [one, other] = subject.split(' ').map((id) => view.statement.passes.get(id)!) as [never, never];
    const couple = coupleOf(view, one, other);
    if (!couple || !isNeeded(view, couple.one.id) || !isNeeded(view, couple.other.id)) return null;
    const theirs = placesOf(view, couple.other);
    if (placesOf(view, couple.one).some((here) => theirs.some((there) => fits(view, couple, here, there)))) return null;
    const names = [couple.one, couple.other].map(({ id }) => passWords(view.statement, id));
    return couple.together ? `${names[0]} and ${names[1]} cannot start together` : `${names[0]} and ${names[1]} cannot both have a time`;
  },
};
