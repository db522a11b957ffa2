import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Change, ChangesResponse, Row } from '../../shared/contracts/changes';
import type { HistoryEntry, Snapshot } from '../../shared/contracts/api';
import { memberOf, productionOf, someone, type Agent } from '../factories/accounts';
import { aChange, smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

let open: OpenApp;
let producer: Agent;
let id: string;
beforeAll(async () => {
  open = await openApp();
  producer = (await someone(open.app, 'Wren')).agent;
});
afterAll(() => open.close());
beforeEach(async () => {
  id = await productionOf(producer, smallProduction());
});

const send = (changes: Change[], agent = producer) => agent.post(`/api/productions/${id}/changes`).send({ changes });
const applied = async (changes: Change[], agent = producer) => (await send(changes, agent).expect(200)).body as ChangesResponse;
const refused = async (status: number, changes: Change[]) =>
  (await send(changes).expect(status)).body as { detail: string; faults: { path: string }[] };
const snapshot = async (since = '') => (await producer.get(`/api/productions/${id}${since}`).expect(200)).body as Snapshot;
const rowOf = async (resource: string, key: string): Promise<Row | undefined> =>
  (await snapshot()).rows.find((row) => row.resource === resource && row.key === key);

describe('a change', () => {
  it('creates, updates, clears, removes and brings back', async () => {
    const created = await applied([aChange('people', 'ida', 'create', { name: 'Ida', plays: ['flute'], limits: { day: 300 } })]);
    expect(created.revision).toBe(2);
    expect(created.rows).toEqual([
      {
        resource: 'people',
        key: 'ida',
        revision: 2,
        position: 2,
        removed: false,
        fields: { id: 'ida', name: 'Ida', plays: ['flute'], limits: { day: 300 } },
      },
    ]);
    const updated = await applied([aChange('people', 'ida', 'update', { name: 'Ida Moss', limits: null })]);
    expect(updated.rows[0]!.fields).toEqual({ id: 'ida', name: 'Ida Moss', plays: ['flute'] });
    expect((await applied([aChange('people', 'ida', 'remove')])).rows[0]).toMatchObject({ removed: true, revision: 4 });
    const back = await applied([aChange('people', 'ida', 'restore')]);
    expect(back.rows[0]).toMatchObject({ removed: false, revision: 5, fields: { name: 'Ida Moss', plays: ['flute'] } });
  });

  it('may create anew what was removed, and the old fields stay in the history', async () => {
    await applied([aChange('gear', 'celesta', 'remove')]);
    await applied([aChange('gear', 'celesta', 'create', { name: 'Another celesta' })]);
    expect((await rowOf('gear', 'celesta'))?.fields).toEqual({ id: 'celesta', name: 'Another celesta' });
    const history = (await producer.get(`/api/productions/${id}/history?resource=gear&key=celesta`)).body as HistoryEntry[];
    expect(history.map((entry) => [entry.revision, entry.op, entry.before?.name ?? null, entry.after?.name ?? null])).toEqual([
      [3, 'create', 'Celesta', 'Another celesta'],
      [2, 'remove', 'Celesta', null],
      [1, 'create', null, 'Celesta'],
    ]);
  });

  it('may not take away what others still name', async () => {
    const answer = await refused(422, [aChange('people', 'una', 'remove')]);
    expect(answer.faults.map((fault) => fault.path)).toEqual(['songs.first.parts.1.players.0', 'passes.first-lead.people.0']);
    await applied([
      aChange('parts', 'first/lead', 'update', { players: [] }),
      aChange('passes', 'first-lead', 'update', { people: null }),
      aChange('people', 'una', 'remove'),
    ]);
    const back = await refused(422, [aChange('passes', 'first-lead', 'update', { people: ['una'] })]);
    expect(back.faults[0]!.path).toBe('passes.first-lead.people.0');
  });

  it('keeps an unknown field that has a place of its own', async () => {
    const extra = [
      { path: ['constructor'], value: { __proto__: 1 } },
      { path: ['windows', 0, 'mood'], value: 'calm' },
    ];
    await applied([aChange('people', 'una', 'update', { extra })]);
    expect((await rowOf('people', 'una'))?.fields.extra).toEqual(extra);
  });

  it('of HTML is kept as the text it is', async () => {
    const title = '<img src=x onerror=alert(1)> & "quoted" \u202eשלום 雨 🎻';
    await applied([aChange('songs', 'first', 'update', { title })]);
    expect((await rowOf('songs', 'first'))?.fields.title).toBe(title);
  });
});

describe('a batch', () => {
  it('is applied whole or not at all', async () => {
    const before = await snapshot();
    await refused(422, [
      aChange('people', 'ida', 'create', { name: 'Ida' }),
      aChange('songs', 'first', 'update', { title: 'Renamed' }),
      aChange('songs', 'first', 'update', { tempo: -3 }),
    ]);
    expect(await snapshot()).toEqual(before);
    expect(await open.db.history.count({ where: { productionId: id, revision: 2 } })).toBe(0);
  });

  it('may build on itself, whatever the order of what names what', async () => {
    const { rows } = await applied([
      aChange('passes', 'new-lead', 'create', { song: 'new', parts: ['lead'], people: ['ida'], room: 'loft', minutes: 30 }),
      aChange('songs', 'new', 'create', { title: 'New' }),
      aChange('parts', 'new/lead', 'create', { players: ['ida'], mode: 'overdub' }),
      aChange('people', 'ida', 'create', {}),
      aChange('rooms', 'loft', 'create', { open: [] }),
    ]);
    expect(rows.map((row) => row.key)).toEqual(['new-lead', 'new', 'new/lead', 'ida', 'loft']);
    expect(new Set(rows.map((row) => row.revision))).toEqual(new Set([2]));
  });

  it('that makes and removes something in vain is taken, unless it never could have stood', async () => {
    await applied([aChange('people', 'ida', 'create', {}), aChange('people', 'ida', 'remove')]);
    expect((await rowOf('people', 'ida'))?.removed).toBe(true);
    await refused(422, [aChange('parts', 'ghost/lead', 'create', {}), aChange('parts', 'ghost/lead', 'remove')]);
    await refused(422, [aChange('setups', 'kit', 'create', { room: 'ghost' }), aChange('setups', 'kit', 'remove')]);
  });

  it('sent again is applied once and answered with the rows as they are', async () => {
    const changes = [aChange('people', 'ida', 'create', { name: 'Ida' }), aChange('songs', 'first', 'update', { tempo: 90 })];
    const first = await applied(changes);
    expect(await applied(changes)).toEqual(first);
    await applied([aChange('songs', 'first', 'update', { tempo: 95 })]);
    const late = await applied(changes);
    expect(late.revision).toBe(3);
    expect(late.rows.find((row) => row.resource === 'songs')?.fields.tempo).toBe(95);
    expect(await open.db.history.count({ where: { productionId: id, revision: 2 } })).toBe(2);
  });

  it('sent again together with something new applies only the new', async () => {
    const old = aChange('songs', 'first', 'update', { tempo: 90 });
    await applied([old]);
    await applied([aChange('songs', 'first', 'update', { tempo: 95 })]);
    const answer = await applied([old, aChange('songs', 'first', 'update', { capo: 2 })]);
    expect(answer.rows[0]!.fields).toMatchObject({ tempo: 95, capo: 2 });
  });

  it('with the same id twice applies it once', async () => {
    const change = aChange('people', 'ida', 'create', {});
    expect((await applied([change, change])).rows).toHaveLength(1);
  });

  it('of many people at once is applied one after another, none lost', async () => {
    const batches = Array.from({ length: 12 }, (_, at) => [aChange('people', `extra-${at}`, 'create', { name: `Extra ${at}` })]);
    const answers = await Promise.all(batches.map((batch) => applied(batch)));
    expect(answers.map(({ revision }) => revision).sort((a, b) => a - b)).toEqual(batches.map((_, at) => at + 2));
    const people = (await snapshot()).rows.filter((row) => row.key.startsWith('extra-'));
    expect(people).toHaveLength(12);
    expect(new Set(people.map((row) => row.position)).size).toBe(12);
  });

  it.each([
    [{ changes: [] }],
    [{}],
    [{ changes: [{ id: 'no uuid', resource: 'songs', key: 'first', op: 'update' }] }],
    [{ changes: [{ ...aChange('songs', 'first', 'update'), resource: 'users' }] }],
    [null],
  ])('that is none is refused: %j', async (body) => {
    const answer = await producer.post(`/api/productions/${id}/changes`).send(body as object);
    expect([400, 422]).toContain(answer.status);
    expect(answer.body.detail.length).toBeGreaterThan(10);
  });
});

describe('a song with its parts', () => {
  it('goes and comes back whole, in whatever order the batch names them', async () => {
    const before = await snapshot();
    const going = [
      aChange('songs', 'first', 'remove'),
      aChange('parts', 'first/drums', 'remove'),
      aChange('parts', 'first/lead', 'remove'),
    ];
    const passes = ['first-basics', 'first-lead'];
    await applied([...going, ...passes.map((key) => aChange('passes', key, 'remove'))]);
    await refused(422, [aChange('parts', 'first/drums', 'restore')]);
    await applied([
      aChange('parts', 'first/lead', 'restore'),
      aChange('parts', 'first/drums', 'restore'),
      ...passes.map((key) => aChange('passes', key, 'restore')),
      aChange('songs', 'first', 'restore'),
    ]);
    const bare = (rows: Row[]) => rows.map((row) => ({ ...row, revision: 0 }));
    expect(bare((await snapshot()).rows)).toEqual(bare(before.rows));
  });
});

describe('the order of a list', () => {
  it('is the server’s: new ones at the end, moved ones make room, and all that moved are told', async () => {
    await applied(['b', 'c', 'd'].map((key) => aChange('songs', key, 'create', {})));
    const { rows } = await applied([aChange('songs', 'd', 'update', { position: 1 })]);
    expect(rows.map((row) => [row.key, row.position])).toEqual([
      ['d', 1],
      ['b', 2],
      ['c', 3],
    ]);
    await applied([aChange('songs', 'first', 'update', { position: 99 })]);
    const songs = (await snapshot()).rows.filter((row) => row.resource === 'songs').sort((a, b) => a.position - b.position);
    expect(songs.map((row) => row.key)).toEqual(['d', 'b', 'c', 'first']);
  });

  it('of parts is within their song', async () => {
    await applied([
      aChange('songs', 'other', 'create', {}),
      aChange('parts', 'other/keys', 'create', {}),
      aChange('parts', 'first/keys', 'create', {}),
    ]);
    expect((await rowOf('parts', 'other/keys'))?.position).toBe(0);
    expect((await rowOf('parts', 'first/keys'))?.position).toBe(2);
  });
});

describe('two people on one field', () => {
  it('the later wins, is told what it overwrote, and the history keeps both', async () => {
    const engineer = await memberOf(open.app, producer, id, 'engineer');
    await applied([aChange('songs', 'first', 'update', { tempo: 90, capo: 1 }, { base: 1 })], engineer);
    const change = aChange('songs', 'first', 'update', { tempo: 100, capo: 1, meter: '3/4' }, { base: 1 });
    const { overwritten } = await applied([change]);
    expect(overwritten).toEqual([{ change: change.id, resource: 'songs', key: 'first', field: 'tempo', was: 90 }]);
    const history = (await producer.get(`/api/productions/${id}/history?resource=songs&key=first`)).body as HistoryEntry[];
    expect(history.slice(0, 2).map((entry) => [entry.by, entry.before?.tempo, entry.after?.tempo])).toEqual([
      ['Wren', 90, 100],
      ['A engineer', null, 90],
    ]);
  });

  it('is no matter where the change was made on the newest revision, or by the same person', async () => {
    const engineer = await memberOf(open.app, producer, id, 'engineer');
    await applied([aChange('songs', 'first', 'update', { tempo: 90 }, { base: 1 })], engineer);
    expect((await applied([aChange('songs', 'first', 'update', { tempo: 95 }, { base: 2 })])).overwritten).toEqual([]);
    expect((await applied([aChange('songs', 'first', 'update', { tempo: 96 }, { base: 2 })])).overwritten).toEqual([]);
  });
});

describe('what is new', () => {
  it('since a revision is only what was written after it, removals included', async () => {
    await applied([aChange('people', 'ida', 'create', {})]);
    await applied([aChange('gear', 'celesta', 'remove')]);
    const news = await snapshot('?since=2');
    expect(news.revision).toBe(3);
    expect(news.rows.map((row) => [row.key, row.removed])).toEqual([['celesta', true]]);
    expect((await snapshot('?since=3')).rows).toEqual([]);
    await producer.get(`/api/productions/${id}?since=soon`).expect(422);
  });
});

describe('passes', () => {
  it('stay derived until one is written, and an empty list of them stays one', async () => {
    const derived = await productionOf(producer, smallProduction({ passes: undefined }));
    const exportOf = async (of: string) => (await producer.get(`/api/productions/${of}/file.yaml`).expect(200)).text;
    expect(await exportOf(derived)).not.toContain('passes:');
    const none = await productionOf(producer, smallProduction({ passes: [] }));
    expect(await exportOf(none)).toContain('passes: []');
    await producer
      .post(`/api/productions/${derived}/changes`)
      .send({ changes: [aChange('passes', 'mine', 'create', { song: 'first', room: 'hall', minutes: 20 })] })
      .expect(200);
    expect(await exportOf(derived)).toContain('id: mine');
  });
});
