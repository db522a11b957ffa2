import { describe, expect, it, vi } from 'vitest';
import type { ChangesResponse } from '../../shared/contracts/changes';
import { Refusal, Unreachable } from '../../src/api/http';
import { newId } from '../../src/stores/ids';
import { faultsAfter, revived, rowKey, rowsAfter, type Rows } from '../../src/stores/optimism';
import { type Batch, createOutbox } from '../../src/stores/outbox';

const change = (key: string): Batch => [{ id: newId(), resource: 'songs', key, op: 'update', fields: { title: key } }];
const answer = (revision: number): ChangesResponse => ({ revision, rows: [], overwritten: [] });

/** A queue whose server is told, batch by batch, what to answer. */
function outboxWith(...answers: (ChangesResponse | Error)[]) {
  const sent: string[] = [];
  const told = { answered: [] as number[], refused: [] as string[] };
  const outbox = createOutbox(
    (batch) => {
      sent.push(batch[0]?.key ?? '');
      const next = answers.shift() ?? new Unreachable();
      return next instanceof Error ? Promise.reject(next) : Promise.resolve(next);
    },
    {
      answered: ({ revision }) => told.answered.push(revision),
      refused: (batch, refusal) => told.refused.push(`${batch[0]?.key} ${refusal.status}`),
    },
  );
  return { outbox, sent, told };
}

describe('changes on their way to the server', () => {
  it('go one batch at a time, in order', async () => {
    const { outbox, sent, told } = outboxWith(answer(1), answer(2));
    outbox.put(change('a'));
    outbox.put(change('b'));
    expect(outbox.unsaved.value).toBe(2);
    await vi.waitUntil(() => outbox.unsaved.value === 0);
    expect(sent).toEqual(['a', 'b']);
    expect(told.answered).toEqual([1, 2]);
  });

  it('wait and go again by themselves where nobody answers, losing nothing', async () => {
    vi.useFakeTimers();
    try {
      const { outbox, sent } = outboxWith(new Unreachable(), new Refusal(503, 'busy'), answer(1), answer(2));
      outbox.put(change('a'));
      await vi.advanceTimersByTimeAsync(0);
      outbox.put(change('b'));
      await vi.advanceTimersByTimeAsync(0);
      expect(outbox.trouble.value).toBe('offline');
      expect(outbox.unsaved.value).toBe(2);
      await vi.advanceTimersByTimeAsync(60_000);
      expect(outbox.unsaved.value).toBe(0);
      expect(outbox.trouble.value).toBe('none');
      expect(sent.slice(-2)).toEqual(['a', 'b']);
    } finally {
      vi.useRealTimers();
    }
  });

  it('leave the queue where they are refused, and let the next one go', async () => {
    const { outbox, told } = outboxWith(new Refusal(409, 'taken'), answer(2));
    outbox.put(change('a'));
    outbox.put(change('b'));
    await vi.waitUntil(() => outbox.unsaved.value === 0);
    expect(told).toEqual({ refused: ['a 409'], answered: [2] });
  });

  it('wait for a sign-in where the session has ended', async () => {
    const { outbox, told } = outboxWith(new Refusal(401, 'sign in'), answer(1));
    outbox.put(change('a'));
    await vi.waitUntil(() => outbox.trouble.value === 'signed-out');
    expect(outbox.unsaved.value).toBe(1);
    await outbox.flush();
    expect(outbox.unsaved.value).toBe(0);
    expect(told.answered).toEqual([1]);
  });
});

describe('what a change does before the server has said so', () => {
  const rows: Rows = new Map([
    [
      rowKey('songs', 's1'),
      { resource: 'songs', key: 's1', revision: 1, position: 0, removed: false, fields: { id: 's1', title: 'Weir Song', key: 'D' } },
    ],
    [
      rowKey('songs', 's2'),
      { resource: 'songs', key: 's2', revision: 1, position: 1, removed: true, fields: { id: 's2', title: 'Tallow', key: 'Am' } },
    ],
  ]);

  it('creates at the end, updates, clears and removes, and leaves the rows it came from alone', () => {
    const after = rowsAfter(
      rows,
      [
        { resource: 'songs', key: 's3', op: 'create', fields: { title: 'Ropewalk' } },
        { resource: 'songs', key: 's1', op: 'update', fields: { title: 'Weir', key: null } },
      ],
      5,
    );
    expect(after.get(rowKey('songs', 's3'))).toMatchObject({ position: 2, fields: { id: 's3', title: 'Ropewalk' } });
    expect(after.get(rowKey('songs', 's1'))?.fields).toEqual({ id: 's1', title: 'Weir' });
    expect(rows.get(rowKey('songs', 's1'))?.fields).toHaveProperty('key', 'D');
    expect(rowsAfter(after, [{ resource: 'songs', key: 's1', op: 'remove', fields: {} }], 6).get(rowKey('songs', 's1'))?.removed).toBe(
      true,
    );
  });

  it('brings a removed row back instead of making it twice, with nothing left of what it had', () => {
    const edits = revived(rows, [{ resource: 'songs', key: 's2', op: 'create', fields: { title: 'New' } }]);
    expect(edits.map(({ op }) => op)).toEqual(['restore', 'update']);
    expect(rowsAfter(rows, edits, 2).get(rowKey('songs', 's2'))).toMatchObject({ removed: false, fields: { id: 's2', title: 'New' } });
  });

  it('names what the contract does not allow', () => {
    const faults = faultsAfter(rows, [{ resource: 'songs', key: 's1', op: 'update', fields: { rehearsal: 9 } }]);
    expect(faults).toEqual([{ path: 'songs.s1.rehearsal', expected: 'a rehearsal level from 0 to 4' }]);
    expect(faultsAfter(rows, [{ resource: 'songs', key: 's1', op: 'update', fields: { rehearsal: 3 } }])).toEqual([]);
  });
});
