import type { Decoder } from '../decode';
import { WORST, type Score } from '../score';
import { Solution } from '../solution';
import { layerRange, put, take } from './order';
import type { Random } from './random';
import { latestStarts } from './start';

/** One in so many places is passed over by chance, so that repeated insertions do not always end alike. */
const BLINK = 12;
/** Price of a place that leaves no time for what comes after the pass. */
const TOO_LATE = 2000;

/** Puts passes where the timetable gets best, trying the places of each one after the other. */
export class Inserter {
  private readonly latest: number[];
  private readonly candidate: Solution;
  private readonly favourite: Solution;
  private readonly score: Score = { ...WORST };
  /** Timetables made so far. */
  tries = 0;

  constructor(
    private readonly decoder: Decoder,
    private readonly random: Random,
    private readonly measure: (score: Score) => number,
    private readonly stop: () => boolean,
  ) {
    this.latest = latestStarts(decoder.board.problem);
    this.candidate = new Solution(decoder.board.problem);
    this.favourite = new Solution(decoder.board.problem);
  }

  /**
   * Gives a pass that is out the best of its places. The decoder must keep the timetable of the solution as it is, and keeps that of
   * the solution as it becomes.
   * @param most places to try at most, chosen by chance
   */
  insert(solution: Solution, pass: number, most: number): void {
    const { candidate, favourite, decoder, random } = this;
    const { days } = solution.problem.passes[pass]!;
    let least = Infinity;
    let slots = 0;
    take(solution, pass);
    for (const day of days) slots += this.slotsOf(solution, day);
    for (const day of days) {
      const { low, high } = layerRange(solution, day, 1);
      for (let at = low; at <= high; at++) {
        if (at < high && !this.isSlot(solution, at, day)) continue;
        const skipped = slots > most ? random.below(slots) >= most : random.below(BLINK) === 0;
        if ((skipped && least < Infinity) || (this.stop() && least < Infinity)) continue;
        candidate.copy(solution);
        put(candidate, pass, day, at, 1);
        candidate.out[pass] = 0;
        candidate.lead[pass] = 0;
        decoder.decode(candidate, this.fromDate(candidate, pass), this.score);
        this.tries += 1;
        const late = decoder.board.start[pass]! > this.latest[pass]!;
        const value = this.measure(this.score) + (late ? TOO_LATE : 0);
        if (value >= least) continue;
        least = value;
        favourite.copy(candidate);
      }
    }
    if (least === Infinity) {
      put(solution, pass, solution.day[pass]!, 0, 1);
      return;
    }
    solution.copy(favourite);
    const fromDate = this.fromDate(solution, pass);
    decoder.decode(solution, fromDate, this.score);
    this.tries += 1;
    decoder.keep(fromDate);
  }

  private fromDate(solution: Solution, pass: number): number {
    return solution.hasEves() ? 0 : solution.dateOf(pass);
  }

  private slotsOf(solution: Solution, day: number): number {
    const { low, high } = layerRange(solution, day, 1);
    let slots = 1;
    for (let at = low; at < high; at++) if (this.isSlot(solution, at, day)) slots += 1;
    return slots;
  }

  /** Only places before a placed pass of the same room-day, and the end, make a difference. */
  private isSlot(solution: Solution, at: number, day: number): boolean {
    const next = solution.order[at]!;
    return solution.day[next] === day && solution.out[next] === 0;
  }
}
