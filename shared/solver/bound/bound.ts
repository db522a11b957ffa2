import type { Problem } from '../model';
import { neededPasses } from './needed';
import { leastCalls, leastMaybe } from './people';
import { leastOfRoom } from './rooms';

/**
 * A total that no valid plan beats, in cost points. Each part of the cost is bounded on its own, for the passes that every valid plan
 * places: the sum of the least parts is never above the least sum. Waiting is taken as nothing. What more passes add is never negative.
 */
export function lowerBound(problem: Problem): number {
  const needed = neededPasses(problem).map((pass) => problem.passes[pass]!);
  const { weights } = problem;
  let points = pricesOfTheHopeless(problem);
  problem.rooms.forEach((_, room) => {
    points += leastOfRoom(
      problem,
      room,
      needed.filter((pass) => pass.room === room),
    );
  });
  problem.people.forEach((_, person) => {
    const theirs = needed.filter((pass) => pass.people.includes(person));
    points += weights.call * leastCalls(problem, person, theirs) + weights.maybe * leastMaybe(problem, person, theirs);
  });
  return Math.round(points * 1e6) / 1e6;
}

/** The price of should and nice passes that no plan can place: left out, without a place, or bound to one of those. */
function pricesOfTheHopeless(problem: Problem): number {
  const { passes } = problem;
  const hopeless = new Set(passes.flatMap((pass, i) => (pass.leftOut || pass.starts.length === 0 ? [i] : [])));
  const bound = passes.map((pass) => [...pass.after.map((one) => one.pass), ...pass.together]);
  for (let before = -1; before < hopeless.size;) {
    before = hopeless.size;
    bound.forEach((others, i) => {
      if (others.some((other) => hopeless.has(other))) hopeless.add(i);
    });
  }
  return [...hopeless].reduce((sum, i) => sum + passes[i]!.unplaced, 0);
}
