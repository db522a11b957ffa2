import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { HistoryEntry, Snapshot } from '../../shared/contracts/api';
import type { ChangesResponse } from '../../shared/contracts/changes';
import { roles, type Role } from '../../shared/contracts/roles';
import { memberOf, productionOf, someone, type Agent } from '../factories/accounts';
import { aChange, smallPlan, smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

/** Every secret is a text or number that stands nowhere else, so that it can be looked for in whole answers. */
const SECRETS = {
  money: ['7301', '7302', '7303', '7304', '7305'],
  contacts: ['una-secret@example.org', '+351 700 111', 'nut allergy', 'step-free'],
  place: ['Rua Secreta 9', '+351 700 222', 'Hanne +351 700 333'],
  plans: ['2027-03-08T11:11', 'a private note'],
};

function secretProduction() {
  const file = smallProduction();
  file.production.place = { name: 'The Hall', address: 'Rua Secreta 9', phone: '+351 700 222' };
  file.production.late = 'Hanne +351 700 333';
  file.production.note = 'a private note';
  file.rooms[0]!.price = { day: 7301, overtimeHour: 7302 };
  file.gear[0]!.price = 7303;
  file.people[0] = {
    id: 'una',
    name: 'Una Fenn',
    email: 'una-secret@example.org',
    phone: '+351 700 111',
    food: 'nut allergy',
    access: 'step-free',
    windows: [{ from: '2027-03-08T11:11', to: '2027-03-08T17:00' }],
    fee: { waiting: 2, call: 7304, perHour: 7305 },
  };
  return file;
}

let open: OpenApp;
let id: string;
const agents = {} as Record<Role | 'una', Agent>;
beforeAll(async () => {
  open = await openApp();
  agents.producer = (await someone(open.app, 'Wren')).agent;
  id = await productionOf(agents.producer, secretProduction());
  for (const role of roles) if (role !== 'producer') agents[role] = await memberOf(open.app, agents.producer, id, role);
  agents.una = await memberOf(open.app, agents.producer, id, 'musician', 'una');
  const draft = { inputRevision: 1, seed: 1, iterations: 1, outcome: smallPlan(660) };
  const plan = await agents.producer.post(`/api/productions/${id}/plans`).send(draft).expect(201);
  await agents.producer.post(`/api/productions/${id}/versions`).send({ plan: plan.body.id }).expect(201);
});
afterAll(() => open.close());

const seen = (text: string) =>
  Object.entries(SECRETS).flatMap(([kind, words]) => (words.some((word) => text.includes(word)) ? [kind] : []));
const change = (who: Agent, ...changes: ReturnType<typeof aChange>[]) => who.post(`/api/productions/${id}/changes`).send({ changes });
const personOf = async (who: Agent, key: string) =>
  ((await who.get(`/api/productions/${id}`).expect(200)).body as Snapshot).rows.find((row) => row.resource === 'people' && row.key === key)!
    .fields;

describe('what a role reads', () => {
  it.each<[Role, string[]]>([
    ['producer', ['money', 'contacts', 'place', 'plans']],
    ['engineer', ['contacts', 'place', 'plans']],
    ['assistant', ['contacts', 'place', 'plans']],
    ['musician', ['place']],
    ['guest', []],
  ])('%s: in the rows, %j of what is private', async (role, kinds) => {
    expect(seen((await agents[role].get(`/api/productions/${id}`).expect(200)).text)).toEqual(kinds);
  });

  it.each<[Role, string[] | null]>([
    ['producer', ['money', 'contacts', 'place', 'plans']],
    ['engineer', ['contacts', 'place', 'plans']],
    ['assistant', ['contacts', 'place', 'plans']],
    ['musician', null],
    ['guest', null],
  ])('%s: in history and export, %j', async (role, kinds) => {
    for (const path of ['history', 'file.yaml']) {
      const answer = await agents[role].get(`/api/productions/${id}/${path}`);
      expect(answer.status).toBe(kinds ? 200 : 403);
      expect(seen(answer.text)).toEqual(kinds ?? []);
    }
  });

  it.each<[Role, string[] | null]>([
    ['producer', ['money', 'contacts', 'place', 'plans']],
    ['engineer', ['contacts', 'place', 'plans']],
    ['assistant', ['contacts', 'place', 'plans']],
    ['musician', ['place']],
    ['guest', null],
  ])('%s: in the production that a published version keeps for its sheets, %j', async (role, kinds) => {
    const answer = await agents[role].get(`/api/productions/${id}/sheets/plan?version=1`);
    expect(answer.status).toBe(kinds ? 200 : 403);
    expect(seen(answer.text)).toEqual(kinds ?? []);
    expect(seen((await agents[role].get(`/api/productions/${id}/versions/1`).expect(200)).text)).toEqual([]);
  });

  it('of their own row a musician reads contacts and times, but no fee', async () => {
    expect(await personOf(agents.una, 'una')).toEqual({
      id: 'una',
      name: 'Una Fenn',
      email: 'una-secret@example.org',
      phone: '+351 700 111',
      food: 'nut allergy',
      access: 'step-free',
      windows: [{ from: '2027-03-08T11:11', to: '2027-03-08T17:00' }],
    });
    expect(await personOf(agents.musician, 'una')).toEqual({ id: 'una', name: 'Una Fenn' });
  });

  it('hides unknown fields beside money from those who do not see money', async () => {
    await change(
      agents.producer,
      aChange('people', 'teo', 'update', {
        extra: [
          { path: ['fee', 'agent'], value: 7304 },
          { path: ['mood'], value: 'calm' },
        ],
      }),
    ).expect(200);
    expect(await personOf(agents.engineer, 'teo')).toMatchObject({ extra: [{ path: ['mood'], value: 'calm' }] });
    await change(agents.engineer, aChange('people', 'teo', 'update', { extra: [{ path: ['mood'], value: 'brisk' }] })).expect(200);
    expect((await personOf(agents.producer, 'teo')).extra).toEqual([
      { path: ['mood'], value: 'brisk' },
      { path: ['fee', 'agent'], value: 7304 },
    ]);
    await change(agents.engineer, aChange('people', 'teo', 'update', { extra: [{ path: ['fee', 'agent'], value: 1 }] })).expect(403);
  });
});

describe('what a role writes', () => {
  it.each<[Role, number]>([
    ['producer', 200],
    ['engineer', 200],
    ['assistant', 403],
    ['musician', 403],
    ['guest', 403],
  ])('%s: the songs → %i', async (role, status) => {
    await change(agents[role], aChange('songs', 'first', 'update', { tempo: 101 })).expect(status);
  });

  it('the engineer changes no money, in whatever form it is sent', async () => {
    for (const [resource, key, fields] of [
      ['people', 'una', { fee: { call: 1 } }],
      ['people', 'una', { fee: { perHour: null } }],
      ['rooms', 'hall', { price: { day: 1 } }],
      ['rooms', 'hall', { price: null }],
      ['gear', 'celesta', { price: 1 }],
    ] as const) {
      const answer = await change(agents.engineer, aChange(resource, key, 'update', fields)).expect(403);
      expect(answer.body.detail).toContain('Only the producer');
    }
    await change(agents.engineer, aChange('rooms', 'loft', 'create', { open: [], price: { day: 1 } })).expect(403);
  });

  it('an edit of what the engineer sees never clears what they do not see', async () => {
    const answer = await change(agents.engineer, aChange('people', 'una', 'update', { fee: { waiting: 3 } })).expect(200);
    expect((answer.body as ChangesResponse).rows[0]!.fields.fee).toEqual({ waiting: 3 });
    expect((await personOf(agents.producer, 'una')).fee).toEqual({ waiting: 3, call: 7304, perHour: 7305 });
    await change(agents.engineer, aChange('people', 'una', 'update', { fee: null })).expect(200);
    expect((await personOf(agents.producer, 'una')).fee).toEqual({ call: 7304, perHour: 7305 });
    await change(agents.producer, aChange('people', 'una', 'update', { fee: { waiting: 2, call: 7304, perHour: 7305 } })).expect(200);
  });

  it('tells the engineer in the history that money changed, but not which', async () => {
    const history = (await agents.engineer.get(`/api/productions/${id}/history?resource=people&key=una`).expect(200))
      .body as HistoryEntry[];
    expect(history[0]).toMatchObject({ op: 'update', after: { fee: { waiting: 2 } } });
  });

  it('a musician changes when they can come and what they need, of nobody but themselves', async () => {
    const windows = [{ from: '2027-03-08T12:00', to: '2027-03-08T16:00', sure: false }];
    await change(agents.una, aChange('people', 'una', 'update', { windows, food: 'vegan' })).expect(200);
    expect(await personOf(agents.producer, 'una')).toMatchObject({ windows, food: 'vegan' });
    await change(agents.una, aChange('people', 'teo', 'update', { windows })).expect(403);
    await change(agents.una, aChange('people', 'una', 'update', { limits: { day: 60 } })).expect(403);
    await change(agents.una, aChange('people', 'una', 'update', { position: 1 })).expect(403);
    await change(agents.una, aChange('people', 'una', 'update', { fee: { call: 1 } })).expect(403);
    await change(agents.una, aChange('people', 'una', 'remove')).expect(403);
    await change(agents.una, aChange('people', 'mine', 'create', {})).expect(403);
  });

  it('one refused change takes the whole batch with it', async () => {
    await change(
      agents.una,
      aChange('people', 'una', 'update', { food: 'none' }),
      aChange('songs', 'first', 'update', { tempo: 1 }),
    ).expect(403);
    expect((await personOf(agents.producer, 'una')).food).toBe('vegan');
  });
});
