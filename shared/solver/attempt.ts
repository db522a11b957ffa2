import type { Minute } from '../domain/flavours';
import { READY_ENTRY, type Board } from './board';
import { EVER, NEVER, type Problem } from './model';

/** A try to put a pass into a room-day at a start, seen by one of its people after the other. */
export class Attempt {
  pass = 0;
  day = 0;
  date = 0;
  start: Minute = 0;
  end: Minute = 0;

  /** The person looked at, and the ready minutes that come with the pass (`readyFrom` = -1: none). */
  person = 0;
  readyFrom: Minute = -1;
  readyTo: Minute = -1;
  /** Whether the rig, and so the ready minutes, move with the start. */
  readyMoves = false;

  /** The person's items of the date with the new ones, by start; `at` is the pass among them. */
  count = 0;
  readonly from: Int32Array;
  readonly to: Int32Array;
  readonly ref: Int32Array;
  at = 0;
  /** End of the last item of an earlier date, start of the first one of a later date. */
  before: Minute = NEVER;
  after: Minute = EVER;

  constructor(problem: Problem) {
    const most = problem.people.reduce((size, person) => Math.max(size, person.passes.length * 2 + person.events.length), 0) + 2;
    this.from = new Int32Array(most);
    this.to = new Int32Array(most);
    this.ref = new Int32Array(most);
  }

  /** Reads the person's items of the date from the board; the new ones are not among them yet. */
  read(board: Board): void {
    const offset = board.offset[this.person]!;
    let i = offset + board.entryCount[this.person]! - 1;
    this.after = EVER;
    this.before = NEVER;
    while (i >= offset && board.entryDate[i]! > this.date) this.after = board.entryStart[i--]!;
    let lowest = i;
    while (lowest >= offset && board.entryDate[lowest] === this.date) lowest -= 1;
    if (lowest >= offset) this.before = board.entryEnd[lowest]!;
    this.count = i - lowest;
    for (let k = 0; k < this.count; k++) {
      this.from[k] = board.entryStart[lowest + 1 + k]!;
      this.to[k] = board.entryEnd[lowest + 1 + k]!;
      this.ref[k] = board.entryRef[lowest + 1 + k]!;
    }
  }

  /** Whether the ready minutes of the rig of the room-day are among the items read. */
  hasReady(): boolean {
    for (let k = 0; k < this.count; k++) if (this.ref[k] === READY_ENTRY - this.day) return true;
    return false;
  }

  /** Adds the new items to those read, which they must not overlap. */
  join(): void {
    if (this.readyFrom >= 0) this.insert(this.readyFrom, this.readyTo, READY_ENTRY - this.day);
    this.at = this.insert(this.start, this.end, this.pass);
  }

  private insert(from: Minute, to: Minute, ref: number): number {
    let k = this.count;
    while (k > 0 && this.from[k - 1]! > from) {
      this.from[k] = this.from[k - 1]!;
      this.to[k] = this.to[k - 1]!;
      this.ref[k] = this.ref[k - 1]!;
      k -= 1;
    }
    this.from[k] = from;
    this.to[k] = to;
    this.ref[k] = ref;
    this.count += 1;
    return k;
  }
}
