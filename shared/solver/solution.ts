import type { Problem } from './model';

/**
 * What the search changes: for each pass its room-day, place in the order and idle time before it. The order is kept sorted by the
 * layers of the room-days, so that work is always laid forward.
 */
export class Solution {
  readonly order: Int32Array;
  readonly day: Int32Array;
  readonly lead: Int32Array;
  readonly begin: Int32Array;
  /** Per room-day: whether the set-up that is needed next is made ready at its end. */
  readonly eve: Int32Array;
  /** Per pass: given up by the search. */
  readonly out: Int32Array;
  private readonly memory: Int32Array;

  constructor(readonly problem: Problem) {
    const passes = problem.passes.length;
    const days = problem.days.length;
    this.memory = new Int32Array(passes * 4 + days * 2);
    let at = 0;
    const part = (size: number) => this.memory.subarray(at, (at += size));
    this.order = part(passes);
    this.day = part(passes);
    this.lead = part(passes);
    this.out = part(passes);
    this.begin = part(days);
    this.eve = part(days);
  }

  copy(from: Solution): void {
    this.memory.set(from.memory);
  }

  layerOf(pass: number): number {
    const day = this.day[pass]!;
    return day < 0 ? -1 : this.problem.days[day]!.layer;
  }

  dateOf(pass: number): number {
    const day = this.day[pass]!;
    return day < 0 ? 0 : this.problem.days[day]!.dateIndex;
  }

  /** Whether any set-up is made ready the evening before, which ties a date to the one before it. */
  hasEves(): boolean {
    for (let day = 0; day < this.eve.length; day++) if (this.eve[day] === 1) return true;
    return false;
  }
}
