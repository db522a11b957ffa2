import type { Problem } from '../model';
import { neededPasses, withNeeds } from './needed';
import { leastCalls, leastMaybe } from './people';
import { leastOfRoom } from './rooms';

/**
 * A total that no valid plan beats, in cost points. A plan places all passes that are not hopeless, or the dearest one that it leaves out
 * has some price: then it pays that price and places all that are dearer. The least over these cases is the bound.
 */
export function lowerBound(problem: Problem): number {
  const needed = neededPasses(problem);
  const hopeless = hopelessPasses(problem);
  const spare = problem.passes.flatMap((pass, i) => (needed.includes(i) || hopeless.has(i) ? [] : [{ i, price: pass.unplaced }]));
  const prices = [...new Set(spare.map(({ price }) => price))];
  const cases = [-1, ...prices].map((paid) => {
    const placed = withNeeds(problem, [...needed, ...spare.filter(({ price }) => price > paid).map(({ i }) => i)]);
    return Math.max(0, paid) + leastOfPlacing(problem, placed);
  });
  const paidAnyway = [...hopeless].reduce((sum, i) => sum + problem.passes[i]!.unplaced, 0);
  return Math.round((paidAnyway + Math.min(...cases)) * 1e6) / 1e6;
}

/**
 * The least points of calls, room-days, overtime, rigs and maybe minutes of any plan that places these passes, whatever it places beside
 * them. Each part is bounded on its own, and the sum of the least parts is never above the least sum. Waiting is taken as nothing.
 */
function leastOfPlacing(problem: Problem, placed: readonly number[]): number {
  const passes = placed.map((pass) => problem.passes[pass]!);
  const { weights } = problem;
  let points = 0;
  problem.rooms.forEach((_, room) => {
    points += leastOfRoom(problem, room, placed);
  });
  problem.people.forEach((_, person) => {
    const theirs = passes.filter((pass) => pass.people.includes(person));
    points += weights.call * leastCalls(problem, person, theirs) + weights.maybe * leastMaybe(problem, person, theirs);
  });
  return points;
}

/** Should and nice passes that no plan can place: left out, without a place, or bound to one of those. */
function hopelessPasses(problem: Problem): Set<number> {
  const { passes } = problem;
  const hopeless = new Set(passes.flatMap((pass, i) => (pass.leftOut || pass.starts.length === 0 ? [i] : [])));
  const bound = passes.map((pass) => [...pass.after.map((one) => one.pass), ...pass.together]);
  for (let before = -1; before < hopeless.size;) {
    before = hopeless.size;
    bound.forEach((others, i) => {
      if (others.some((other) => hopeless.has(other))) hopeless.add(i);
    });
  }
  return hopeless;
}
