import { Cooling } from '../cooling';
import type { Random } from '../random';
import { LATE, SequenceCost, type Sequence } from './model';
import { seriate } from './seriate';

const FIRST_CLIMB = 50_000;
const MOST_DOUBLINGS = 8;
/** Orders cool further than timetables: 0.94¹²⁸ ≈ 1/2750. */
const STAGES = 128;
const SAMPLES = 400;
/** So many orders are looked at between two questions whether to stop. */
const PACE = 64;

/** Finds a good order by simulated annealing over moved, turned and exchanged stretches. */
export class SequenceSearch {
  readonly best: Int32Array;
  bestCost = Infinity;
  /** Orders looked at. */
  tries = 0;
  private readonly count: number;
  private readonly cost: SequenceCost;
  private readonly current: Int32Array;
  private readonly trial: Int32Array;
  private readonly cooling: Cooling;
  /** The stretch in which the trial differs from the current order. */
  private low = 0;
  private high = 0;

  constructor(
    private readonly sequence: Sequence,
    private readonly random: Random,
    private readonly stop: () => boolean,
  ) {
    this.count = sequence.passes.length;
    this.cost = new SequenceCost(sequence);
    this.best = new Int32Array(this.count);
    this.current = new Int32Array(this.count);
    this.trial = new Int32Array(this.count);
    this.cooling = new Cooling(random);
    this.take(this.nearest());
    if (sequence.people > 0 && !sequence.ordered) this.take(seriate(sequence));
  }

  /** Climbs until `stop` says so or the cost cannot be less. */
  run(bound: number): void {
    for (let climb = 0; this.bestCost > bound && !this.stop(); climb++) this.climb(climb, bound);
  }

  private take(order: Int32Array): void {
    const cost = this.cost.of(order);
    this.tries += 1;
    if (cost >= this.bestCost) return;
    this.bestCost = cost;
    this.best.set(order);
  }

  private climb(number: number, bound: number): void {
    const { current, trial, cooling } = this;
    current.set(number % 3 === 2 ? this.nearest() : this.best);
    let now = this.cost.of(current);
    cooling.heat(this.warmth(now), FIRST_CLIMB * 2 ** Math.min(number, MOST_DOUBLINGS), STAGES);
    for (let step = 0; cooling.next(); step++) {
      if (step % PACE === 0 && (this.stop() || this.bestCost <= bound)) return;
      this.tries += 1;
      if (!this.change()) continue;
      const value = this.valueOf(now);
      if (!cooling.takes(value - now)) continue;
      for (let i = this.low; i <= this.high; i++) current[i] = trial[i]!;
      now = value;
      if (value < this.bestCost - 1e-9) {
        this.bestCost = value;
        this.best.set(current);
      }
    }
  }

  private warmth(now: number): number {
    const losses: number[] = [];
    for (let i = 0; i < SAMPLES; i++) {
      if (!this.change()) continue;
      const loss = this.valueOf(now) - now;
      if (loss > 0 && loss < LATE) losses.push(loss);
    }
    losses.sort((a, b) => a - b);
    return losses[losses.length >> 2] ?? 1;
  }

  /** The cost of the trial; where only changeovers count, by what changed alone. */
  private valueOf(now: number): number {
    const { sequence, trial, current, low, high, count } = this;
    if (sequence.people > 0 || sequence.bounded) {
      for (let i = 0; i < low; i++) trial[i] = current[i]!;
      for (let i = high + 1; i < count; i++) trial[i] = current[i]!;
      return this.cost.of(trial);
    }
    const { change, rig, changeWeight } = sequence;
    let minutes = low === 0 ? rig[trial[0]!]! - rig[current[0]!]! : 0;
    let before = low > 0 ? current[low - 1]! : -1;
    let beforeTrial = before;
    for (let i = low; i <= high + 1 && i < count; i++) {
      const pass = current[i]!;
      const other = i <= high ? trial[i]! : pass;
      if (before >= 0) minutes += change[beforeTrial * count + other]! - change[before * count + pass]!;
      before = pass;
      beforeTrial = other;
    }
    return now + changeWeight * minutes;
  }

  /** Writes a changed stretch into the trial; false where it would break the order that the passes ask for. */
  private change(): boolean {
    const { random, count, current, trial } = this;
    const kind = random.below(10);
    const from = random.below(count);
    if (kind < 2) {
      const other = random.below(count);
      if (other === from) return false;
      this.low = Math.min(from, other);
      this.high = Math.max(from, other);
      for (let i = this.low; i <= this.high; i++) trial[i] = current[i]!;
      trial[from] = current[other]!;
      trial[other] = current[from]!;
    } else if (kind < 3) {
      this.low = from;
      this.high = Math.min(count - 1, from + 1 + random.below(Math.max(1, count >> 1)));
      for (let i = this.low; i <= this.high; i++) trial[i] = current[this.low + this.high - i]!;
    } else this.moveStretch(from, kind);
    return !this.sequence.ordered || this.keepsOrder();
  }

  /** Moves a stretch behind others; now and then turned round. */
  private moveStretch(from: number, kind: number): void {
    const { random, count, current, trial } = this;
    const longest = kind < 8 ? 3 : Math.max(1, count >> 1);
    const size = Math.min(1 + random.below(longest), count - from);
    const others = count - size;
    if (others === 0) {
      this.low = from;
      this.high = from - 1;
      return;
    }
    // The stretch goes before the passes that then follow it, at this place among the others.
    const to = random.below(others + 1);
    const turned = random.below(4) === 0;
    this.low = Math.min(from, to);
    this.high = Math.max(from, to) + size - 1;
    let at = this.low;
    const stretch = () => {
      for (let k = 0; k < size; k++) trial[at++] = current[from + (turned ? size - 1 - k : k)]!;
    };
    if (to <= from) {
      stretch();
      for (let i = to; i < from; i++) trial[at++] = current[i]!;
    } else {
      for (let i = from + size; i < to + size; i++) trial[at++] = current[i]!;
      stretch();
    }
  }

  private keepsOrder(): boolean {
    const { trial, low, high, count } = this;
    const { before } = this.sequence;
    for (let i = low; i < high; i++) for (let k = i + 1; k <= high; k++) if (before[trial[k]! * count + trial[i]!] === 1) return false;
    return true;
  }

  /** An order that always takes the pass with the shortest changeover next, or the one whose latest start comes first. */
  private nearest(): Int32Array {
    const { sequence, count, random } = this;
    const order = new Int32Array(count);
    const done = new Uint8Array(count);
    for (let i = 0; i < count; i++) {
      let chosen = -1;
      let least = Infinity;
      for (let pass = 0; pass < count; pass++) {
        if (done[pass] === 1 || !this.isFree(pass, done)) continue;
        const minutes = i === 0 ? sequence.rig[pass]! : sequence.change[order[i - 1]! * count + pass]!;
        const value = (sequence.urgent ? sequence.to[pass]! : minutes) + random.below(256) / 256;
        if (value >= least) continue;
        least = value;
        chosen = pass;
      }
      order[i] = chosen;
      done[chosen] = 1;
    }
    return order;
  }

  private isFree(pass: number, done: Uint8Array): boolean {
    const { before } = this.sequence;
    for (let other = 0; other < this.count; other++) if (before[other * this.count + pass] === 1 && done[other] === 0) return false;
    return true;
  }
}
