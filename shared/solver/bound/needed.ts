import type { Problem } from '../model';

/** The passes that every valid plan places: the musts that are not left out by hand, and what they need before or beside them. */
export function neededPasses(problem: Problem): number[] {
  const { passes } = problem;
  const needed = new Set(passes.flatMap((pass, i) => (pass.priority === 'must' && !pass.leftOut ? [i] : [])));
  for (const i of needed) {
    for (const { pass } of passes[i]!.after) needed.add(pass);
    for (const other of passes[i]!.together) needed.add(other);
  }
  return [...needed].sort((a, b) => a - b);
}
