import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { MadePlan } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { readProductionFile } from '../../shared/file/read';
import { effectivePasses } from '../../shared/planner/derive';
import { planProduction } from '../../shared/planner/plan';
import { checkPlan } from '../../shared/solver/check/check';

const TEMPLATES = 'templates/productions';
const ITERATIONS = 2000;

function fileAt(path: string): ProductionFile {
  const read = readProductionFile(readFileSync(path, 'utf8'));
  if (!read.ok) expect.fail(JSON.stringify(read.faults));
  return read.file;
}

function planOf(file: ProductionFile): MadePlan {
  const plan = planProduction(file, { seed: 1, iterations: ITERATIONS, stop: () => false });
  if (plan.status !== 'optimal' && plan.status !== 'feasible') expect.fail(`${plan.status}: ${JSON.stringify(plan.conflicts)}`);
  return plan;
}

describe('every starting point can be planned', () => {
  it.each(readdirSync(TEMPLATES))('%s: all musts are placed, and the checker finds nothing', (name) => {
    const file = fileAt(`${TEMPLATES}/${name}`);
    const plan = planOf(file);
    const checked = checkPlan(file, plan);
    expect(checked.violations).toEqual([]);
    expect(checked.cost).toEqual(plan.cost);
    const priorities = new Map(effectivePasses(file).map((pass) => [pass.id, pass.priority]));
    expect(plan.unplaced.filter((id) => priorities.get(id) === 'must')).toEqual([]);
  });

  it('the nine players work in both rooms at once, and keep a reserve on every day of the large one', () => {
    const plan = planOf(fileAt(`${TEMPLATES}/nine-sluices.yaml`));
    const passes = plan.items.filter((item) => item.kind === 'pass');
    const together = passes.filter((a) => passes.some((b) => a.room === 'a' && b.room === 'b' && a.start < b.end && b.start < a.end));
    expect(together.length).toBeGreaterThan(0);
    const daysInA = (items: MadePlan['items']) => new Set(items.filter((item) => item.room === 'a').map((item) => item.start.slice(0, 10)));
    expect(daysInA(plan.items.filter((item) => item.kind === 'reserve'))).toEqual(daysInA(passes));
  });
});

describe('a file without passes', () => {
  it('is planned from the parts of its songs, and a double comes after its lead', () => {
    const file = fileAt('tests/fixtures/productions/derived.yaml');
    expect(file).not.toHaveProperty('passes');
    const plan = planOf(file);
    expect(checkPlan({ ...file, passes: effectivePasses(file) }, plan).violations).toEqual([]);
    const endOf = (id: string) => plan.items.find((item) => item.id === id)?.end ?? '';
    const startOf = (id: string) => plan.items.find((item) => item.id === id)?.start ?? '';
    expect(startOf('v1-double') >= endOf('v1-lead')).toBe(true);
    expect(plan.items.filter((item) => item.kind === 'pass').length + plan.unplaced.length).toBe(effectivePasses(file).length);
  });
});
