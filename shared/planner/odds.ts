import type { PlanItem, PlanOdds } from '../contracts/plan';
import type { Minute, Minutes } from '../domain/flavours';
import type { Problem } from '../solver/model';
import { Random } from '../solver/search/random';
import { zoneClock, type ZoneClock } from '../time/wall';
import { courseOf, type Course, type Step } from './course';

/**
 * How work strays from its likely minutes. Common practice, no source: a day stretches everything on it by up to 15 in 100 or shortens it by
 * up to 10; rigs and changeovers take 0.9 to 1.5 of their time; 15 of 100 people come 20 minutes late; of what is finished early only
 * half is used, because people and rooms come when they were asked for. A late day is cut in the usual order: nice ones first, then
 * should ones, never a must or what a must needs.
 */
const HABITS = {
  dayFactor: [900, 1000, 1150] as const,
  building: [900, 1000, 1500] as const,
  latePercent: 15,
  lateBy: 20 as Minutes,
  earlyShare: 2,
  /** A pass that begins so late is left out. */
  cutWhenLate: { nice: 15 as Minutes, should: 30 as Minutes },
};
const THOUSAND = 1000;

/**
 * The odds of a plan by simulation: every run draws a length for each pass between its low and high (triangular, most often likely), one
 * factor for each date, late arrivals and slow changeovers, and lets the day run in the order of the plan. Reserves and gaps take
 * up what runs late. A must is done when it ends before its room closes, its people leave, its gear goes and its loud hours are over.
 * Whole numbers only, so that a seed gives the same odds on every engine.
 * @param items the items of a valid plan of the problem
 * @returns the share of runs in which all placed musts were done, and the ends of each room-day that half and nine tenths of the runs
 *   keep to, as clock times rounded up to the step
 */
export function simulateOdds(problem: Problem, items: readonly PlanItem[], seed: number, runs = 1000): PlanOdds {
  const clock = zoneClock(problem.zone);
  const course = courseOf(problem, items, clock);
  const random = new Random(seed ^ 0x0dd5);
  const ends = course.days.map(() => new Int32Array(runs));
  const actual = new Int32Array(course.steps.length);
  let good = 0;
  for (let run = 0; run < runs; run++) {
    if (runOnce(course, random, actual)) good += 1;
    course.days.forEach(({ last }, i) => (ends[i]![run] = actual[last]! - course.origin));
  }
  return {
    musts: runs > 0 ? good / runs : 0,
    days: course.days.map(({ day }, i) => {
      const sorted = ends[i]!.sort();
      const endOf = (share: number) =>
        clockTime(clock, problem.rules.step, course.origin + (sorted[Math.ceil((runs * share) / 100) - 1] ?? 0));
      const { room, date } = problem.days[day]!;
      return { room: problem.rooms[room]!.id, date, p50: endOf(50), p90: endOf(90) };
    }),
  };
}

/** One run of the whole production. Fills in when each step ended; answers whether every must was done. */
function runOnce(course: Course, random: Random, ended: Int32Array): boolean {
  const factors = course.dates.map(() => draw(random, ...HABITS.dayFactor));
  const late = course.arrivals.map((arrival) => arrival + (random.below(100) < HABITS.latePercent ? HABITS.lateBy : 0));
  const failed = new Set<number>();
  let allMusts = true;
  course.steps.forEach((step, i) => {
    const start = startOf(course, step, ended, late);
    const cut = step.spare !== null && start - step.from >= HABITS.cutWhenLate[step.spare];
    const lost = cut || step.needs.some((pass) => failed.has(pass));
    const length = lost ? 0 : lengthOf(step, random, factors[step.date]!);
    let end = start + length;
    if (step.kind === 'reserve') end = Math.max(start, step.to - Math.max(0, step.from - start));
    for (const { arrival, minutes } of step.readying) end = Math.max(end, late[arrival]! + minutes);
    if (step.pass >= 0 && (lost || end > step.deadline)) {
      failed.add(step.pass);
      if (step.must) allMusts = false;
      // What does not fit is broken off when time is up.
      end = Math.max(start, Math.min(end, step.deadline));
    }
    ended[i] = end;
  });
  return allMusts;
}

/** A step begins when everything before it is over, at most half of what was gained earlier than planned, and never before people come. */
function startOf(course: Course, step: Step, ended: Int32Array, late: readonly Minute[]): Minute {
  let ready = -Infinity;
  let planned = -Infinity;
  for (const { step: before, lag, sameDate } of step.before) {
    ready = Math.max(ready, ended[before]! + lag);
    if (sameDate) planned = Math.max(planned, course.steps[before]!.to + lag);
  }
  const early = step.fixed || planned === -Infinity ? 0 : Math.floor(Math.max(0, planned - ready) / HABITS.earlyShare);
  let start = Math.max(step.from - early, ready);
  for (const arrival of step.arrivals) start = Math.max(start, late[arrival]!);
  return start;
}

function lengthOf(step: Step, random: Random, factor: number): Minutes {
  const planned = step.to - step.from;
  if (step.kind === 'rig' || step.kind === 'changeover') return Math.round((planned * draw(random, ...HABITS.building)) / THOUSAND);
  if (step.pass < 0) return planned;
  return Math.max(1, Math.round((draw(random, ...step.estimate) * factor) / THOUSAND));
}

/** A whole number of the triangular distribution from low to high with its peak at likely, by rejection. */
function draw(random: Random, low: number, likely: number, high: number): number {
  if (low >= high) return likely;
  for (;;) {
    const value = low + random.below(high - low + 1);
    // One more than the distance to the far end, so that low and high can be drawn too.
    const height = value <= likely ? (value - low + 1) * (high - likely + 1) : (high - value + 1) * (likely - low + 1);
    if (random.below((likely - low + 1) * (high - likely + 1)) < height) return value;
  }
}

/** A minute as clock time, rounded up to the step. */
function clockTime(clock: ZoneClock, step: Minutes, minute: Minute): string {
  const wall = clock.wallOf(minute);
  const ofDay = Number(wall.slice(11, 13)) * 60 + Number(wall.slice(14, 16));
  const over = ofDay % step;
  return clock.wallOf(over === 0 ? minute : minute + step - over).slice(11, 16);
}
