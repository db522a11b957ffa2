import type { Minute, Minutes } from '../domain/flavours';
import { CHANGEOVER, RIG, type Board } from './board';
import { gridAtOrAfter, nameable } from './grid';
import { EVER, within, type Problem } from './model';
import { BREAK, MEAL, Rests } from './rests';
import { spareIn } from './spare';
import { layTail, reserveOf, type TailSink } from './tail';

/** Minutes and counts that the cost is made of; `waiting` is weighted by the people's fees already. */
export interface Tally {
  waiting: number;
  changeover: Minutes;
  days: number;
  overtime: Minutes;
  calls: number;
  maybe: Minutes;
}

export const emptyTally = (): Tally => ({ waiting: 0, changeover: 0, days: 0, overtime: 0, calls: 0, maybe: 0 });

/** Hears what closing a date adds. Pauses stand in `Closer.rests`, which `named` counts by position. */
export interface ClosingSink {
  work(kind: 'reserve' | 'wrap', day: number, from: Minute, to: Minute): void;
  name(rest: number, person: number): void;
  /** All pauses of the date stand and all their people are named. */
  rests(): void;
  /** `first` and `last` are positions in the board's entries. */
  call(person: number, date: number, first: number, last: number, waiting: Minutes): void;
}

/** Closes a date once all its passes are placed: pauses are named, reserve and wrap laid, and the date's cost is counted. */
export class Closer {
  readonly rests: Rests;
  private tally: Tally = emptyTally();
  private spares = false;
  private left: Minutes = 0;
  private lastMeal: Minute = 0;
  private day = 0;
  private previous: Minute = 0;
  private sink: ClosingSink | null = null;
  private readonly pieces: TailSink;

  constructor(
    private readonly problem: Problem,
    private readonly board: Board,
  ) {
    this.rests = new Rests(problem);
    this.pieces = {
      reserve: (from, to) => this.piece('reserve', from, to),
      wrap: (from, to) => this.piece('wrap', from, to),
    };
  }

  /** Begins a date; its room-days are then closed one by one, earlier windows of a room first, and at last its people. */
  open(tally: Tally, sink: ClosingSink | null): void {
    this.tally = tally;
    this.sink = sink;
    this.rests.count = 0;
  }

  /** Counts what the people of a date cost, and ends it. */
  closePeople(date: number): void {
    for (let q = 0; q < this.problem.people.length; q++) this.closePerson(q, date);
    this.sink?.rests();
  }

  /** Ends a room-day. False where reserve and wrap find no place within its hours. */
  closeDay(d: number): boolean {
    const { board, problem, tally } = this;
    if (board.head[d]! < 0 || board.closed[d] === 1) return true;
    board.closed[d] = 1;
    const first = board.first[d]!;
    this.day = d;
    this.left = board.passCount[d]! > 0 ? reserveOf(problem, board.minutes[d]!) : 0;
    this.lastMeal = first;
    this.previous = first;
    // What finds no place before the wrap goes into the gaps.
    this.spares = layTail(problem, d, board.last[d]!, board.mealFrom[d]!, board.breakFrom[d]!, this.left, null) >= EVER;
    const before = board.previousDay(d);
    const pause = before < 0 ? EVER : first - board.last[before]!;
    let mealFrom = pause >= problem.rules.meal ? first : board.mealFrom[before]!;
    let breakFrom = pause >= problem.rules.break ? first : board.breakFrom[before]!;
    for (let item = board.head[d]!; item >= 0; item = board.itemNext[item]!) {
      const start = board.itemStart[item]!;
      const gap = start - this.previous;
      if (gap > 0) this.gap(this.spares ? this.useSpare(this.previous, start, mealFrom, breakFrom) : this.previous, start, true);
      if (gap >= problem.rules.meal) mealFrom = start;
      if (gap >= problem.rules.break) breakFrom = start;
      this.previous = board.itemEnd[item]!;
      const kind = board.itemKind[item];
      if (kind === RIG || kind === CHANGEOVER) tally.changeover += board.itemEnd[item]! - board.itemStart[item]!;
    }
    if (board.passCount[d]! > 0) {
      const end = layTail(problem, d, board.last[d]!, board.mealFrom[d]!, board.breakFrom[d]!, this.left, this.pieces);
      if (end >= EVER) return false;
    }
    tally.days += 1;
    const { standard } = problem.rooms[problem.days[d]!.room]!;
    const over = standard === null ? 0 : board.last[d]! - first - standard;
    if (over > 0) tally.overtime += over;
    return true;
  }

  private piece(kind: 'reserve' | 'wrap', from: Minute, to: Minute): void {
    if (from > this.previous) this.gap(this.previous, from, false);
    this.previous = to;
    this.board.work(this.day, from, to);
    this.sink?.work(kind, this.day, from, to);
  }

  /** Idle time between two items: a meal, a break, or reserve where it is too short for a pause. */
  private gap(from: Minute, to: Minute, fill: boolean): void {
    const { problem } = this;
    const { rules } = problem;
    const pauses = (rules.meal > 0 && to - from >= rules.meal) || (rules.break > 0 && to - from >= rules.break);
    let at = from;
    for (const index of problem.rooms[problem.days[this.day]!.room]!.events) {
      const event = problem.events[index]!;
      if (event.to <= at || event.from >= to) continue;
      if (pauses) this.pause(at, event.from);
      else if (fill) this.fill(at, event.from);
      at = event.to;
    }
    if (at >= to) return;
    if (pauses) this.pause(at, to);
    else if (fill) this.fill(at, to);
  }

  /** Puts reserve at the beginning of a gap; answers where the gap goes on. */
  private useSpare(from: Minute, to: Minute, mealFrom: Minute, breakFrom: Minute): Minute {
    const length = Math.min(this.left, spareIn(this.problem, this.day, from, to, mealFrom, breakFrom));
    if (length <= 0) return from;
    this.left -= length;
    this.sink?.work('reserve', this.day, from, from + length);
    return from + length;
  }

  private fill(from: Minute, to: Minute): void {
    const { grid } = this.problem.days[this.day]!;
    const { step } = this.problem.rules;
    if (this.left <= 0 || grid.length > 1) return;
    const start = gridAtOrAfter(grid, step, from);
    const room = to - start - ((to - start) % step);
    const length = Math.min(this.left, room);
    if (length < step) return;
    this.left -= length;
    this.sink?.work('reserve', this.day, start, start + length);
  }

  /** A meal where the last one is long enough ago, and a break where there is time for one; what is left of the gap stays idle. */
  private pause(from: Minute, to: Minute): void {
    const { rules, lengths, hidden } = this.problem;
    const { grid } = this.problem.days[this.day]!;
    let start = gridAtOrAfter(grid, rules.step, from);
    const fits = (length: Minutes) => start + length <= to && nameable(hidden, start + length) === start + length;
    const meal = rules.meal > 0 && fits(lengths.meal);
    if (meal && start - this.lastMeal >= rules.mealAfter / 2) {
      this.lastMeal = start + lengths.meal;
      this.rests.add(MEAL, start, this.lastMeal, this.day);
      start = gridAtOrAfter(grid, rules.step, this.lastMeal);
    }
    if (rules.break > 0 && fits(lengths.break)) this.rests.add(BREAK, start, start + lengths.break, this.day);
  }

  private closePerson(q: number, date: number): void {
    const { board, problem, tally } = this;
    const offset = board.offset[q]!;
    let last = offset + board.entryCount[q]! - 1;
    while (last >= offset && board.entryDate[last]! > date) last -= 1;
    let first = last;
    while (first >= offset && board.entryDate[first] === date) first -= 1;
    first += 1;
    if (first > last) return;
    tally.calls += 1;
    const person = problem.people[q]!;
    const { entryStart, entryEnd } = board;
    let waited = 0;
    for (let i = first; i <= last;) {
      const from = entryStart[i]!;
      let to = entryEnd[i]!;
      let work = to - from;
      let k = i + 1;
      for (; k <= last && (person.away === null || entryStart[k]! - to < person.away); k++) {
        to = entryEnd[k]!;
        work += to - entryStart[k]!;
      }
      const rest = this.rests.of(from, to, entryStart, entryEnd, i, k);
      if (this.sink) for (let r = 0; r < this.rests.count; r++) if (this.rests.named[r] === 1) this.sink.name(r, q);
      const idle = to - from - work - rest;
      if (idle > 0) waited += idle;
      if (person.sure !== null) tally.maybe += to - from - within(person.sure, from, to);
      i = k;
    }
    tally.waiting += waited * person.waiting;
    this.sink?.call(q, date, first, last, waited);
  }
}
