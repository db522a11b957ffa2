import type { Problem } from '../model';
import type { Solution } from '../solution';
import type { Random } from './random';

/**
 * Passes in the order in which a first timetable takes them up: what others wait for and what has little choice comes early, every pass
 * after those it depends on.
 * @param shake hours by which chance may hold a pass back; 0 for the plain order
 * @param mustsFirst whether musts come before all others, however scarce
 */
export function startOrder(problem: Problem, random: Random, shake: number, mustsFirst: boolean): Int32Array {
  const { passes } = problem;
  const latest = latestStarts(problem);
  const choice = choices(problem);
  const keys = passes.map((pass, i) => ({
    i,
    later: mustsFirst && pass.priority !== 'must' ? 1 : 0,
    urgency: choice[i]! + random.below(shake * 60 + 1),
    latest: latest[i]!,
  }));
  keys.sort((a, b) => a.later - b.later || a.urgency - b.urgency || a.latest - b.latest || a.i - b.i);
  const order = new Int32Array(passes.length);
  const done = new Uint8Array(passes.length);
  let count = 0;
  const visit = (i: number): void => {
    if (done[i] === 1) return;
    done[i] = 1;
    for (const { pass } of passes[i]!.after) visit(pass);
    order[count++] = i;
  };
  for (const { i } of keys) visit(i);
  return order;
}

/** The solution that wants every pass on its first room-day, in an order given; the decoder carries on what finds no room there. */
export function plainSolution(problem: Problem, solution: Solution, order: Int32Array): void {
  const { passes } = problem;
  passes.forEach((pass, i) => (solution.day[i] = pass.days[0] ?? -1));
  solution.order.set([...order].sort((a, b) => layerOf(problem, a) - layerOf(problem, b)));
  solution.lead.fill(0);
  solution.out.fill(0);
  solution.begin.fill(0);
  solution.eve.fill(0);
}

/** Minutes in which each pass, or a pass that waits for it, may start: the scarcer, the earlier it is taken up. */
function choices(problem: Problem): number[] {
  const { passes } = problem;
  const minutes = passes.map((pass) => pass.starts.reduce((sum, { from, to }) => sum + to - from + problem.rules.step, 0));
  for (let round = 0, moved = true; moved && round < passes.length; round++) {
    moved = false;
    passes.forEach((pass, i) => {
      for (const { pass: before } of pass.after) {
        if (minutes[before]! <= minutes[i]!) continue;
        minutes[before] = minutes[i]!;
        moved = true;
      }
    });
  }
  return minutes;
}

function layerOf(problem: Problem, pass: number): number {
  const day = problem.passes[pass]!.days[0];
  return day === undefined ? -1 : problem.days[day]!.layer;
}

/** The latest start of each pass that still leaves time for what follows it. */
export function latestStarts(problem: Problem): number[] {
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

/** How many passes each one waits for, one after another. */
export function depths(problem: Problem): number[] {
  const { passes } = problem;
  const depth = passes.map(() => 0);
  for (let round = 0, moved = true; moved && round < passes.length; round++) {
    moved = false;
    passes.forEach((pass, i) => {
      for (const { pass: before } of pass.after) {
        if (depth[i]! > depth[before]!) continue;
        depth[i] = depth[before]! + 1;
        moved = true;
      }
    });
  }
  return depth;
}
