import type { Random } from './random';

/** A climb cools in stages, each by this factor; in 64 stages to 1/52. */
const STAGES = 64;
const COOLING = 0.94;
const BITS = 10;

/**
 * Simulated annealing (Kirkpatrick, Gelatt and Vecchi, "Optimization by simulated annealing", Science 220, 1983): a worse timetable is
 * taken with the chance e^(−loss / temperature). Done with sums, products and quotients only, so that every engine decides alike.
 */
export class Cooling {
  private temperature = 0;
  private stage = 0;
  private steps = 0;
  private step = 0;
  private stages = STAGES;
  /** −ln of evenly spread chances. */
  private readonly losses: Float64Array;

  constructor(private readonly random: Random) {
    const count = 1 << BITS;
    this.losses = Float64Array.from({ length: count }, (_, i) => -naturalLog((i + 0.5) / count));
  }

  /** Begins anew: so hot, and for so many steps. */
  heat(temperature: number, steps: number, stages = STAGES): void {
    this.stages = stages;
    this.temperature = temperature;
    this.steps = steps;
    this.step = 0;
    this.stage = 0;
  }

  /** Keeps one temperature. */
  keep(temperature: number): void {
    this.temperature = temperature;
  }

  /** One step; false when the climb is over. */
  next(): boolean {
    this.step += 1;
    while (this.stage < this.stages && this.step * this.stages >= (this.stage + 1) * this.steps) {
      this.stage += 1;
      this.temperature *= COOLING;
    }
    return this.step <= this.steps;
  }

  /** Whether a timetable that is worse by so much is taken. */
  takes(loss: number): boolean {
    return loss <= 0 || loss < this.temperature * this.losses[this.random.below(this.losses.length)]!;
  }
}

/** The natural logarithm of a number in (0, 1], by halving and the series of the inverse hyperbolic tangent. */
function naturalLog(value: number): number {
  let mantissa = value;
  let halvings = 0;
  while (mantissa < 0.5) {
    mantissa *= 2;
    halvings += 1;
  }
  return series(mantissa) + halvings * series(0.5);
}

function series(value: number): number {
  const ratio = (value - 1) / (value + 1);
  let power = ratio;
  let sum = 0;
  for (let odd = 1; odd < 60; odd += 2) {
    sum += power / odd;
    power *= ratio * ratio;
  }
  return 2 * sum;
}
