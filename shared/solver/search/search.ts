import { Decoder, WORST, better, type Score } from '../decode';
import type { Problem } from '../model';
import { Solution } from '../solution';
import { Cooling } from './cooling';
import { Inserter } from './insert';
import { Moves } from './moves';
import { Random } from './random';
import { plainSolution, startOrder } from './start';

export interface SearchOptions {
  seed: number;
  /** Timetables to try; absent = until `stop` says so. */
  iterations?: number;
  stop: () => boolean;
  /** Hears of every better timetable. */
  onBetter?: (solution: Solution, score: Score, iterations: number) => void;
  /** Where to begin, where a plan is there already. */
  from?: Solution;
  /** A total that cannot be beaten. */
  bound: number;
}

export interface SearchResult {
  best: Solution;
  score: Score;
  iterations: number;
}

/** A missing must weighs more than any cost. */
const MISSING = 1e9;
const STARTS = 6;
/** More passes than these are first laid in plain order; and so many places are tried for each of a hundred passes together. */
const MOST_TO_BUILD = 150;
const MOST_PLACES = 2400;
/** Steps of the first climb; each later one is twice as long, up to a limit. */
const FIRST_CLIMB = 4000;
const MOST_DOUBLINGS = 6;
/** Changes looked at to choose a temperature. */
const SAMPLES = 200;
/** Every so many climbs one begins anew instead of at the best. */
const FRESH_EVERY = 3;

/** Strain only tips the scales. */
const STRAIN = 1 / 4096;

const measure = (score: Score) => score.missing * MISSING + score.total + score.strain * STRAIN;

/**
 * Simulated annealing in climbs of growing length. A climb begins at the best, rebuilt in part, or at a timetable built anew. Counts
 * steps, never time, so that a number of iterations gives the same plan everywhere.
 */
export function search(problem: Problem, options: SearchOptions): SearchResult {
  const climber = new Climber(problem, options);
  climber.start();
  for (let climb = 0; climber.goesOn(); climb++) climber.climb(climb);
  return { best: climber.best, score: climber.bestScore, iterations: climber.iterations };
}

class Climber {
  readonly best: Solution;
  readonly bestScore: Score = { ...WORST };
  iterations = 0;

  private readonly most: number;
  private readonly random: Random;
  private readonly decoder: Decoder;
  private readonly moves: Moves;
  private readonly inserter: Inserter;
  private readonly current: Solution;
  private readonly trial: Solution;
  private readonly score: Score = { ...WORST };
  private readonly cooling: Cooling;
  /** What the timetable to change is worth. */
  private held = Infinity;

  constructor(
    private readonly problem: Problem,
    private readonly options: SearchOptions,
  ) {
    this.most = options.iterations ?? Infinity;
    this.random = new Random(options.seed);
    this.decoder = new Decoder(problem);
    this.moves = new Moves(problem, this.random);
    this.cooling = new Cooling(this.random);
    this.inserter = new Inserter(this.decoder, this.random, measure, options.stop);
    this.best = new Solution(problem);
    this.current = new Solution(problem);
    this.trial = new Solution(problem);
  }

  goesOn(): boolean {
    const { bestScore, options } = this;
    const proven = bestScore.missing === 0 && bestScore.total <= options.bound;
    return this.moves.possible && this.iterations < this.most && !proven && !options.stop();
  }

  /** The plan given, and first orders of our own. */
  start(): void {
    const { problem, trial } = this;
    if (this.options.from) {
      trial.copy(this.options.from);
      this.try(0);
    }
    plainSolution(problem, trial, startOrder(problem, this.random, 0));
    this.try(0);
    for (let i = 0; i < STARTS && this.goesOn() && (i === 0 || this.bestScore.missing > 0); i++) {
      this.build(i);
      this.try(0);
    }
  }

  /** Builds a timetable from nothing, pass by pass. */
  private build(shake: number): void {
    const { problem, trial } = this;
    const order = startOrder(problem, this.random, shake);
    plainSolution(problem, trial, order);
    if (problem.passes.length > MOST_TO_BUILD) return;
    trial.out.fill(1);
    this.insertAll([...order]);
  }

  /** Takes passes that have much to do with each other out, and gives them their best places one after the other. */
  private rebuild(size: number): void {
    const { problem, trial, random } = this;
    const taken: number[] = [];
    const first = this.moves.pick();
    const company = this.moves.company(trial, first);
    taken.push(first);
    while (taken.length < size && company.length > 0) {
      const [pass] = company.splice(random.below(company.length), 1);
      if (!taken.includes(pass!)) taken.push(pass!);
    }
    problem.passes.forEach((pass, i) => {
      if (this.decoder.board.start[i]! < 0 && pass.days.length > 0 && !pass.leftOut && !taken.includes(i)) taken.unshift(i);
    });
    for (const pass of taken) trial.out[pass] = 1;
    this.insertAll(taken);
  }

  private insertAll(passes: readonly number[]): void {
    const { problem, trial, inserter, decoder } = this;
    decoder.decode(trial, 0, this.score);
    decoder.keep(0);
    inserter.tries = 0;
    const most = Math.max(3, Math.ceil(MOST_PLACES / problem.passes.length));
    for (const pass of passes) {
      if (problem.passes[pass]!.days.length === 0 || problem.passes[pass]!.leftOut) continue;
      inserter.insert(trial, pass, most);
    }
    for (const pass of passes) trial.out[pass] = 0;
    this.iterations += inserter.tries + 1;
  }

  /** One climb, until nothing better has come for long. */
  climb(number: number): void {
    const { random, moves, trial, current, cooling } = this;
    const anew = number % FRESH_EVERY === FRESH_EVERY - 1;
    if (anew) this.build(1 + random.below(10));
    else {
      trial.copy(this.best);
      if (number > 0) {
        this.decoder.decode(trial, 0, this.score);
        this.rebuild(3 + random.below(6));
      }
    }
    this.try(0);
    this.hold(0);
    const warmth = this.warmth();
    cooling.heat(warmth, FIRST_CLIMB * 2 ** Math.min(number, MOST_DOUBLINGS));
    let now = this.held;
    while (cooling.next() && this.goesOn()) {
      trial.copy(current);
      const touched = moves.change(trial);
      if (touched < 0) {
        this.iterations += 1;
        continue;
      }
      const fromDate = trial.hasEves() ? 0 : touched;
      this.try(fromDate);
      const value = measure(this.score);
      if (!cooling.takes(value - now)) continue;
      this.hold(fromDate);
      now = value;
    }
  }

  /** How hot a climb begins: as hot as the smaller losses among chance changes. */
  private warmth(): number {
    const { trial, current, moves } = this;
    const now = this.held;
    const losses: number[] = [];
    for (let i = 0; i < SAMPLES && this.goesOn(); i++) {
      trial.copy(current);
      const touched = moves.change(trial);
      if (touched < 0) continue;
      this.try(trial.hasEves() ? 0 : touched);
      const loss = measure(this.score) - now;
      if (loss > 0 && loss < MISSING) losses.push(loss);
    }
    losses.sort((a, b) => a - b);
    return losses[losses.length >> 2] ?? 1;
  }

  /** Makes the timetable of the trial; a new best is kept. */
  private try(fromDate: number): void {
    const { decoder, trial, score, bestScore } = this;
    decoder.decode(trial, fromDate, score);
    this.iterations += 1;
    if (!better(score, bestScore)) return;
    Object.assign(bestScore, score);
    this.best.copy(trial);
    decoder.adopt(this.best);
    this.options.onBetter?.(this.best, bestScore, this.iterations);
  }

  /** The timetable made last becomes the one to change. */
  private hold(fromDate: number): void {
    this.decoder.adopt(this.trial);
    this.decoder.keep(fromDate);
    this.moves.look(this.decoder);
    this.current.copy(this.trial);
    this.held = measure(this.score);
  }
}
