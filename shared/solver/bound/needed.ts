import type { Problem } from '../model';

/** Passes with what they need before or beside them, in the order of the problem. */
export function withNeeds(problem: Problem, passes: readonly number[]): number[] {
  const needed = new Set(passes);
  for (const i of needed) {
    for (const { pass } of problem.passes[i]!.after) needed.add(pass);
    for (const other of problem.passes[i]!.together) needed.add(other);
  }
  return [...needed].sort((a, b) => a - b);
}

/** The passes that every valid plan places: the musts that are not left out by hand, and what they need. */
export function neededPasses(problem: Problem): number[] {
  const musts = problem.passes.flatMap((pass, i) => (pass.priority === 'must' && !pass.leftOut ? [i] : []));
  return withNeeds(problem, musts);
}
