import type { PlanItem } from '../contracts/plan';
import type { Minute } from '../domain/flavours';
import type { Problem } from '../solver/model';
import { Random } from '../solver/search/random';
import { plainSolution, startOrder } from '../solver/search/start';
import { Solution } from '../solver/solution';
import { zoneClock } from '../time/wall';

/** Kinds of items that a solution brings back by itself: the time they take is no idle time. */
const WORK: readonly PlanItem['kind'][] = ['pass', 'rig', 'changeover', 'listen'];

/**
 * The solution that comes nearest to a plan made before: each pass in its room-day, in the same order and with the same idle time
 * before it, and the start of each pass in that plan (-1: none). What the problem no longer allows finds its place when the timetable is
 * made.
 */
export function solutionOf(problem: Problem, items: readonly PlanItem[]): { solution: Solution; starts: Int32Array } {
  const clock = zoneClock(problem.zone);
  const solution = new Solution(problem);
  plainSolution(problem, solution, startOrder(problem, new Random(1), 0, true));
  const rooms = new Map(problem.rooms.map(({ id }, room) => [id, room]));
  const passes = new Map(problem.passes.map(({ id }, pass) => [id, pass]));
  const starts = new Float64Array(problem.passes.length).fill(Infinity);

  const timed = items.flatMap((item) => {
    const from = clock.minuteOf(item.start);
    const to = clock.minuteOf(item.end);
    return from === 'gap' || to === 'gap' || !WORK.includes(item.kind) ? [] : [{ item, from, to }];
  });
  timed.sort((a, b) => a.from - b.from || a.to - b.to);
  const last = new Map<number, { item: PlanItem; end: Minute; idle: number }>();
  for (const { item, from, to } of timed) {
    const room = item.room === undefined ? undefined : rooms.get(item.room);
    const day = problem.days.findIndex((one) => one.room === room && one.from <= from && to <= one.to);
    if (day < 0) continue;
    const before = last.get(day);
    if (!before) solution.begin[day] = from - problem.days[day]!.from;
    // Pauses between a pass and what it brings along come back by themselves.
    const idle = !before ? 0 : before.item.kind === 'pass' ? from - before.end : before.idle;
    last.set(day, { item, end: to, idle });
    const pass = item.kind === 'pass' && item.id !== undefined ? passes.get(item.id) : undefined;
    if (pass === undefined) continue;
    starts[pass] = from;
    solution.day[pass] = day;
    solution.lead[pass] = idle;
  }
  for (const [day, { item }] of last) if (item.kind === 'rig' || item.kind === 'changeover') solution.eve[day] = 1;
  // What the plan did without is first done without again.
  problem.passes.forEach(({ priority }, pass) => {
    if (priority !== 'must' && starts[pass] === Infinity) solution.out[pass] = 1;
  });
  const order = [...solution.order].sort((a, b) => solution.layerOf(a) - solution.layerOf(b) || starts[a]! - starts[b]! || a - b);
  solution.order.set(order);
  return { solution, starts: Int32Array.from(starts, (start) => (start === Infinity ? -1 : start)) };
}
