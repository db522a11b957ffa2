import { describe, expect, it } from 'vitest';
import type { Conflict } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { explainImpossible } from '../../shared/solver/explain/explain';
import { aPass, emptyProduction, hours } from '../factories/bare-production';
import { dropFact } from '../factories/drop-fact';
import { edited, lysFree, shifts } from '../factories/impossible';
import { impossibleAlone } from '../factories/impossible-alone';
import { impossibleTogether } from '../factories/impossible-together';

const explain = (file: ProductionFile): Conflict[] => explainImpossible(file, () => false);

describe('an impossible production', () => {
  it.each([...impossibleAlone, ...impossibleTogether])('%s', (_name, make, facts, says) => {
    const conflicts = explain(make());
    expect(conflicts.map((conflict) => conflict.facts)).toEqual([facts]);
    expect(conflicts[0]!.says).toMatch(says);
  });

  it.each([...impossibleAlone, ...impossibleTogether])(
    '%s: with any one of these facts dropped the clash is gone',
    (_name, make, facts) => {
      for (const fact of facts) expect(explain(dropFact(make(), fact)), `without ${fact}`).toEqual([]);
    },
  );
});

describe('several clashes', () => {
  it('are told one by one, no two about the same pass', () => {
    const file = lysFree(
      emptyProduction([
        aPass('horns', { people: ['lys'], minutes: 75 }),
        aPass('x', { pin: { at: '2027-03-08T12:00' } }),
        aPass('y', { pin: { at: '2027-03-08T12:30' } }),
        aPass('dawn', { pin: { at: '2027-03-08T06:00' } }),
      ]),
      hours('09', '13:00', '14:00'),
    );
    expect(explain(file).map(({ facts }) => facts)).toEqual([
      ['passes.horns', 'people.lys.windows'],
      ['passes.dawn.pin', 'rooms.a.open'],
      ['passes.x.pin', 'passes.y.pin'],
    ]);
  });
});

describe('nothing is claimed', () => {
  it('of a production that just fits', () => {
    const full = edited(emptyProduction([aPass('x', { minutes: 300 }), aPass('y', { minutes: 300 })]), shifts('10:00', '20:00'));
    expect(explain(full)).toEqual([]);
  });
  it('of passes that need not be placed', () => {
    expect(
      explain(emptyProduction([aPass('epic', { minutes: 900, priority: 'should' }), aPass('left', { minutes: 900, leftOut: true })])),
    ).toEqual([]);
  });
});
