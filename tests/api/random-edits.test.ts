import { randomUUID } from 'node:crypto';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Change } from '../../shared/contracts/changes';
import type { HistoryEntry, Snapshot } from '../../shared/contracts/api';
import { fileOf } from '../../shared/domain/changes';
import { readProductionFile } from '../../shared/file/read';
import { productionOf, someone, type Agent } from '../factories/accounts';
import { smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

/** Edits as people, undo and queues may send them: some right, some not, some twice, some against each other. */

const people = fc.constantFrom('una', 'teo', 'ida');
const some = <Value>(value: fc.Arbitrary<Value>) => fc.option(value, { nil: null });
const edit = fc.oneof(
  fc.record({
    resource: fc.constant('people' as const),
    key: people,
    fields: fc.record({ name: some(fc.string({ maxLength: 8 })), away: some(fc.integer({ min: -1, max: 60 })) }, { requiredKeys: [] }),
  }),
  fc.record({
    resource: fc.constant('songs' as const),
    key: fc.constantFrom('first', 'second'),
    fields: fc.record({ tempo: some(fc.integer({ min: 0, max: 200 })), position: fc.integer({ min: 0, max: 3 }) }, { requiredKeys: [] }),
  }),
  fc.record({
    resource: fc.constant('parts' as const),
    key: fc.constantFrom('first/drums', 'first/lead', 'second/lead'),
    fields: fc.record(
      { players: some(fc.array(people, { maxLength: 2 })), position: fc.integer({ min: 0, max: 2 }) },
      { requiredKeys: [] },
    ),
  }),
  fc.record({
    resource: fc.constant('passes' as const),
    key: fc.constantFrom('first-basics', 'first-lead', 'extra'),
    fields: fc.record(
      {
        minutes: fc.constantFrom(30, [10, 20, 30], [30, 20, 10], null),
        people: some(fc.array(people, { maxLength: 2 })),
        after: some(fc.constantFrom([{ pass: 'first-basics' }], [{ pass: 'extra', lag: 5 }])),
        room: fc.constantFrom('hall', 'attic', null),
      },
      { requiredKeys: [] },
    ),
  }),
);
const op = fc.constantFrom('create', 'update', 'update', 'update', 'remove', 'restore');
const change = fc.tuple(edit, op, some(fc.integer({ min: 0, max: 9 }))).map(([one, how, base]): Change => ({
  id: randomUUID(),
  resource: one.resource,
  key: one.key,
  op: how as Change['op'],
  fields: how === 'create' || how === 'update' ? one.fields : {},
  ...(base === null ? {} : { base }),
}));
const batches = fc.array(fc.tuple(fc.array(change, { minLength: 1, maxLength: 3 }), fc.boolean()), { minLength: 6, maxLength: 14 });

let open: OpenApp;
let producer: Agent;
beforeAll(async () => {
  open = await openApp();
  producer = (await someone(open.app)).agent;
});
afterAll(() => open.close());

/** What the history says that every row is now. */
function replayed(history: HistoryEntry[]): Map<string, Record<string, unknown> | null> {
  const rows = new Map<string, Record<string, unknown> | null>();
  for (const { resource, key, op: how, after } of history) {
    const at = `${resource} ${key}`;
    const known = rows.get(at) ?? {};
    if (how === 'remove') rows.set(at, null);
    else if (how !== 'update') rows.set(at, after);
    else
      rows.set(
        at,
        Object.fromEntries(Object.entries({ ...known, ...after }).filter(([name, value]) => value !== null && name !== 'position')),
      );
  }
  return rows;
}

describe('whatever is sent', () => {
  it('is taken whole or refused, never breaks the production, and stands in the history', async () => {
    const answers = { taken: 0, refused: 0 };
    await fc.assert(
      fc.asyncProperty(batches, async (sent) => {
        const id = await productionOf(producer, smallProduction());
        let revision = 1;
        let taken = 0;
        for (const [changes, twice] of sent)
          for (let times = twice ? 2 : 1; times > 0; times--) {
            const answer = await producer.post(`/api/productions/${id}/changes`).send({ changes });
            expect([200, 409, 422]).toContain(answer.status);
            answers[answer.status === 200 ? 'taken' : 'refused']++;
            if (answer.status === 200) {
              expect([revision, revision + 1]).toContain(answer.body.revision);
              taken += answer.body.revision - revision;
              revision = answer.body.revision;
            }
          }
        const snapshot = (await producer.get(`/api/productions/${id}`).expect(200)).body as Snapshot;
        expect(snapshot.revision).toBe(1 + taken);
        const source = (await producer.get(`/api/productions/${id}/file.yaml`).expect(200)).text;
        const read = readProductionFile(source);
        expect(read.ok ? read.file : read.faults).toEqual(fileOf(snapshot.rows));

        const history = (await producer.get(`/api/productions/${id}/history`).expect(200)).body as HistoryEntry[];
        const now = replayed([...history].reverse());
        for (const row of snapshot.rows)
          expect([row.key, now.get(`${row.resource} ${row.key}`)]).toEqual([row.key, row.removed ? null : row.fields]);
      }),
      { numRuns: 12 },
    );
    // Otherwise nothing was shown; how many of each depends on the seed.
    expect(Math.min(answers.taken, answers.refused)).toBeGreaterThan(0);
  }, 120_000);
});
