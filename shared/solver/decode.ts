import { CHANGEOVER, RIG, Board } from './board';
import { standingIn } from './chain';
import { Closer, emptyTally, type ClosingSink, type Tally } from './closing';
import { gridAtOrAfter } from './grid';
import { EVER, type Problem } from './model';
import { Placer } from './placing';
import { scoreOf, type Score } from './score';
import type { Solution } from './solution';
import { layTail, reserveOf } from './tail';

/** A state of the decoder: the board's memory and the tally. */
class Snapshot {
  readonly memory: Int32Array;
  readonly tally: Tally = emptyTally();
  constructor(size: number) {
    this.memory = new Int32Array(size);
  }
}

function copyTally(into: Tally, from: Tally): void {
  into.waiting = from.waiting;
  into.changeover = from.changeover;
  into.days = from.days;
  into.overtime = from.overtime;
  into.calls = from.calls;
  into.maybe = from.maybe;
}

/** Turns a solution into a timetable: date by date, each pass in order at the earliest start that every hard rule allows. */
export class Decoder {
  readonly board: Board;
  readonly closer: Closer;
  readonly tally: Tally = emptyTally();
  /** Passes in the order in which they were placed. */
  readonly sequence: Int32Array;
  placed = 0;
  /** States before each date: of the timetable made last, and of the one that was kept. */
  private readonly fresh: Snapshot[];
  private readonly kept: Snapshot[];
  private readonly placer: Placer;
  private readonly daysOfLayer: number[][];
  private readonly layersOfDate: number[][];
  private readonly pending: Int32Array;
  private pendingCount = 0;
  private readonly empty = emptyTally();

  /** @param stay the start of each pass in a plan before, -1 where it had none; null where there is no such plan */
  constructor(
    private readonly problem: Problem,
    private readonly stay: Int32Array | null = null,
  ) {
    this.board = new Board(problem);
    this.closer = new Closer(problem, this.board);
    this.placer = new Placer(problem, this.board, this.closer);
    this.sequence = new Int32Array(problem.passes.length);
    this.pending = new Int32Array(problem.passes.length);
    const snapshots = () => problem.dates.map(() => new Snapshot(this.board.memorySize));
    this.fresh = snapshots();
    this.kept = snapshots();
    this.daysOfLayer = [];
    this.layersOfDate = problem.dates.map(() => []);
    problem.days.forEach(({ layer, dateIndex }, d) => {
      if (!this.daysOfLayer[layer]) {
        this.daysOfLayer[layer] = [];
        this.layersOfDate[dateIndex]!.push(layer);
      }
      this.daysOfLayer[layer].push(d);
    });
  }

  /**
   * Makes the timetable of a solution that equals the kept one before a date (0 = nothing is known of it).
   * @param sink hears what closing the dates adds; only with `fromDate` 0
   */
  decode(solution: Solution, fromDate: number, score: Score, sink: ClosingSink | null = null): void {
    const { problem, board, tally } = this;
    const { order } = solution;
    this.pendingCount = 0;
    this.placed = 0;
    let at = 0;
    while (at < order.length && solution.day[order[at]!]! < 0) at += 1;
    if (fromDate > 0) {
      const snapshot = this.kept[fromDate]!;
      board.restore(snapshot.memory);
      copyTally(tally, snapshot.tally);
      for (; at < order.length && solution.dateOf(order[at]!) < fromDate; at++) this.recall(order[at]!, solution);
    } else {
      board.clear();
      copyTally(tally, this.empty);
    }
    let valid = true;
    for (let date = fromDate; date < problem.dates.length && valid; date++) {
      if (date > fromDate) {
        board.save(this.fresh[date]!.memory);
        copyTally(this.fresh[date]!.tally, tally);
      }
      this.closer.open(tally, sink);
      for (const layer of this.layersOfDate[date]!) {
        for (; at < order.length && solution.layerOf(order[at]!) === layer; at++) this.attempt(order[at]!, solution);
        if (this.pendingCount > 0) this.retry(layer, solution);
        for (const day of this.daysOfLayer[layer]!) if (solution.eve[day] === 1) this.prepareEve(day, at, solution);
      }
      for (const layer of this.layersOfDate[date]!) for (const day of this.daysOfLayer[layer]!) valid &&= this.closer.closeDay(day);
      this.closer.closePeople(date);
    }
    scoreOf(problem, board, tally, this.stay, valid, score);
  }

  /** Decodes from nothing until nobody is asked to be ready for a rig in vain. */
  decodeExactly(solution: Solution, score: Score): void {
    do this.decode(solution, 0, score);
    while (this.placer.dropIdleReady());
  }

  /** The timetable made last becomes the one that later decodes start from. */
  keep(fromDate: number): void {
    for (let date = fromDate + 1; date < this.kept.length; date++) {
      const snapshot = this.kept[date]!;
      this.kept[date] = this.fresh[date]!;
      this.fresh[date] = snapshot;
    }
  }

  /**
   * Makes the solution say what was done: each placed pass keeps its room-day and its place in the sequence, the others follow at the
   * end of the layer in which they were wanted.
   */
  adopt(solution: Solution): void {
    const { sequence, placed, board } = this;
    const { order } = solution;
    const unplaced = this.pending;
    let count = 0;
    for (let i = 0; i < order.length; i++) if (board.start[order[i]!]! < 0) unplaced[count++] = order[i]!;
    for (let i = 0; i < placed; i++) solution.day[sequence[i]!] = board.dayOf[sequence[i]!]!;
    let next = 0;
    let at = 0;
    for (let i = 0; i < placed; i++) {
      const layer = solution.layerOf(sequence[i]!);
      while (next < count && solution.layerOf(unplaced[next]!) < layer) order[at++] = unplaced[next++]!;
      order[at++] = sequence[i]!;
    }
    while (next < count) order[at++] = unplaced[next++]!;
    // Members of a group may lie in different layers.
    for (let i = 1; i < order.length; i++) {
      const pass = order[i]!;
      const layer = solution.layerOf(pass);
      let k = i;
      for (; k > 0 && solution.layerOf(order[k - 1]!) > layer; k--) order[k] = order[k - 1]!;
      order[k] = pass;
    }
  }

  private attempt(pass: number, solution: Solution): void {
    if (this.board.start[pass]! >= 0 || solution.out[pass] === 1 || this.problem.passes[pass]!.leftOut) return;
    // A group goes where the last of its members is wanted.
    for (const member of this.problem.passes[pass]!.together) if (solution.layerOf(member) > solution.layerOf(pass)) return;
    if (this.placer.place(pass, solution.day[pass]!, solution)) this.noted(pass);
    else this.pending[this.pendingCount++] = pass;
  }

  private noted(pass: number): void {
    const { together } = this.problem.passes[pass]!;
    if (together.length === 0) this.sequence[this.placed++] = pass;
    else for (const member of together) this.sequence[this.placed++] = member;
  }

  private recall(pass: number, solution: Solution): void {
    if (this.board.start[pass]! >= 0) this.sequence[this.placed++] = pass;
    else if (solution.out[pass] === 0 && !this.problem.passes[pass]!.leftOut) this.pending[this.pendingCount++] = pass;
  }

  /** Tries what found no place so far behind everything else of a layer, as long as that helps. */
  private retry(layer: number, solution: Solution): void {
    const { pending, problem, board } = this;
    for (let moved = true; moved;) {
      moved = false;
      let kept = 0;
      for (let i = 0; i < this.pendingCount; i++) {
        const pass = pending[i]!;
        if (board.start[pass]! >= 0) continue;
        let done = false;
        for (const day of problem.passes[pass]!.days)
          if (!done && problem.days[day]!.layer === layer) done = this.placer.place(pass, day, solution);
        if (done) {
          this.noted(pass);
          moved = true;
        } else pending[kept++] = pass;
      }
      this.pendingCount = kept;
    }
  }

  /** Makes the set-up that the room's next pass asks for ready at the end of a room-day, where it may stand overnight. */
  private prepareEve(day: number, at: number, solution: Solution): void {
    const { problem, board } = this;
    const roomDay = problem.days[day]!;
    const room = problem.rooms[roomDay.room]!;
    if (!room.standing || !board.isOpen(day)) return;
    const standing = standingIn(board, roomDay);
    const wanted = this.nextSetup(roomDay.room, at, solution);
    if (wanted < 0 || wanted === standing) return;
    if (standing >= 0 && problem.setups[standing]!.keepUntilApproved) return;
    const { setups, changeovers, rules } = problem;
    const length = standing < 0 ? setups[wanted]!.rig : changeovers[standing * setups.length + wanted]!;
    if (length === 0) return;
    const used = board.first[day]! < EVER;
    const start = gridAtOrAfter(roomDay.grid, rules.step, Math.max(used ? board.last[day]! : roomDay.from, roomDay.from));
    if (start + length > roomDay.to || this.meetsEvent(day, start, start + length)) return;
    if (!this.runsAllow(day, start, start + length)) return;
    board.append(day, standing < 0 ? RIG : CHANGEOVER, start, start + length, wanted);
    if (standing < 0) {
      board.rigSetup[day] = wanted;
      board.rigEnd[day] = start + length;
    }
    board.prepared[roomDay.room] = wanted;
  }

  private nextSetup(room: number, at: number, solution: Solution): number {
    const { order } = solution;
    for (let i = at; i < order.length; i++) {
      const pass = this.problem.passes[order[i]!]!;
      if (pass.room === room && pass.setup >= 0 && solution.out[order[i]!] === 0) return pass.setup;
    }
    return -1;
  }

  private meetsEvent(day: number, from: number, to: number): boolean {
    const { problem } = this;
    return problem.rooms[problem.days[day]!.room]!.events.some(
      (event) => problem.events[event]!.from < to && from < problem.events[event]!.to,
    );
  }

  /** Whether work may go on in a room-day until a minute, and reserve and wrap still follow. */
  private runsAllow(day: number, from: number, to: number): boolean {
    const { board, problem } = this;
    const { rules } = problem;
    const used = board.first[day]! < EVER;
    const before = used ? -1 : board.previousDay(day);
    // Where windows touch, work of the one before would go on without its pause.
    if (before >= 0 && from - board.last[before]! < Math.max(rules.meal, rules.break)) return false;
    const mealFrom = used ? board.mealFrom[day]! : from;
    const breakFrom = used ? board.breakFrom[day]! : from;
    if (rules.meal > 0 && to - mealFrom > rules.mealAfter) return false;
    if (rules.breakAfter > 0 && rules.break > 0 && to - breakFrom > rules.breakAfter && breakFrom !== from) return false;
    if (board.passCount[day] === 0) return true;
    return layTail(problem, day, to, mealFrom, breakFrom, reserveOf(problem, board.minutes[day]!), null) < EVER;
  }
}
