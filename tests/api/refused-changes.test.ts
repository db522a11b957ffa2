import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Change } from '../../shared/contracts/changes';
import type { Snapshot } from '../../shared/contracts/api';
import { productionOf, someone, type Agent } from '../factories/accounts';
import { aChange, smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

let open: OpenApp;
let producer: Agent;
let id: string;
beforeAll(async () => {
  open = await openApp();
  producer = (await someone(open.app, 'Wren')).agent;
  id = await productionOf(producer, smallProduction());
});
afterAll(() => open.close());

const send = (changes: Change[]) => producer.post(`/api/productions/${id}/changes`).send({ changes });
/** Refused, and nothing was changed by it. */
const refused = async (status: number, changes: Change[]) => {
  const answer = await send(changes).expect(status);
  expect(((await producer.get(`/api/productions/${id}`)).body as Snapshot).revision).toBe(1);
  return answer.body as { detail: string; faults: { path: string }[] };
};

describe('a change', () => {
  it('names the row by its key: an id in the fields must be the same', async () => {
    const answer = await refused(422, [aChange('people', 'ida', 'create', { id: 'other' })]);
    expect(answer.faults[0]!.path).toBe('people.ida.id');
    await refused(422, [aChange('people', 'una', 'update', { id: 'unna' })]);
    await refused(422, [aChange('people', 'Not An Id', 'create', {})]);
    await refused(422, [aChange('changeovers', 'nonsense', 'create', { minutes: 3 })]);
    await refused(422, [aChange('parts', 'no-slash', 'create', {})]);
  });

  it.each<[string, Change, string]>([
    ['a wrong type', aChange('songs', 'first', 'update', { tempo: 'fast' }), 'songs.first.tempo'],
    ['an unknown field', aChange('songs', 'first', 'update', { colour: 'red' }), 'songs.first.colour'],
    ['an unknown field inside', aChange('people', 'una', 'update', { limits: { sleep: 8 } }), 'people.una.limits.sleep'],
    [
      'a window that ends before it starts',
      aChange('people', 'una', 'update', { windows: [{ from: '2027-03-08T12:00', to: '2027-03-08T11:00' }] }),
      'people.una.windows.0.to',
    ],
    [
      'a date that does not exist',
      aChange('events', 'tuner', 'create', { from: '2027-02-30T10:00', to: '2027-03-01T10:00' }),
      'events.tuner.from',
    ],
    ['minutes in the wrong order', aChange('passes', 'first-lead', 'update', { minutes: [60, 50, 70] }), 'passes.first-lead.minutes'],
    ['an unknown zone', aChange('production', 'production', 'update', { timezone: 'Mars/Base' }), 'production.timezone'],
    ['a required field cleared', aChange('passes', 'first-lead', 'update', { minutes: null }), 'passes.first-lead.minutes'],
    ['somebody unknown', aChange('passes', 'first-lead', 'update', { people: ['una', 'ghost'] }), 'passes.first-lead.people.1'],
    ['a part of another song', aChange('passes', 'first-lead', 'update', { parts: ['zither'] }), 'passes.first-lead.parts.0'],
    ['a room that is not there', aChange('songs', 'first', 'update', { room: 'attic' }), 'songs.first.room'],
    ['a part of no song', aChange('parts', 'ghost/lead', 'create', { mode: 'overdub' }), 'parts.ghost/lead.song'],
    [
      'a pass after itself',
      aChange('passes', 'first-lead', 'update', { after: [{ pass: 'first-lead' }] }),
      'passes.first-lead.after.0.pass',
    ],
    [
      'open hours that overlap',
      aChange('rooms', 'hall', 'update', {
        open: [
          { from: '2027-03-08T10:00', to: '2027-03-08T14:00' },
          { from: '2027-03-08T13:00', to: '2027-03-08T15:00' },
        ],
      }),
      'rooms.hall.open.1',
    ],
    [
      'a time that the clock skips',
      aChange('rooms', 'hall', 'update', { open: [{ from: '2027-03-28T01:30', to: '2027-03-28T09:00' }] }),
      'rooms.hall.open.0.from',
    ],
    ['a place that is no number', aChange('songs', 'first', 'update', { position: -1 }), 'songs.first.position'],
  ])('is refused for %s, with its path', async (_why, change, path) => {
    const answer = await refused(422, [change]);
    expect(answer.faults.map((fault) => fault.path)).toContain(path);
    expect(answer.detail).toMatch(/correct it and send it again\.$/i);
  });

  it('is refused where it does not fit what is there', async () => {
    await refused(409, [aChange('people', 'una', 'create', { name: 'Second' })]);
    await refused(409, [aChange('people', 'ghost', 'update', { name: 'Boo' })]);
    await refused(409, [aChange('people', 'ghost', 'remove')]);
    await refused(422, [aChange('production', 'production', 'remove')]);
    await refused(409, [aChange('production', 'production', 'create', { code: 'X', title: 'X', timezone: 'UTC' })]);
  });

  const deep = (levels: number): unknown => (levels === 0 ? 'x' : [deep(levels - 1)]);
  it.each<[string, unknown]>([
    ['at the place of a known field', { path: ['name'], value: 'Other' }],
    ['at the place of a known field further in', { path: ['limits', 'voice'], value: -5 }],
    ['at no place', { path: [], value: 1 }],
    ['at a place that no list has', { path: ['windows', 1e9, 'mood'], value: 1 }],
    ['that nests without end', { path: ['mood'], value: deep(300) }],
    ['with control characters', { path: ['mood'], value: { a: 'x\u0000' } }],
  ])('is refused for an unknown field %s', async (_why, field) => {
    const answer = await refused(422, [aChange('people', 'una', 'update', { extra: [field] })]);
    expect(answer.faults[0]!.path).toMatch(/^people\.una\.extra\.0\./);
  });

  it('is refused where it nests so deep that no stack could follow', async () => {
    const change = JSON.stringify(aChange('people', 'una', 'update', { extra: [{ path: ['mood'], value: 'HERE' }] }));
    const body = `{"changes":[${change.replace('"HERE"', '['.repeat(100_000) + ']'.repeat(100_000))}]}`;
    const answer = await producer.post(`/api/productions/${id}/changes`).type('json').send(body).expect(422);
    expect(answer.body.faults[0].path).toBe('people.una.extra.0.value');
  });
});
