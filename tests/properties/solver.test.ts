import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { effectivePasses } from '../../shared/planner/derive';
import { planProduction } from '../../shared/planner/plan';
import { toProblem } from '../../shared/planner/problem';
import { checkPlan } from '../../shared/solver/check/check';
import { Random } from '../../shared/solver/search/random';
import { SequenceSearch } from '../../shared/solver/search/sequence/anneal';
import { exactOrder } from '../../shared/solver/search/sequence/exact';
import { SequenceCost, sequenceOf } from '../../shared/solver/search/sequence/model';
import { orderProduction, permutations } from '../factories/order-production';
import { randomProduction } from '../factories/random-production';

const never = () => false;
const seeds = fc.integer({ min: 0, max: 1_000_000 });

describe('plans of larger random productions', () => {
  it('hold every rule and cost what they say, after long and short searches', () => {
    fc.assert(
      fc.property(seeds, fc.integer({ min: 10, max: 24 }), fc.integer({ min: 1, max: 1500 }), (seed, size, iterations) => {
        const file = randomProduction(seed, size);
        const outcome = planProduction(file, { seed, iterations, stop: never });
        if (outcome.cost === null) return;
        expect(checkPlan({ ...file, passes: effectivePasses(file) }, outcome).violations).toEqual([]);
      }),
      { numRuns: 80 },
    );
  });

  it('are the same for the same seed and number of iterations, whatever a clock says meanwhile', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const file = randomProduction(seed, 14);
        let clock = 0;
        const one = planProduction(file, { seed, iterations: 400, stop: never });
        const two = planProduction(structuredClone(file), { seed, iterations: 400, stop: never, now: () => (clock += 7) });
        expect({ ...two, seconds: 0 }).toEqual(one);
      }),
      { numRuns: 25 },
    );
  });

  it('do not get dearer when the search begins at a plan made before', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const file = randomProduction(seed, 12);
        const before = planProduction(file, { seed, iterations: 600, stop: never });
        if (before.cost === null) return;
        const after = planProduction(file, { seed: seed + 1, iterations: 10, stop: never, start: before.items });
        expect(after.cost?.total ?? Infinity).toBeLessThanOrEqual(before.cost.total + 1e-6);
      }),
      { numRuns: 40 },
    );
  });
});

describe('productions that are nothing but an order', () => {
  it('are solved exactly: no order of few passes is better', () => {
    fc.assert(
      fc.property(seeds, fc.boolean(), (seed, setups) => {
        const file = orderProduction(seed, 6, setups);
        const problem = toProblem(file);
        const sequence = sequenceOf(problem)!;
        const cost = new SequenceCost(sequence);
        const allowed = permutations(6).filter((order) =>
          order.every((b, i) => order.slice(i).every((a) => a === b || sequence.before[a * 6 + b] === 0)),
        );
        const least = Math.min(...allowed.map((order) => cost.of(Int32Array.from(order))));
        expect(cost.of(exactOrder(sequence, never)!)).toBeCloseTo(least, 6);
        const plan = planProduction(file, { seed, iterations: 50, stop: never });
        expect(plan).toMatchObject({ status: 'optimal' });
        expect(plan.cost!.waiting + plan.cost!.changeover).toBeCloseTo(least, 6);
      }),
      { numRuns: 60 },
    );
  });

  it('are annealed to the same cost where they are small enough to tell', () => {
    fc.assert(
      fc.property(seeds, fc.boolean(), (seed, setups) => {
        const problem = toProblem(orderProduction(seed, 9, setups));
        const sequence = sequenceOf(problem)!;
        const cost = new SequenceCost(sequence);
        const annealing: SequenceSearch = new SequenceSearch(sequence, new Random(seed), () => annealing.tries > 150_000);
        annealing.run(-1);
        expect(annealing.bestCost).toBeCloseTo(cost.of(annealing.best), 6);
        expect(annealing.bestCost).toBeCloseTo(cost.of(exactOrder(sequence, never)!), 6);
      }),
      { numRuns: 20 },
    );
  });
});
