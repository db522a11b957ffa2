import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { effectivePasses } from '../../shared/planner/derive';
import { planProduction } from '../../shared/planner/plan';
import { toProblem } from '../../shared/planner/problem';
import { lowerBound } from '../../shared/solver/bound/bound';
import { checkPlan } from '../../shared/solver/check/check';
import { explainImpossible } from '../../shared/solver/explain/explain';
import { search } from '../../shared/solver/search/search';
import { eventsStand } from '../../shared/solver/standing-events';
import { dropFact } from '../factories/drop-fact';
import { randomProduction } from '../factories/random-production';

const never = () => false;
const seeds = fc.integer({ min: 0, max: 1_000_000 });
const written = (file: ReturnType<typeof randomProduction>) => ({ ...file, passes: effectivePasses(file) });

describe('random productions', () => {
  it('get plans without a violation, or none', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const file = randomProduction(seed);
        const outcome = planProduction(file, { seed, iterations: 60, stop: never });
        if (outcome.cost !== null) expect(checkPlan(written(file), outcome).violations).toEqual([]);
      }),
      { numRuns: 120 },
    );
  });

  it('that can be planned are never called impossible, and never cost less than the bound', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const file = randomProduction(seed);
        const problem = toProblem(file);
        // What events alone spoil is no matter of the search.
        if (!eventsStand(problem)) return;
        const { score } = search(problem, { seed, iterations: 120, stop: never, bound: -1 });
        if (score.missing > 0) return;
        expect(explainImpossible(written(file), never)).toEqual([]);
        expect(lowerBound(problem)).toBeLessThanOrEqual(score.total + 1e-6);
      }),
      { numRuns: 120 },
    );
  });

  it('no longer have a clash when any one of its facts is dropped', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const [conflict] = explainImpossible(written(randomProduction(seed)), never);
        for (const fact of conflict?.facts ?? []) {
          // No file can say that listening takes no time and still approves.
          if (fact === 'rules.listen') continue;
          const others = explainImpossible(written(dropFact(written(randomProduction(seed)), fact)), never);
          expect(others.map(({ facts }) => facts)).not.toContainEqual(conflict!.facts);
        }
      }),
      { numRuns: 150 },
    );
  });
});
