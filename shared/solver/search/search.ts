import { Decoder } from '../decode';
import { WORST, better, type Score } from '../score';
import type { Problem } from '../model';
import { Solution } from '../solution';
import { Cooling } from './cooling';
import { Inserter } from './insert';
import { Moves } from './moves';
import { Random } from './random';
import { exactOrder } from './sequence/exact';
import { sequenceOf, solutionOfOrder } from './sequence/model';
import { SequenceSearch } from './sequence/anneal';
import { depths, plainSolution, startOrder } from './start';

export interface SearchOptions {
  seed: number;
  /** Timetables to try; absent = until `stop` says so. */
  iterations?: number;
  stop: () => boolean;
  /** Hears of every better timetable. */
  onBetter?: (solution: Solution, score: Score, iterations: number) => void;
  /** A plan made before: where to begin, and the start of each pass in it (-1: none), which should move for a reason only. */
  from?: { solution: Solution; starts: Int32Array };
  /** A total that cannot be beaten. */
  bound: number;
}

/** Where the production is nothing but an order. */
interface OrderResult {
  from: Solution;
  iterations: number;
  proven: boolean;
}

export interface SearchResult {
  best: Solution;
  score: Score;
  iterations: number;
  /** Whether the score is proven to be the best there is. */
  proven: boolean;
}

/** A missing must weighs more than any cost. */
const MISSING = 1e9;
const STARTS = 2;
/** More passes than these are first laid in plain order; and so many places are tried for each of a hundred passes together. */
const MOST_TO_BUILD = 150;
const MOST_PLACES = 2400;
/** A round rebuilds so many parts, each of so many passes, and then tries small changes, more from round to round. */
const REBUILDS = 60;
const SMALLEST_PART = 5;
const SPREAD = 3;
/** Passes without a place that a rebuilt part takes along at most. */
const MOST_MISSING = 6;
const FIRST_CLIMB = 4000;
const MOST_ROUNDS = 20;
const WARMTH = 20;
/** Rounds in which a plan made before is only changed for the better. */
const COLD_ROUNDS = 2;

/** Strain only tips the scales. */
const STRAIN = 1 / 4096;

const measure = (score: Score) => score.missing * MISSING + score.total + score.unrest + score.strain * STRAIN;

/**
 * Large-neighbourhood search (Shaw, "Using constraint programming and local search methods to solve vehicle routing problems", CP 1998):
 * passes that have much to do with each other are taken out and given their best places again, now and then for the worse; in between
 * small changes are annealed. Counts steps, never time, so that a number of iterations gives the same plan everywhere.
 */
export function search(problem: Problem, options: SearchOptions): SearchResult {
  const climber = new Climber(problem, options);
  const ordered = searchOrder(problem, options, (solution) => climber.startFrom(solution, 0));
  if (ordered) climber.startFrom(ordered.from, ordered.iterations);
  const proven = ordered?.proven === true && climber.bestScore.missing === 0;
  if (!proven) {
    climber.start();
    for (let round = 0; climber.goesOn(); round++) climber.round(round);
  }
  return { best: climber.best, score: climber.bestScore, iterations: climber.iterations, proven };
}

/**
 * The best order of a production that is nothing but one: proven where it has few passes, else annealed until all time is spent.
 * @param first hears of the order that the annealing begins with
 */
function searchOrder(problem: Problem, options: SearchOptions, first: (solution: Solution) => void): OrderResult | null {
  const sequence = sequenceOf(problem);
  if (!sequence) return null;
  const exact = exactOrder(sequence, options.stop);
  if (exact) return { from: solutionOfOrder(sequence, exact), iterations: 1, proven: true };
  const most = options.iterations ?? Infinity;
  const annealing: SequenceSearch = new SequenceSearch(sequence, new Random(options.seed), () => annealing.tries >= most || options.stop());
  first(solutionOfOrder(sequence, annealing.best));
  annealing.run(0);
  return { from: solutionOfOrder(sequence, annealing.best), iterations: annealing.tries, proven: false };
}

class Climber {
  readonly best: Solution;
  readonly bestScore: Score = { ...WORST };
  iterations = 0;

  private readonly most: number;
  private readonly random: Random;
  private readonly decoder: Decoder;
  /** Makes timetables from nothing, beside the one that is being changed. */
  private readonly witness: Decoder;
  private readonly moves: Moves;
  private readonly inserter: Inserter;
  /** How long a chain of passes each one waits for. */
  private readonly depth: number[];
  private readonly current: Solution;
  private readonly trial: Solution;
  private readonly candidate: Solution;
  private readonly score: Score = { ...WORST };
  private readonly again: Score = { ...WORST };
  private readonly cooling: Cooling;
  /** What the timetable to change is worth. */
  private held = Infinity;

  constructor(
    private readonly problem: Problem,
    private readonly options: SearchOptions,
  ) {
    this.most = options.iterations ?? Infinity;
    this.random = new Random(options.seed);
    this.decoder = new Decoder(problem, options.from?.starts);
    this.witness = new Decoder(problem, options.from?.starts);
    this.moves = new Moves(problem, this.random);
    this.cooling = new Cooling(this.random);
    this.inserter = new Inserter(this.decoder, this.random, measure, options.stop);
    this.depth = depths(problem);
    this.best = new Solution(problem);
    this.current = new Solution(problem);
    this.trial = new Solution(problem);
    this.candidate = new Solution(problem);
  }

  goesOn(): boolean {
    const { bestScore, options } = this;
    const proven = bestScore.missing === 0 && bestScore.total <= options.bound;
    return this.moves.possible && this.iterations < this.most && !proven && !options.stop();
  }

  /** One solution to begin with, found after so many orders. */
  startFrom(solution: Solution, iterations: number): void {
    this.iterations += iterations;
    this.trial.copy(solution);
    this.try(0);
  }

  /** The plan given, and first orders of our own. */
  start(): void {
    const { problem, trial } = this;
    if (this.options.from) {
      trial.copy(this.options.from.solution);
      this.try(0);
    }
    if (this.options.from && this.bestScore.missing === 0) return;
    plainSolution(problem, trial, startOrder(problem, this.random, 0, true));
    this.try(0);
    for (let i = 0; i < STARTS && this.goesOn(); i++) {
      this.build(i);
      this.try(0);
    }
  }

  /** Builds a timetable from nothing, pass by pass. */
  private build(shake: number): void {
    const { problem, trial } = this;
    const order = startOrder(problem, this.random, shake, shake % 2 === 0);
    plainSolution(problem, trial, order);
    if (problem.passes.length > MOST_TO_BUILD) return;
    trial.out.fill(1);
    this.insertAll([...order]);
  }

  /** Takes passes that have much to do with each other out, and gives them their best places one after the other. */
  private rebuild(size: number): void {
    const { trial, random } = this;
    const taken: number[] = [];
    const first = this.moves.pick();
    const company = this.moves.company(trial, first);
    taken.push(first);
    while (taken.length < size && company.length > 0) {
      const [pass] = company.splice(random.below(company.length), 1);
      if (!taken.includes(pass!)) taken.push(pass!);
    }
    const missing = this.moves.missingIn(this.decoder).filter((pass) => !taken.includes(pass));
    for (let i = 0; i < MOST_MISSING && missing.length > 0; i++) taken.unshift(...missing.splice(random.below(missing.length), 1));
    for (const pass of taken) trial.out[pass] = 1;
    // What others wait for comes first; the sort keeps the order by chance of the rest.
    taken.sort((a, b) => this.depth[a]! - this.depth[b]!);
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

  /** One round: parts of the timetable are rebuilt, then small changes are annealed from the best. */
  round(number: number): void {
    const { random, moves, trial, current, cooling } = this;
    this.goBack();
    for (let i = 0; i < REBUILDS && this.goesOn(); i++) {
      cooling.keep(this.warmth(number));
      trial.copy(current);
      this.decoder.decode(trial, 0, this.score);
      this.rebuild(SMALLEST_PART + random.below(SPREAD));
      this.try(0);
      if (cooling.takes(measure(this.score) - this.held)) this.hold(0);
    }
    this.goBack();
    cooling.heat(this.warmth(number), FIRST_CLIMB * (1 + Math.min(number, MOST_ROUNDS) / 2));
    while (cooling.next() && this.goesOn()) {
      trial.copy(current);
      const touched = moves.change(trial);
      if (touched < 0) {
        this.iterations += 1;
        continue;
      }
      const fromDate = trial.hasEves() ? 0 : touched;
      this.try(fromDate);
      if (cooling.takes(measure(this.score) - this.held)) this.hold(fromDate);
    }
  }

  /** How great a loss is taken now and then: a share of the whole cost. A plan made before is first only mended. */
  private warmth(round: number): number {
    return this.options.from && round < COLD_ROUNDS ? 0 : this.bestScore.total / WARMTH;
  }

  private goBack(): void {
    this.trial.copy(this.best);
    this.try(0);
    this.hold(0);
  }

  /** Makes the timetable of the trial; a new best is kept, once it is seen to come out alike when it is made from nothing. */
  private try(fromDate: number): void {
    const { decoder, trial, score, bestScore, candidate, again } = this;
    decoder.decode(trial, fromDate, score);
    this.iterations += 1;
    if (!better(score, bestScore)) return;
    candidate.copy(trial);
    decoder.adopt(candidate);
    this.witness.decode(candidate, 0, again);
    if (!better(again, bestScore)) return;
    Object.assign(bestScore, again);
    this.best.copy(candidate);
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
