import type { Problem } from '../model';
import type { Solution } from '../solution';
import type { Random } from './random';

/**
 * A first order: work that others wait for and that has little choice comes early, set-ups stay together. Every pass is wanted on its
 * first room-day; what finds no room there is carried on by the decoder.
 * @param shake 0 for the plain order; more leaves more to chance
 */
export function startSolution(problem: Problem, solution: Solution, random: Random, shake: number): void {
  const { passes } = problem;
  const latest = latestStarts(problem);
  const key = passes.map((pass, i) => {
    const musts = pass.priority === 'must' ? 0 : 1;
    return { i, musts, layer: layerOf(problem, i), latest: latest[i]! + random.below(shake * 60 + 1), setup: pass.setup };
  });
  key.sort((a, b) => a.layer - b.layer || a.musts - b.musts || a.latest - b.latest || a.setup - b.setup || a.i - b.i);
  const done = new Uint8Array(passes.length);
  let count = 0;
  const visit = (i: number, layer: number): void => {
    if (done[i] === 1) return;
    done[i] = 1;
    for (const { pass } of passes[i]!.after) if (layerOf(problem, pass) === layer) visit(pass, layer);
    solution.order[count++] = i;
  };
  for (const { i, layer } of key) visit(i, layer);
  passes.forEach((pass, i) => (solution.day[i] = pass.days[0] ?? -1));
  solution.lead.fill(0);
  solution.out.fill(0);
  solution.begin.fill(0);
  solution.eve.fill(0);
}

function layerOf(problem: Problem, pass: number): number {
  const day = problem.passes[pass]!.days[0];
  return day === undefined ? -1 : problem.days[day]!.layer;
}

/** The latest start of each pass that still leaves time for what follows it. */
function latestStarts(problem: Problem): number[] {
  const { passes } = problem;
  const latest = passes.map((pass) => pass.starts.at(-1)?.to ?? 0);
  for (let round = 0, moved = true; moved && round < passes.length; round++) {
    moved = false;
    passes.forEach((pass, i) => {
      for (const { pass: before, lag } of pass.after) {
        const bound = latest[i]! - lag - passes[before]!.minutes;
        if (latest[before]! <= bound) continue;
        latest[before] = bound;
        moved = true;
      }
    });
  }
  return latest;
}
