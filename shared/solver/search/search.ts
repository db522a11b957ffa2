import { Decoder, WORST, better, type Score } from '../decode';
import type { Problem } from '../model';
import { Solution } from '../solution';
import { Moves } from './moves';
import { Random } from './random';
import { startSolution } from './start';

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
const STARTS = 12;

const measure = (score: Score) => score.missing * MISSING + score.total;

/**
 * Late acceptance hill climbing (Burke and Bykov, "The late acceptance hill-climbing heuristic", European Journal of Operational
 * Research 258, 2017): a change is kept when it is no worse than what is held now, or than what was held some hundred steps ago. When
 * nothing better comes for long, the search goes back to the best and begins with a fresh memory. Counts steps, never time, so that a
 * number of iterations gives the same plan everywhere.
 */
export function search(problem: Problem, options: SearchOptions): SearchResult {
  const { stop, bound } = options;
  const most = options.iterations ?? Infinity;
  const random = new Random(options.seed);
  const decoder = new Decoder(problem);
  const moves = new Moves(problem, random);
  const best = new Solution(problem);
  const current = new Solution(problem);
  const trial = new Solution(problem);
  const bestScore: Score = { ...WORST };
  const score: Score = { ...WORST };
  let iterations = 0;

  const remember = () => {
    if (!better(score, bestScore)) return false;
    bestScore.missing = score.missing;
    bestScore.total = score.total;
    decoder.adopt(trial);
    best.copy(trial);
    options.onBetter?.(best, bestScore, iterations);
    return true;
  };
  const begin = (fill: () => void) => {
    fill();
    decoder.decode(trial, 0, score);
    iterations += 1;
    remember();
  };
  if (options.from) begin(() => trial.copy(options.from!));
  for (let i = 0; i < STARTS && iterations < most && !(i > 0 && stop()); i++) begin(() => startSolution(problem, trial, random, i));

  const size = problem.passes.length;
  const memory = new Float64Array(Math.min(2000, 100 + 10 * size));
  const patience = 40 * memory.length;
  let now = 0;
  let idle = 0;
  const goBack = () => {
    trial.copy(best);
    decoder.decode(trial, 0, score);
    decoder.adopt(trial);
    decoder.keep(0);
    moves.look(decoder);
    current.copy(trial);
    now = measure(score);
    memory.fill(now);
    idle = 0;
  };
  goBack();

  while (moves.possible && iterations < most && !(bestScore.missing === 0 && bestScore.total <= bound) && !stop()) {
    trial.copy(current);
    const touched = moves.change(trial);
    iterations += 1;
    if (touched < 0) continue;
    const fromDate = usesEves(trial) ? 0 : touched;
    decoder.decode(trial, fromDate, score);
    const value = measure(score);
    const slot = iterations % memory.length;
    if (value <= now || value <= memory[slot]!) {
      if (!remember()) decoder.adopt(trial);
      else idle = 0;
      decoder.keep(fromDate);
      moves.look(decoder);
      current.copy(trial);
      now = value;
    }
    if (now < memory[slot]!) memory[slot] = now;
    idle += 1;
    if (idle > patience) goBack();
  }
  return { best, score: bestScore, iterations };
}

function usesEves(solution: Solution): boolean {
  for (let day = 0; day < solution.eve.length; day++) if (solution.eve[day] === 1) return true;
  return false;
}
