import type { Decoder } from '../decode';
import { EVER, type Problem } from '../model';
import type { Solution } from '../solution';
import { layerRange, put, take } from './order';
import type { Random } from './random';

/** Longest idle time that a move puts before a pass. */
const LONGEST_LEAD = 90;
const LONGEST_BLOCK = 6;

/** Small changes of a solution. Each answers the earliest date that it touches, or -1 where it found nothing to change. */
export class Moves {
  /** Per room-day, of the timetable looked at last: an idle stretch between two items, one chosen by chance. */
  private readonly gap: Int32Array;
  private readonly block: Int32Array;
  private readonly movable: number[];
  /** Passes that the timetable looked at last does not place. */
  private missing: number[] = [];

  constructor(
    private readonly problem: Problem,
    private readonly random: Random,
  ) {
    this.gap = new Int32Array(problem.days.length);
    this.block = new Int32Array(LONGEST_BLOCK);
    this.movable = problem.passes.flatMap((pass, i) => (pass.days.length > 0 && !pass.leftOut ? [i] : []));
  }

  get possible(): boolean {
    return this.movable.length > 0;
  }

  /** Looks at the timetable that the decoder holds, for the moves that mend what they see. */
  look(decoder: Decoder): void {
    const { board } = decoder;
    this.missing = this.missingIn(decoder);
    for (let day = 0; day < this.gap.length; day++) {
      this.gap[day] = 0;
      let seen = 0;
      let previous = -1;
      for (let item = board.head[day]!; item >= 0; item = board.itemNext[item]!) {
        const idle = board.itemStart[item]! - previous;
        if (previous >= 0 && idle > 0 && this.random.below(++seen) === 0) this.gap[day] = idle;
        previous = board.itemEnd[item]!;
      }
    }
  }

  /** Passes that the decoder's timetable does not place, though it might. */
  missingIn(decoder: Decoder): number[] {
    return this.movable.filter((pass) => decoder.board.start[pass]! < 0);
  }

  change(solution: Solution): number {
    const { random } = this;
    const kind = random.below(100);
    if (kind < 34) return this.shift(solution, this.pick());
    if (kind < 50) return this.swap(solution);
    if (kind < 64) return this.shiftBlock(solution);
    if (kind < 76) return this.gather(solution);
    if (kind < 84) return this.pause(solution);
    if (kind < 92) return this.begin(solution);
    if (kind < 95) return this.giveUp(solution);
    if (kind < 97) return this.eve(solution);
    return this.swapDays(solution);
  }

  /** Moves one pass to a chance place, in one of its room-days. */
  shift(solution: Solution, pass: number): number {
    const { days } = this.problem.passes[pass]!;
    const from = solution.dateOf(pass);
    const stays = days.length === 1 || this.random.below(2) === 0;
    const day = stays && days.includes(solution.day[pass]!) ? solution.day[pass]! : days[this.random.below(days.length)]!;
    take(solution, pass);
    put(solution, pass, day, this.anywhere(solution, day, 1), 1);
    solution.lead[pass] = 0;
    solution.out[pass] = 0;
    return Math.min(from, solution.dateOf(pass));
  }

  /** Passes of the same room-day, set-up or people, or that wait for each other. */
  company(solution: Solution, pass: number): number[] {
    const { passes } = this.problem;
    const { people, setup, after, followers } = passes[pass]!;
    const kind = this.random.below(4);
    const related = (other: number) => {
      if (kind === 0) return solution.day[other] === solution.day[pass];
      if (kind === 1) return setup >= 0 && passes[other]!.setup === setup;
      if (kind === 2) return passes[other]!.people.some((person) => people.includes(person));
      return followers.includes(other) || after.some((one) => one.pass === other);
    };
    return this.movable.filter((other) => other !== pass && related(other));
  }

  /** A pass by chance; what is not placed comes more often. */
  pick(): number {
    if (this.missing.length > 0 && this.random.below(4) === 0) return this.missing[this.random.below(this.missing.length)]!;
    return this.movable[this.random.below(this.movable.length)]!;
  }

  private swap(solution: Solution): number {
    const one = this.pick();
    const other = this.pick();
    if (one === other) return -1;
    const dayOne = solution.day[one]!;
    const dayOther = solution.day[other]!;
    const { passes } = this.problem;
    if (!passes[one]!.days.includes(dayOther) && passes[one]!.room === passes[other]!.room) return -1;
    if (!passes[other]!.days.includes(dayOne) && passes[one]!.room === passes[other]!.room) return -1;
    const date = Math.min(solution.dateOf(one), solution.dateOf(other));
    const { order } = solution;
    const a = order.indexOf(one);
    const b = order.indexOf(other);
    if (passes[one]!.room !== passes[other]!.room) {
      // Of two rooms only the order within one layer can be exchanged.
      if (solution.layerOf(one) !== solution.layerOf(other)) return -1;
    } else {
      solution.day[one] = dayOther;
      solution.day[other] = dayOne;
    }
    order[a] = other;
    order[b] = one;
    return date;
  }

  /** Moves a run of passes of one room-day, which stay in order. */
  private shiftBlock(solution: Solution): number {
    const first = this.pick();
    const day = solution.day[first]!;
    const date = solution.dateOf(first);
    const { order } = solution;
    const { passes } = this.problem;
    const same = this.random.below(2) === 0;
    const size = same ? LONGEST_BLOCK : 2 + this.random.below(LONGEST_BLOCK - 1);
    let count = 0;
    for (let i = order.indexOf(first); i < order.length && count < size; i++) {
      const pass = order[i]!;
      if (solution.day[pass] !== day) continue;
      if (same && passes[pass]!.setup !== passes[first]!.setup) break;
      this.block[count++] = pass;
    }
    const choices = passes[first]!.days;
    const target = this.random.below(2) === 0 && choices.includes(day) ? day : choices[this.random.below(choices.length)]!;
    for (let k = 0; k < count; k++) if (!passes[this.block[k]!]!.days.includes(target)) return -1;
    for (let k = 0; k < count; k++) take(solution, this.block[k]!);
    let at = this.anywhere(solution, target, count);
    for (let k = 0; k < count; k++) put(solution, this.block[k]!, target, at++, count - k);
    return Math.min(date, solution.dateOf(first));
  }

  /** Brings two passes of one person, or of one set-up, beside each other. */
  private gather(solution: Solution): number {
    const pass = this.pick();
    const { people, setup, days } = this.problem.passes[pass]!;
    const byPerson = people.length > 0 && this.random.below(3) > 0;
    const company = byPerson ? this.problem.people[people[this.random.below(people.length)]!]!.passes : this.movable;
    const other = company[this.random.below(company.length)]!;
    if (other === pass || solution.day[other]! < 0) return -1;
    if (!byPerson && this.problem.passes[other]!.setup !== setup) return -1;
    const layer = solution.layerOf(other);
    let day = -1;
    for (const candidate of days) if (this.problem.days[candidate]!.layer === layer) day = candidate;
    if (day < 0) return -1;
    const date = solution.dateOf(pass);
    take(solution, pass);
    const beside = solution.order.indexOf(other) + this.random.below(2);
    put(solution, pass, day, beside, 1);
    return Math.min(date, solution.dateOf(pass));
  }

  private pause(solution: Solution): number {
    const pass = this.pick();
    const { rules, lengths } = this.problem;
    const choices = [0, 0, lengths.break, lengths.meal, rules.step * this.random.below(Math.floor(LONGEST_LEAD / rules.step) + 1)];
    const lead = choices[this.random.below(choices.length)]!;
    if (lead === solution.lead[pass]) return -1;
    solution.lead[pass] = lead;
    return solution.dateOf(pass);
  }

  private begin(solution: Solution): number {
    const day = solution.day[this.pick()]!;
    if (day < 0) return -1;
    const { step } = this.problem.rules;
    const kind = this.random.below(4);
    const before = solution.begin[day]!;
    const gap = this.gap[day]! - (this.gap[day]! % step);
    if (kind === 0) solution.begin[day] = 0;
    else if (kind === 1) solution.begin[day] = Math.max(0, before + step * (this.random.below(13) - 6));
    else if (gap > 0) solution.begin[day] = before + (kind === 2 ? gap : step * (1 + this.random.below(gap / step)));
    return solution.begin[day] === before ? -1 : this.problem.days[day]!.dateIndex;
  }

  private giveUp(solution: Solution): number {
    const pass = this.pick();
    if (solution.out[pass] === 0 && this.problem.passes[pass]!.priority === 'must') return -1;
    solution.out[pass] = 1 - solution.out[pass]!;
    return solution.dateOf(pass);
  }

  private eve(solution: Solution): number {
    const day = this.random.below(this.problem.days.length);
    solution.eve[day] = 1 - solution.eve[day]!;
    return 0;
  }

  /** Exchanges two room-days of one room. */
  private swapDays(solution: Solution): number {
    const one = solution.day[this.pick()]!;
    if (one < 0) return -1;
    const { days } = this.problem.rooms[this.problem.days[one]!.room]!;
    const other = days[this.random.below(days.length)]!;
    if (other === one) return -1;
    const moved = solution.order.filter((pass) => solution.day[pass] === one || solution.day[pass] === other);
    const target = (pass: number) => (solution.day[pass] === one ? other : one);
    for (const pass of moved) if (!this.problem.passes[pass]!.days.includes(target(pass))) return -1;
    for (const pass of moved) {
      const day = target(pass);
      take(solution, pass);
      put(solution, pass, day, EVER, 1);
    }
    return Math.min(this.problem.days[one]!.dateIndex, this.problem.days[other]!.dateIndex);
  }

  /** A chance place in the layer of a room-day, in an order with `free` places free at its end. */
  private anywhere(solution: Solution, day: number, free: number): number {
    const { low, high } = layerRange(solution, day, free);
    const at = low + this.random.below(high - low + 1);
    if (this.random.below(8) === 0) return at;
    // Among passes of other rooms a place is as good as the next one.
    let slot = at;
    while (slot < high && solution.day[solution.order[slot]!] !== day) slot += 1;
    return slot;
  }
}
