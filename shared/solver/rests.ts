import type { Minute, Minutes } from '../domain/flavours';
import type { Problem } from './model';

export const MEAL = 0;
export const BREAK = 1;

/**
 * Meals and breaks of one date in all rooms, and what they are worth to a person. A pause names everybody who is present and idle
 * then, from whichever room; nobody is named by two pauses at once.
 */
export class Rests {
  count = 0;
  kind: Int32Array;
  from: Int32Array;
  to: Int32Array;
  day: Int32Array;
  /** Whether the person asked for last is named by the pause. */
  named: Uint8Array;
  /** Whether somebody was idle in the pause but named by another one. */
  refused: Uint8Array;

  constructor(private readonly problem: Problem) {
    const most = problem.passes.length * 4 + problem.days.length * 8 + 16;
    this.kind = new Int32Array(most);
    this.from = new Int32Array(most);
    this.to = new Int32Array(most);
    this.day = new Int32Array(most);
    this.named = new Uint8Array(most);
    this.refused = new Uint8Array(most);
  }

  add(kind: number, from: Minute, to: Minute, day: number): void {
    this.refused[this.count] = 0;
    let at = this.count++;
    while (at > 0 && this.from[at - 1]! > from) {
      this.kind[at] = this.kind[at - 1]!;
      this.from[at] = this.from[at - 1]!;
      this.to[at] = this.to[at - 1]!;
      this.day[at] = this.day[at - 1]!;
      at -= 1;
    }
    this.kind[at] = kind;
    this.from[at] = from;
    this.to[at] = to;
    this.day[at] = day;
  }

  /**
   * The rest of a stay, as the cost counts it: meals first, then breaks, each kind up to what so long a stay earns.
   * @param itemFrom, itemTo the person's items, those with positions `low ≤ i < high` lie in the stay
   */
  of(stayFrom: Minute, stayTo: Minute, itemFrom: Int32Array, itemTo: Int32Array, low: number, high: number): Minutes {
    const { rules } = this.problem;
    const length = stayTo - stayFrom;
    const meals = this.sum(MEAL, stayFrom, stayTo, itemFrom, itemTo, low, high);
    const breaks = this.sum(BREAK, stayFrom, stayTo, itemFrom, itemTo, low, high);
    const mealCap = rules.meal > 0 && rules.mealAfter > 0 ? Math.ceil(length / rules.mealAfter) * rules.meal : 0;
    const breakCap = rules.breakAfter > 0 ? Math.floor(length / rules.breakAfter) * rules.break : 0;
    return Math.min(meals, mealCap) + Math.min(breaks, breakCap);
  }

  private sum(
    kind: number,
    stayFrom: Minute,
    stayTo: Minute,
    itemFrom: Int32Array,
    itemTo: Int32Array,
    low: number,
    high: number,
  ): Minutes {
    let sum = 0;
    let item = low;
    for (let i = 0; i < this.count; i++) {
      if (this.kind[i] !== kind) continue;
      const from = this.from[i]!;
      const to = this.to[i]!;
      if (from < stayFrom || to > stayTo) {
        this.named[i] = 0;
        continue;
      }
      while (item < high && itemTo[item]! <= from) item += 1;
      const idle = item >= high || itemFrom[item]! >= to;
      const taken = idle && this.taken(i, kind, from, to);
      if (taken) this.refused[i] = 1;
      this.named[i] = idle && !taken ? 1 : 0;
      if (idle && !taken) sum += to - from;
    }
    return sum;
  }

  /** Whether a pause that names the person already overlaps: an earlier one of its kind or, for a break, a meal. */
  private taken(i: number, kind: number, from: Minute, to: Minute): boolean {
    for (let k = 0; k < this.count; k++) {
      if (this.from[k]! >= to) break;
      const asked = this.kind[k] === kind ? k < i : kind === BREAK;
      if (asked && this.named[k] === 1 && this.to[k]! > from) return true;
    }
    return false;
  }
}
