import type { ItemKind, PlanCall, PlanCost, PlanItem } from '../contracts/plan';
import type { ProductionFile } from '../contracts/resources';
import type { Minute, PassId } from '../domain/flavours';
import { CHANGEOVER, EVENT_ENTRY, LISTEN, PASS, READY_ENTRY, RIG } from '../solver/board';
import type { ClosingSink, Tally } from '../solver/closing';
import { Decoder } from '../solver/decode';
import { WORST, type Score } from '../solver/score';
import type { Problem } from '../solver/model';
import { BREAK } from '../solver/rests';
import { Solution } from '../solver/solution';
import { zoneClock, type ZoneClock } from '../time/wall';

/** A timetable in the form of a plan. */
export interface Schedule {
  items: PlanItem[];
  calls: PlanCall[];
  cost: PlanCost;
  unplaced: PassId[];
}

/**
 * Writes a solution out: items by start, one call a person and date, the cost in its parts, and what is not placed. Passes that found
 * no place are given up first, so that nobody is asked to be ready for them.
 */
export function scheduleOf(file: ProductionFile, problem: Problem, solution: Solution): Schedule {
  const decoder = new Decoder(problem);
  const score: Score = { ...WORST };
  const final = new Solution(problem);
  final.copy(solution);
  decoder.decode(final, 0, score);
  decoder.adopt(final);
  problem.passes.forEach((_, pass) => {
    if (decoder.board.start[pass]! < 0) final.out[pass] = 1;
  });
  decoder.decodeExactly(final, score);
  const writer = new Writer(file, problem, decoder);
  decoder.decode(final, 0, score, writer);
  writer.finish();
  return {
    items: writer.items(),
    calls: writer.calls(),
    cost: costOf(problem, decoder.tally, score.total),
    unplaced: problem.passes.filter((_, pass) => decoder.board.start[pass]! < 0).map(({ id }) => id),
  };
}

function costOf(problem: Problem, tally: Tally, total: number): PlanCost {
  const { weights } = problem;
  const cost = {
    waiting: tally.waiting,
    changeover: weights.changeover * tally.changeover,
    day: weights.day * tally.days,
    overtime: weights.overtime * tally.overtime,
    call: weights.call * tally.calls,
    maybe: weights.maybe * tally.maybe,
  };
  const sum = Object.values(cost).reduce((a, b) => a + b, 0);
  // What is left of the total is the price of passes that are not placed; weights with fractions may leave a hair.
  return { total, ...cost, unplaced: Math.round((total - sum) * 1e6) / 1e6 };
}

interface TimedItem {
  from: Minute;
  to: Minute;
  item: PlanItem;
}
interface DatedCall {
  date: number;
  person: number;
  call: PlanCall;
}

/** Collects items and calls while the dates of a timetable are closed. */
class Writer implements ClosingSink {
  private readonly clock: ZoneClock;
  private readonly timed: TimedItem[] = [];
  private readonly dated: DatedCall[] = [];
  /** Who is named by which pause of the date being closed. */
  private named: number[][] = [];

  constructor(
    private readonly file: ProductionFile,
    private readonly problem: Problem,
    private readonly decoder: Decoder,
  ) {
    this.clock = zoneClock(problem.zone);
  }

  work(kind: 'reserve' | 'wrap', day: number, from: Minute, to: Minute): void {
    this.add(kind, this.problem.days[day]!.room, from, to, []);
  }

  name(rest: number, person: number): void {
    (this.named[rest] ??= []).push(person);
  }

  /** Pauses of a date, once it is closed. One that names nobody holds for the whole room, and is not said where it was not counted so. */
  rests(): void {
    const { rests } = this.decoder.closer;
    for (let i = 0; i < rests.count; i++) {
      const people = this.named[i] ?? [];
      const kind = rests.kind[i] === BREAK ? 'break' : 'meal';
      if (people.length > 0 || rests.refused[i] === 0)
        this.add(kind, this.problem.days[rests.day[i]!]!.room, rests.from[i]!, rests.to[i]!, people);
    }
    this.named = [];
  }

  call(person: number, date: number, first: number, last: number, waiting: number): void {
    const { entryStart, entryEnd, entryRef } = this.decoder.board;
    let working = 0;
    let ready = -1;
    for (let i = first; i <= last; i++) {
      working += entryEnd[i]! - entryStart[i]!;
      if (ready < 0 && entryRef[i]! >= EVENT_ENTRY) ready = entryStart[i]!;
    }
    this.dated.push({
      date,
      person,
      call: {
        person: this.problem.people[person]!.id,
        date: this.problem.dates[date]!,
        arrive: this.clock.wallOf(entryStart[first]!),
        ready: this.clock.wallOf(ready < 0 ? entryStart[first]! : ready),
        release: this.clock.wallOf(entryEnd[last]!),
        working,
        waiting,
      },
    });
  }

  /** The items that the board holds, and the events of the file. */
  finish(): void {
    const { board } = this.decoder;
    const { problem } = this;
    problem.days.forEach(({ room }, day) => {
      for (let item = board.head[day]!; item >= 0; item = board.itemNext[item]!) {
        const ref = board.itemRef[item]!;
        const kind = KINDS[board.itemKind[item]!]!;
        const people = kind === 'pass' ? problem.passes[ref]!.people : kind === 'rig' ? this.readyIn(day) : [];
        const setup = kind === 'pass' ? problem.passes[ref]!.setup : kind === 'rig' || kind === 'changeover' ? ref : -1;
        const more = { ...(kind === 'pass' && { id: problem.passes[ref]!.id }), ...(setup >= 0 && { setup: problem.setups[setup]!.id }) };
        this.add(kind, room, board.itemStart[item]!, board.itemEnd[item]!, people, more);
      }
    });
    problem.events.forEach(({ from, to }, i) => {
      const { id, room, people, from: start, to: end } = this.file.events[i]!;
      const item: PlanItem = { kind: 'event', id, ...(room !== undefined && { room }), start, end, people: people ?? [] };
      this.timed.push({ from, to, item });
    });
  }

  items(): PlanItem[] {
    const room = ({ item }: TimedItem) => this.problem.rooms.findIndex(({ id }) => id === item.room);
    return this.timed.sort((a, b) => a.from - b.from || a.to - b.to || room(a) - room(b)).map(({ item }) => item);
  }

  calls(): PlanCall[] {
    return this.dated.sort((a, b) => a.date - b.date || a.person - b.person).map(({ call }) => call);
  }

  private readyIn(day: number): number[] {
    const { board } = this.decoder;
    return this.problem.people.flatMap((_, person) => {
      const offset = board.offset[person]!;
      for (let i = offset; i < offset + board.entryCount[person]!; i++) if (board.entryRef[i] === READY_ENTRY - day) return [person];
      return [];
    });
  }

  private add(kind: ItemKind, room: number, from: Minute, to: Minute, people: readonly number[], more: Partial<PlanItem> = {}): void {
    const { rooms, people: everybody } = this.problem;
    const { id, ...rest } = more;
    const item: PlanItem = {
      kind,
      ...(id !== undefined && { id }),
      room: rooms[room]!.id,
      ...rest,
      start: this.clock.wallOf(from),
      end: this.clock.wallOf(to),
      people: people.map((person) => everybody[person]!.id),
    };
    this.timed.push({ from, to, item });
  }
}

const KINDS: Readonly<Record<number, ItemKind>> = { [PASS]: 'pass', [RIG]: 'rig', [CHANGEOVER]: 'changeover', [LISTEN]: 'listen' };
