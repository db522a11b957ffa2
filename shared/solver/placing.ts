import type { Minute } from '../domain/flavours';
import { Attempt } from './attempt';
import { PASS, READY_ENTRY, RIG, type Board } from './board';
import { Chain } from './chain';
import type { Closer } from './closing';
import { OF_A_PERSON, OF_THE_PASS } from './constraints/all';
import { onePlace } from './constraints/one-place';
import { EVER, type Problem } from './model';
import { spareIn } from './spare';
import { layTail, reserveOf } from './tail';

/** What a solution says about a pass beyond its place in the order. */
export interface Wishes {
  /** Per pass: the room-day in which it is wanted. */
  day: Int32Array;
  /** Per pass: idle minutes before it and what it brings along. */
  lead: Int32Array;
  /** Per room-day: minutes after opening before its first item. */
  begin: Int32Array;
  /** Per pass: 1 where it is not to be placed. */
  out: Int32Array;
}

/** Finds the earliest valid start of a pass behind what a room-day holds, and puts it there. */
export class Placer {
  private readonly attempt: Attempt;
  private readonly chain: Chain;
  /** The board before a group is tried. */
  private readonly before: Int32Array;
  /** Ready minutes of a person for a set-up: `ready[setup * people + person]`. */
  private readonly ready: Int32Array;
  /** Rigs for which somebody turned out not to be needed: room-day times people plus person. */
  private readonly idle = new Set<number>();

  constructor(
    private readonly problem: Problem,
    private readonly board: Board,
    private readonly closer: Closer,
  ) {
    this.attempt = new Attempt(problem);
    this.chain = new Chain(problem);
    this.before = new Int32Array(board.memorySize);
    const people = problem.people.length;
    this.ready = new Int32Array(problem.setups.length * people);
    problem.setups.forEach((setup, i) => setup.ready.forEach(({ person, minutes }) => (this.ready[i * people + person] = minutes)));
  }

  /** Places a pass, or all of its group, in a room-day at the earliest start that every hard rule allows; false where there is none. */
  place(pass: number, day: number, wishes: Wishes): boolean {
    const { together } = this.problem.passes[pass]!;
    if (together.length > 0) return this.placeTogether(together, pass, day, wishes);
    const start = this.search(pass, day, wishes, NO_TARGET);
    if (start >= EVER) return false;
    this.commit(pass, day, start, wishes);
    return true;
  }

  /**
   * Looks through the ready minutes on the board for such of people who in the end play in the set-up at other times only, and asks them no
   * more. True where there were some.
   */
  dropIdleReady(): boolean {
    const { board, problem } = this;
    const { rigSetup, rigEnd } = board;
    const before = this.idle.size;
    problem.people.forEach(({ passes }, person) => {
      const offset = board.offset[person]!;
      for (let i = offset; i < offset + board.entryCount[person]!; i++) {
        const day = READY_ENTRY - board.entryRef[i]!;
        const needed = (pass: number) => problem.passes[pass]!.setup === rigSetup[day] && board.start[pass]! >= rigEnd[day]!;
        if (day >= 0 && !passes.some(needed)) this.idle.add(day * problem.people.length + person);
      }
    });
    return this.idle.size > before;
  }

  /** One start for all members: each is asked in turn until nobody wants a later one. */
  private placeTogether(group: readonly number[], pass: number, day: number, wishes: Wishes): boolean {
    if (group.some((member) => this.problem.passes[member]!.leftOut || wishes.out[member] === 1)) return false;
    const days = group.map((member) => (member === pass ? day : this.dayBeside(member, day, wishes)));
    if (days.includes(-1) || !days.every((one) => this.opened(one))) return false;
    const { before } = this;
    this.board.save(before);
    for (let target = NO_TARGET, tries = 0; tries < 500; tries++) {
      let agreed = target;
      let placed = 0;
      for (const [i, member] of group.entries()) {
        const start = this.search(member, days[i]!, wishes, agreed);
        if (start >= EVER) {
          this.board.restore(before);
          return false;
        }
        if (start > agreed && i > 0) {
          agreed = start;
          break;
        }
        agreed = start;
        this.commit(member, days[i]!, start, wishes);
        placed += 1;
      }
      if (placed === group.length) return true;
      this.board.restore(before);
      target = agreed;
    }
    return false;
  }

  /** The room-day of a pass in which it can run beside another room-day: the wanted one, else the first that overlaps; or -1. */
  private dayBeside(pass: number, day: number, wishes: Wishes): number {
    const { days, passes } = this.problem;
    const other = days[day]!;
    const beside = (candidate: number) => {
      const one = days[candidate]!;
      return one.room !== other.room && one.from < other.to && other.from < one.to && this.board.isOpen(candidate);
    };
    const wanted = wishes.day[pass]!;
    return wanted >= 0 && beside(wanted) ? wanted : (passes[pass]!.days.find(beside) ?? -1);
  }

  /** The earliest start at or after `target`, with the chain laid for it; `EVER` where there is none. */
  private search(pass: number, day: number, wishes: Wishes, target: Minute): Minute {
    const { board, attempt, chain, problem } = this;
    const model = problem.passes[pass]!;
    if (!this.opened(day)) return EVER;
    let start = chain.prepare(board, pass, day, wishes.lead[pass]!, wishes.begin[day]!);
    if (start >= EVER) return EVER;
    if (target > start) start = target;
    attempt.pass = pass;
    attempt.day = day;
    attempt.date = problem.days[day]!.dateIndex;
    for (;;) {
      start = this.possible(pass, day, start);
      if (start >= EVER) return EVER;
      const laid = chain.lay(board, start);
      if (laid !== start) {
        if (laid >= EVER) return EVER;
        start = laid;
        continue;
      }
      attempt.start = start;
      attempt.end = start + model.minutes;
      const later = this.asked(model.people, day, wishes);
      if (later >= EVER) return EVER;
      if (later > start) {
        start = later;
        continue;
      }
      return this.tailFits(day, model.minutes) ? start : EVER;
    }
  }

  /** Whether a room-day can take work. Where it touches the one before, that one is closed first, as its last work then goes on in this one. */
  private opened(day: number): boolean {
    const { board, problem } = this;
    if (!board.isOpen(day)) return false;
    if (board.head[day]! >= 0) return true;
    const before = board.previousDay(day);
    if (before < 0) return true;
    const apart = problem.days[day]!.from - problem.days[before]!.to;
    return apart >= Math.max(problem.rules.meal, problem.rules.break) || this.closer.closeDay(before);
  }

  /** The first start at or after a minute that calendars and pins allow. */
  private possible(pass: number, day: number, start: Minute): Minute {
    for (const stretch of this.problem.passes[pass]!.starts) {
      if (stretch.day !== day || start > stretch.to) continue;
      return start < stretch.from ? stretch.from : start;
    }
    return EVER;
  }

  private asked(people: readonly number[], day: number, wishes: Wishes): Minute {
    const { board, attempt } = this;
    const start = attempt.start;
    for (const constraint of OF_THE_PASS) {
      const later = constraint.next(board, attempt);
      if (later > start) return later;
    }
    for (const person of people) {
      attempt.person = person;
      attempt.read(board);
      this.findReady(person, day, wishes);
      let later = onePlace.next(board, attempt);
      if (later > start) return later;
      attempt.join();
      for (const constraint of OF_A_PERSON) {
        later = constraint.next(board, attempt);
        if (later > start) return later;
      }
    }
    return start;
  }

  /** The ready minutes that come with the pass: those of the rig in its chain, or of the rig that its room-day holds. */
  private findReady(person: number, day: number, wishes: Wishes): void {
    const { attempt, board, chain, problem } = this;
    const people = problem.people.length;
    attempt.readyFrom = -1;
    attempt.readyMoves = false;
    if (this.idle.has(day * people + person)) return;
    if (chain.rigAt >= 0) {
      const minutes = this.ready[problem.passes[attempt.pass]!.setup * people + person]!;
      if (minutes === 0) return;
      attempt.readyMoves = true;
      attempt.readyTo = chain.rigAt;
      attempt.readyFrom = chain.rigAt - minutes;
      return;
    }
    const setup = board.rigSetup[day]!;
    if (setup < 0) return;
    const minutes = this.ready[setup * people + person]!;
    if (minutes === 0 || attempt.hasReady() || !this.playsAfter(person, setup, board.rigEnd[day]!, wishes)) return;
    attempt.readyTo = board.rigEnd[day]!;
    attempt.readyFrom = attempt.readyTo - minutes;
  }

  /** Whether the person has, or may still get, a pass of that set-up after its rig. */
  private playsAfter(person: number, setup: number, rigEnd: Minute, wishes: Wishes): boolean {
    const { passes, people } = this.problem;
    for (const pass of people[person]!.passes) {
      const model = passes[pass]!;
      if (model.setup !== setup) continue;
      const expected = this.board.start[pass]! < 0 && !model.leftOut && wishes.out[pass] === 0;
      if (pass === this.attempt.pass || expected || this.board.start[pass]! >= rigEnd) return true;
    }
    return false;
  }

  /** Whether reserve and wrap still fit behind the chain as laid. */
  private tailFits(day: number, passMinutes: number): boolean {
    const { board, chain, problem } = this;
    const { rules } = problem;
    const fresh = board.first[day] === EVER;
    const from = fresh ? board.previousDay(day) : day;
    let last = from < 0 ? -1 : board.last[from]!;
    let mealFrom = from < 0 ? -1 : board.mealFrom[from]!;
    let breakFrom = from < 0 ? -1 : board.breakFrom[from]!;
    let { [day]: spare = 0 } = board.spare;
    for (let k = 0; k < chain.count; k++) {
      const start = chain.start[k]!;
      if (start > last && (k > 0 || !fresh)) spare += spareIn(problem, day, last, start, mealFrom, breakFrom);
      if (last < 0 || start - last >= rules.meal) mealFrom = start;
      if (last < 0 || start - last >= rules.break) breakFrom = start;
      last = chain.end[k]!;
    }
    const reserve = reserveOf(problem, board.minutes[day]! + passMinutes);
    if (layTail(problem, day, last, mealFrom, breakFrom, reserve, null) < EVER) return true;
    const left = reserve - spare;
    return left < reserve && layTail(problem, day, last, mealFrom, breakFrom, Math.max(0, left), null) < EVER;
  }

  /** Writes the chain as laid, and the pass, into the board. */
  private commit(pass: number, day: number, start: Minute, wishes: Wishes): void {
    const { board, chain, attempt, problem } = this;
    const model = problem.passes[pass]!;
    const { room, dateIndex } = problem.days[day]!;
    for (const person of model.people) {
      attempt.person = person;
      attempt.read(board);
      this.findReady(person, day, wishes);
      if (attempt.readyFrom >= 0) board.addEntry(person, attempt.readyFrom, attempt.readyTo, READY_ENTRY - day, dateIndex);
      board.addEntry(person, start, start + model.minutes, pass, dateIndex);
    }
    for (let k = 0; k < chain.count; k++) {
      board.append(day, chain.kind[k]!, chain.start[k]!, chain.end[k]!, chain.kind[k] === PASS ? pass : chain.ref[k]!);
      if (chain.kind[k] === RIG) {
        board.rigSetup[day] = chain.ref[k]!;
        board.rigEnd[day] = chain.end[k]!;
      }
    }
    board.start[pass] = start;
    board.end[pass] = start + model.minutes;
    board.dayOf[pass] = day;
    board.minutes[day]! += model.minutes;
    board.passCount[day]! += 1;
    board.captureOn(dateIndex);
    if (model.setup < 0) return;
    board.standing[room] = model.setup;
    board.standingEnd[room] = start + model.minutes;
    board.prepared[room] = -1;
  }
}

const NO_TARGET: Minute = -1;
