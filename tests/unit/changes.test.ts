import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Row } from '../../shared/contracts/changes';
import { changesOf, fileOf, rowsOf } from '../../shared/domain/changes';
import { anyProduction } from '../factories/any-production';
import { smallProduction } from '../factories/productions';

const positioned = (file: Parameters<typeof rowsOf>[0]): Row[] => {
  const counts = new Map<string, number>();
  return rowsOf(file).map((row) => {
    const position = counts.get(row.resource) ?? 0;
    counts.set(row.resource, position + 1);
    return { ...row, revision: 1, position, removed: false };
  });
};

describe('a file as rows', () => {
  it('is the same file again, in whatever order the rows come', () => {
    fc.assert(
      fc.property(
        anyProduction.chain((file) =>
          fc.tuple(fc.constant(file), fc.shuffledSubarray(positioned(file), { minLength: positioned(file).length })),
        ),
        ([file, rows]) => {
          expect(fileOf(rows)).toEqual(file);
        },
      ),
      { numRuns: 100 },
    );
  });

  it('leaves out what was removed, and the parts of a removed song', () => {
    const rows = positioned(smallProduction()).map((row) => (row.resource === 'songs' ? { ...row, removed: true } : row));
    expect(fileOf(rows).songs).toEqual([]);
    expect(fileOf(rows).people).toHaveLength(2);
  });

  it('without its head is none', () => {
    expect(() => fileOf(positioned(smallProduction()).filter((row) => row.resource !== 'production'))).toThrow('head');
  });
});

describe('a file as changes', () => {
  it('creates every row once, each with an id of its own', () => {
    let next = 0;
    const changes = changesOf(smallProduction(), () => `id-${next++}`);
    expect(new Set(changes.map(({ id }) => id)).size).toBe(changes.length);
    expect(changes.map(({ op, resource, key }) => `${op} ${resource} ${key}`)).toEqual([
      'create production production',
      'create rooms hall',
      'create people una',
      'create people teo',
      'create gear celesta',
      'create songs first',
      'create parts first/drums',
      'create parts first/lead',
      'create passes first-basics',
      'create passes first-lead',
    ]);
  });
});
