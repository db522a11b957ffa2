import type { Minute, Minutes } from '../domain/flavours';
import { CHANGEOVER, LISTEN, PASS, RIG, type Board } from './board';
import { gridAtOrAfter, gridAtOrBefore, nameable } from './grid';
import { EVER, NEVER, type Problem, type RoomDay } from './model';

const MOST = 3;

/**
 * What a pass brings with it in its room: a listen, the rig or changeover of its set-up, and the pauses that the runs of work ask for.
 * The links stand as close before the pass as they can.
 */
export class Chain {
  /** Links in order of time, the pass last. */
  count = 0;
  readonly kind = new Int32Array(MOST);
  readonly length = new Int32Array(MOST);
  readonly ref = new Int32Array(MOST);
  readonly start = new Int32Array(MOST);
  readonly end = new Int32Array(MOST);
  private readonly pause = new Int32Array(MOST);
  private readonly earliest = new Int32Array(MOST);
  /** Ready minutes of people count back from here when the chain holds a rig. */
  rigAt = -1;

  private pass = 0;
  private day = 0;
  private lead: Minutes = 0;
  private begin: Minutes = 0;
  private change: Minutes = 0;
  private changeKind = CHANGEOVER;
  /** What must have been listened to: passes that this one comes after approved, and the set-up that would be taken down. */
  private heardAfter: Minute = NEVER;
  private strikeAfter: Minute = NEVER;
  private strikes = false;
  private opens = false;
  private listens = false;

  constructor(private readonly problem: Problem) {}

  /**
   * Looks at what a pass needs in a room-day as it stands.
   * @param lead idle minutes wanted before the chain; `begin` minutes after opening wanted for the first item of the room-day
   * @returns the earliest start that order and approvals allow, or `EVER`
   */
  prepare(board: Board, pass: number, day: number, lead: Minutes, begin: Minutes): Minute {
    const { passes, setups, rules, changeovers } = this.problem;
    const model = passes[pass]!;
    const roomDay = this.problem.days[day]!;
    this.pass = pass;
    this.day = day;
    this.lead = lead;
    this.begin = begin;
    this.change = 0;
    this.heardAfter = NEVER;
    this.strikeAfter = NEVER;
    this.strikes = false;
    let target: Minute = model.notBefore;
    for (const { pass: other, approved, lag } of model.after) {
      if (board.start[other]! < 0) return EVER;
      const end = board.end[other]!;
      if (end + lag > target) target = end + lag;
      if (approved && end > this.heardAfter) this.heardAfter = end;
    }
    const standing = standingIn(board, roomDay);
    if (model.setup >= 0 && board.prepared[roomDay.room] !== model.setup && standing !== model.setup) {
      this.changeKind = standing < 0 ? RIG : CHANGEOVER;
      this.change = standing < 0 ? setups[model.setup]!.rig : changeovers[standing * setups.length + model.setup]!;
      if (standing >= 0 && setups[standing]!.keepUntilApproved) {
        this.strikes = true;
        this.strikeAfter = board.standingEnd[roomDay.room]!;
      }
    }
    this.opens = rules.listen > 0 && board.passCount[day] === 0 && board.earliestDate < roomDay.dateIndex;
    return target;
  }

  /** The first start at or after `target` at which the chain fits into the room-day as it stands, or `EVER`; the links are then laid. */
  lay(board: Board, target: Minute): Minute {
    if (this.opens || (this.heardAfter === NEVER && !this.strikes)) return this.layWith(board, target, this.opens, false);
    // Listened to already, or still to come in another room?
    const without = this.layWith(board, target, false, true);
    if (without === target || this.problem.rules.listen === 0) return without;
    const withListen = this.layWith(board, target, true, false);
    return withListen < without ? withListen : this.layWith(board, target, false, true);
  }

  private layWith(board: Board, target: Minute, listen: boolean, heard: boolean): Minute {
    this.links(board, listen, heard);
    for (let k = 0; k < this.count; k++) if (this.earliest[k]! >= EVER) return EVER;
    this.pause.fill(0);
    const { rules, lengths } = this.problem;
    const day = this.problem.days[this.day]!;
    const fresh = board.first[this.day] === EVER;
    this.pause[0] = fresh ? 0 : this.lead;
    const from = fresh ? board.previousDay(this.day) : this.day;
    const to = from < 0 ? NEVER : board.last[from]!;
    const opening = fresh ? Math.max(day.from + this.begin, to) : to;
    const meals = rules.meal > 0;
    const breaks = rules.breakAfter > 0 && rules.break > 0;

    for (let start = target; ;) {
      start = gridAtOrAfter(day.grid, rules.step, start);
      if (start >= EVER) return EVER;
      const later = this.pushBack(day, start, opening + (fresh ? 0 : this.pause[0]!));
      if (later > start) {
        start = later;
        continue;
      }
      let mealFrom = from < 0 ? NEVER : board.mealFrom[from]!;
      let breakFrom = from < 0 ? NEVER : board.breakFrom[from]!;
      let last = to;
      let paused = false;
      for (let k = 0; k < this.count && !paused; k++) {
        const begins = this.start[k]!;
        if (begins - last >= rules.meal) mealFrom = begins;
        if (begins - last >= rules.break) breakFrom = begins;
        const ends = this.end[k]!;
        if (meals && ends - mealFrom > rules.mealAfter) {
          if (mealFrom === begins) return EVER;
          this.pause[k] = Math.max(this.pause[k]!, lengths.meal);
          paused = true;
        } else if (breaks && ends - breakFrom > rules.breakAfter && breakFrom !== begins) {
          this.pause[k] = Math.max(this.pause[k]!, lengths.break);
          paused = true;
        }
        last = ends;
      }
      if (!paused) {
        this.rigAt = -1;
        for (let k = 0; k < this.count; k++) if (this.kind[k] === RIG) this.rigAt = this.end[k]!;
        return start;
      }
      // A pause before the first link of a fresh room-day means that work goes on from a window that touches it.
      if (fresh && this.pause[0]! > 0) {
        const wanted = to + this.pause[0]!;
        if (this.start[0]! < wanted) start = Math.max(start + 1, start + wanted - this.start[0]!);
      }
    }
  }

  private links(board: Board, listen: boolean, heard: boolean): void {
    const { lengths } = this.problem;
    this.count = 0;
    const heardAfter = this.heardAfter === NEVER ? NEVER : board.approvedAfter(this.heardAfter);
    const strikeAfter = this.strikes ? board.approvedAfter(this.strikeAfter) : NEVER;
    const passFrom = heard ? Math.max(heardAfter, this.change > 0 ? NEVER : strikeAfter) : NEVER;
    if (listen) this.add(LISTEN, lengths.listen, 0, Math.max(this.heardAfter, this.strikeAfter));
    if (this.change > 0) this.add(this.changeKind, this.change, this.problem.passes[this.pass]!.setup, heard ? strikeAfter : NEVER);
    this.add(PASS, this.problem.passes[this.pass]!.minutes, this.pass, passFrom);
  }

  private add(kind: number, length: Minutes, ref: number, earliest: Minute): void {
    const k = this.count++;
    this.kind[k] = kind;
    this.length[k] = length;
    this.ref[k] = ref;
    this.earliest[k] = earliest;
  }

  /** Lays the links backwards from a start of the pass; answers that start, or a later one where a link would come too early. */
  private pushBack(day: RoomDay, start: Minute, opening: Minute): Minute {
    const { hidden, rules } = this.problem;
    const events = this.problem.rooms[day.room]!.events;
    let until = start + this.length[this.count - 1]!;
    const shown = nameable(hidden, until);
    if (shown > until) return start + shown - until;
    for (let k = this.count - 1; k >= 0; k--) {
      const length = this.length[k]!;
      const wanted = until - length;
      const begins = k < this.count - 1 && (day.grid.length > 1 || events.length > 0) ? this.dodge(day, events, wanted, length) : wanted;
      const earliest = Math.max(this.earliest[k]!, k === 0 ? opening : NEVER);
      if (begins < wanted && begins < earliest) return start + rules.step;
      if (begins < earliest) return start + earliest - begins;
      this.start[k] = begins;
      this.end[k] = begins + length;
      until = begins - this.pause[k]!;
    }
    return start;
  }

  /** The latest start at or before `begins` on the grid, clear of events, whose end a clock can name. */
  private dodge(day: RoomDay, events: readonly number[], begins: Minute, length: Minutes): Minute {
    const { hidden, rules } = this.problem;
    for (let at = begins; ;) {
      let start = gridAtOrBefore(day.grid, rules.step, at);
      if (start <= NEVER) return NEVER;
      for (const index of events) {
        const event = this.problem.events[index]!;
        if (event.from < start + length && start < event.to) start = event.from - length;
      }
      if (nameable(hidden, start + length) > start + length) start -= 1;
      if (start === at) return start;
      at = start;
    }
  }
}

/** The set-up that stands in a room as a room-day opens or goes on: -1 = bare. */
export function standingIn(board: Board, day: RoomDay): number {
  const setup = board.standing[day.room]!;
  if (setup < 0 || board.problem.rooms[day.room]!.standing) return setup;
  return board.standingEnd[day.room]! > day.from ? setup : -1;
}
