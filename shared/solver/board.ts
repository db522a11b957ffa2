import type { Minute } from '../domain/flavours';
import { EVER, type Problem } from './model';
import { spareIn } from './spare';

/** Kinds of items that are laid while a plan grows; pauses, reserve and wrap follow when a date is closed. */
export const PASS = 0;
export const RIG = 1;
export const CHANGEOVER = 2;
export const LISTEN = 3;

/** What an entry of a person's list is, where it is not a pass (whose index it then holds). */
export const EVENT_ENTRY = -1;
/** `READY_ENTRY - d` stands for the ready minutes of the rig in room-day `d`. */
export const READY_ENTRY = -2;

const NONE = -1;

/**
 * A growing timetable: what is placed so far, in typed arrays that share one memory, so that it is cleared, saved and restored by one
 * copy. Room-days grow forward only; a person's list is sorted by time.
 */
export class Board {
  private readonly memory: Int32Array;
  private readonly blank: Int32Array;

  /** Per pass: start, or -1 while it is not placed; end; room-day. */
  readonly start: Int32Array;
  readonly end: Int32Array;
  readonly dayOf: Int32Array;

  /** Per room: set-up of the last pass that has one (-1 = bare), the end of that pass, and a set-up made ready ahead (-1 = none). */
  readonly standing: Int32Array;
  readonly standingEnd: Int32Array;
  readonly prepared: Int32Array;

  /** Per room-day: start of the first item, end of the last work, since when work goes on without a meal and without a break. */
  readonly first: Int32Array;
  readonly last: Int32Array;
  readonly mealFrom: Int32Array;
  readonly breakFrom: Int32Array;
  /** Pass minutes, number of passes, the rig in it (at most one: its set-up, start and end). */
  readonly minutes: Int32Array;
  readonly passCount: Int32Array;
  readonly rigSetup: Int32Array;
  readonly rigEnd: Int32Array;
  readonly head: Int32Array;
  readonly tail: Int32Array;
  /** 1 once reserve and wrap are laid. */
  readonly closed: Int32Array;
  /** Minutes of reserve that its gaps can take beside the pauses that they are. */
  readonly spare: Int32Array;

  /** Items in order of laying; `next` leads to the next item of the room-day. `ref` = pass or set-up. */
  readonly itemKind: Int32Array;
  readonly itemStart: Int32Array;
  readonly itemEnd: Int32Array;
  readonly itemRef: Int32Array;
  readonly itemNext: Int32Array;

  /** Listens, events of that kind first. */
  readonly approvalStart: Int32Array;
  readonly approvalEnd: Int32Array;

  /** Per person a list from `offset[person]` on: start, end, what it is, date. */
  readonly offset: Int32Array;
  readonly entryCount: Int32Array;
  readonly entryStart: Int32Array;
  readonly entryEnd: Int32Array;
  readonly entryRef: Int32Array;
  readonly entryDate: Int32Array;

  /** Number of items, of approvals, and the earliest date with a pass. */
  private readonly counters: Int32Array;

  /** Per room-day the one before and the one after it in its room, or -1. */
  private readonly earlier: Int32Array;
  private readonly later: Int32Array;

  constructor(readonly problem: Problem) {
    const { passes, rooms, days, people, events } = problem;
    const items = passes.length * 3 + days.length;
    this.offset = new Int32Array(people.length + 1);
    people.forEach((person, q) => {
      this.offset[q + 1] = this.offset[q]! + person.passes.length * 2 + person.events.length;
    });
    const entries = this.offset[people.length]!;
    const approvals = items + events.length;
    const sizes = [
      ...Array<number>(3).fill(passes.length),
      ...Array<number>(3).fill(rooms.length),
      ...Array<number>(12).fill(days.length),
      ...Array<number>(5).fill(items),
      ...Array<number>(2).fill(approvals),
      people.length,
      ...Array<number>(4).fill(entries),
      3,
    ];
    this.memory = new Int32Array(sizes.reduce((sum, size) => sum + size, 0));
    let at = 0;
    const parts = sizes.map((size) => this.memory.subarray(at, (at += size)));
    const part = () => parts.shift()!;
    this.start = part();
    this.end = part();
    this.dayOf = part();
    this.standing = part();
    this.standingEnd = part();
    this.prepared = part();
    this.first = part();
    this.last = part();
    this.mealFrom = part();
    this.breakFrom = part();
    this.minutes = part();
    this.passCount = part();
    this.rigSetup = part();
    this.rigEnd = part();
    this.head = part();
    this.tail = part();
    this.closed = part();
    this.spare = part();
    this.itemKind = part();
    this.itemStart = part();
    this.itemEnd = part();
    this.itemRef = part();
    this.itemNext = part();
    this.approvalStart = part();
    this.approvalEnd = part();
    this.entryCount = part();
    this.entryStart = part();
    this.entryEnd = part();
    this.entryRef = part();
    this.entryDate = part();
    this.counters = part();
    this.earlier = new Int32Array(days.length).fill(NONE);
    this.later = new Int32Array(days.length).fill(NONE);
    for (const room of rooms)
      for (let i = 1; i < room.days.length; i++) {
        this.earlier[room.days[i]!] = room.days[i - 1]!;
        this.later[room.days[i - 1]!] = room.days[i]!;
      }
    this.fillBlank();
    this.blank = this.memory.slice();
  }

  private fillBlank(): void {
    const { people, events } = this.problem;
    for (const list of [this.start, this.end, this.dayOf, this.standing, this.standingEnd, this.prepared]) list.fill(NONE);
    for (const list of [this.rigSetup, this.head, this.tail]) list.fill(NONE);
    this.first.fill(EVER);
    for (const list of [this.last, this.mealFrom, this.breakFrom]) list.fill(NONE);
    this.counters[2] = EVER;
    for (const event of events) if (event.approves) this.addApproval(event.from, event.to);
    people.forEach((person, q) => {
      for (const index of person.events) {
        const event = events[index]!;
        this.addEntry(q, event.from, event.to, EVENT_ENTRY, event.dateIndex);
      }
    });
  }

  /** Back to the empty timetable. */
  clear(): void {
    this.memory.set(this.blank);
  }
  /** A copy of the whole state, into a buffer of `memorySize`. */
  save(into: Int32Array): void {
    into.set(this.memory);
  }
  restore(from: Int32Array): void {
    this.memory.set(from);
  }
  get memorySize(): number {
    return this.memory.length;
  }

  get approvals(): number {
    return this.counters[1]!;
  }
  /** Position of the earliest date that holds a pass. */
  get earliestDate(): number {
    return this.counters[2]!;
  }
  captureOn(date: number): void {
    if (date < this.counters[2]!) this.counters[2] = date;
  }

  addApproval(from: Minute, to: Minute): void {
    const at = this.counters[1]!;
    this.approvalStart[at] = from;
    this.approvalEnd[at] = to;
    this.counters[1] = at + 1;
  }

  /** The end of the earliest listen that begins at or after a minute; `EVER` where none is laid yet. */
  approvedAfter(minute: Minute): Minute {
    let best = EVER;
    for (let i = this.counters[1]! - 1; i >= 0; i--)
      if (this.approvalStart[i]! >= minute && this.approvalEnd[i]! < best) best = this.approvalEnd[i]!;
    return best;
  }

  /** Appends work to a room-day and brings its runs without meal and break up to date. */
  append(day: number, kind: number, from: Minute, to: Minute, ref: number): void {
    const at = this.counters[0]!;
    this.itemKind[at] = kind;
    this.itemStart[at] = from;
    this.itemEnd[at] = to;
    this.itemRef[at] = ref;
    this.itemNext[at] = NONE;
    if (this.tail[day] === NONE) this.head[day] = at;
    else this.itemNext[this.tail[day]!] = at;
    this.tail[day] = at;
    this.counters[0] = at + 1;
    this.work(day, from, to);
    if (kind === LISTEN) this.addApproval(from, to);
  }

  /** Work in a room-day from one minute to another: first and last minute and the runs. */
  work(day: number, from: Minute, to: Minute): void {
    const { rules } = this.problem;
    const opens = this.first[day] === EVER;
    if (opens) {
      this.first[day] = from;
      this.inherit(day);
    }
    const last = this.last[day]!;
    const gap = from - last;
    if (!opens && gap > 0) this.spare[day]! += spareIn(this.problem, day, last, from, this.mealFrom[day]!, this.breakFrom[day]!);
    if (this.last[day] === NONE || gap >= rules.meal) this.mealFrom[day] = from;
    if (this.last[day] === NONE || gap >= rules.break) this.breakFrom[day] = from;
    this.last[day] = to;
  }

  /** Runs go on from the room's window before, which may touch this one. */
  private inherit(day: number): void {
    const before = this.previousDay(day);
    if (before < 0) return;
    this.last[day] = this.last[before]!;
    this.mealFrom[day] = this.mealFrom[before]!;
    this.breakFrom[day] = this.breakFrom[before]!;
  }

  /** The last used room-day of the same room before this one, or -1. */
  previousDay(day: number): number {
    let before = this.earlier[day]!;
    while (before >= 0 && this.first[before] === EVER) before = this.earlier[before]!;
    return before;
  }

  /** Whether work can still be laid in a room-day: it is not closed, and no later one of its room is used. */
  isOpen(day: number): boolean {
    if (this.closed[day] === 1) return false;
    const { days } = this.problem;
    for (let next = this.later[day]!; next >= 0 && days[next]!.dateIndex === days[day]!.dateIndex; next = this.later[next]!)
      if (this.head[next]! >= 0) return false;
    return true;
  }

  /** Puts an entry into a person's list, which stays sorted by start. */
  addEntry(person: number, from: Minute, to: Minute, ref: number, date: number): void {
    const offset = this.offset[person]!;
    let at = offset + this.entryCount[person]!;
    while (at > offset && this.entryStart[at - 1]! > from) {
      this.entryStart[at] = this.entryStart[at - 1]!;
      this.entryEnd[at] = this.entryEnd[at - 1]!;
      this.entryRef[at] = this.entryRef[at - 1]!;
      this.entryDate[at] = this.entryDate[at - 1]!;
      at -= 1;
    }
    this.entryStart[at] = from;
    this.entryEnd[at] = to;
    this.entryRef[at] = ref;
    this.entryDate[at] = date;
    this.entryCount[person]! += 1;
  }
}
