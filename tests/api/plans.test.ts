import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Draft, PublishedPlan, Version } from '../../shared/contracts/api';
import type { MadePlan } from '../../shared/contracts/plan';
import { publishedCallsOf } from '../../server/resources/plans/published';
import { productionOf, someone, type Agent } from '../factories/accounts';
import { aChange, smallPlan, smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

let open: OpenApp;
let producer: Agent;
beforeAll(async () => {
  open = await openApp();
  producer = (await someone(open.app, 'Wren')).agent;
});
afterAll(() => open.close());

const draftOf = (outcome: MadePlan, inputRevision = 1) => ({ inputRevision, seed: 7, iterations: 100, outcome });
const store = async (id: string, outcome: MadePlan, revision = 1) => {
  const answer = await producer.post(`/api/productions/${id}/plans`).send(draftOf(outcome, revision)).expect(201);
  return answer.body as Draft;
};
const publish = async (id: string, plan: string) => {
  const answer = await producer.post(`/api/productions/${id}/versions`).send({ plan }).expect(201);
  return answer.body as Version;
};

describe('a draft', () => {
  it('is kept as it was made, and listed', async () => {
    const id = await productionOf(producer, smallProduction());
    const draft = await store(id, smallPlan());
    expect(draft).toMatchObject({ inputRevision: 1, seed: 7, iterations: 100, version: null, outcome: smallPlan() });
    const list = await producer.get(`/api/productions/${id}/plans`).expect(200);
    expect(list.body).toEqual([draft]);
    const one = await producer.get(`/api/productions/${id}/plans/${draft.id}`).expect(200);
    expect(one.body).toEqual(draft);
  });

  it('is refused where it breaks a rule, and the rule is told', async () => {
    const id = await productionOf(producer, smallProduction());
    const early = smallPlan(500);
    const answer = await producer.post(`/api/productions/${id}/plans`).send(draftOf(early)).expect(422);
    expect(answer.body.detail).toContain('breaks a rule');
    expect(answer.body.faults.length).toBeGreaterThan(0);
    expect((await producer.get(`/api/productions/${id}/plans`)).body).toEqual([]);
  });

  it('is refused where its cost is not what its items cost', async () => {
    const id = await productionOf(producer, smallProduction());
    const cheap = smallPlan();
    cheap.cost = { ...cheap.cost, total: 100, day: 70 };
    await producer.post(`/api/productions/${id}/plans`).send(draftOf(cheap)).expect(422);
  });

  it('is refused where its times are no times', async () => {
    const id = await productionOf(producer, smallProduction());
    const strange = smallPlan();
    strange.items[0]!.start = 'soon';
    strange.calls[0]!.arrive = '2027-02-30T10:00';
    await producer.post(`/api/productions/${id}/plans`).send(draftOf(strange)).expect(422);
  });

  it('is refused where the production has changed since', async () => {
    const id = await productionOf(producer, smallProduction());
    await producer
      .post(`/api/productions/${id}/changes`)
      .send({ changes: [aChange('songs', 'first', 'update', { tempo: 90 })] })
      .expect(200);
    const answer = await producer.post(`/api/productions/${id}/plans`).send(draftOf(smallPlan())).expect(409);
    expect(answer.body.detail).toContain('Solve again');
  });

  it('may say that no plan is possible', async () => {
    const id = await productionOf(producer, smallProduction());
    const outcome = {
      status: 'impossible',
      cost: null,
      bound: null,
      seconds: 0.1,
      items: [],
      calls: [],
      unplaced: ['first-lead'],
      odds: null,
      conflicts: [{ facts: ['people.una.windows', 'passes.first-lead'], says: 'Una is not free.' }],
    };
    const answer = await producer
      .post(`/api/productions/${id}/plans`)
      .send({ inputRevision: 1, seed: 1, iterations: 1, outcome })
      .expect(201);
    const plan = (answer.body as Draft).id;
    const refused = await producer.post(`/api/productions/${id}/versions`).send({ plan }).expect(422);
    expect(refused.body.detail).toContain('no plan');
  });
});

describe('publishing', () => {
  it('numbers versions, tells what changed, and keeps uid and sequence of each call', async () => {
    const id = await productionOf(producer, smallProduction());
    const rowId = async (key: string) => String((await open.db.rows.people.findOne({ where: { productionId: id, key } }))?.get('id'));
    const una = await rowId('una');
    expect(await publishedCallsOf(open.context, id, una)).toBeNull();

    const first = await publish(id, (await store(id, smallPlan())).id);
    expect(first).toMatchObject({ number: 1, by: 'Wren', note: null });
    expect(first.changes.map(({ person, kind }) => [person, kind])).toEqual([
      ['teo', 'new'],
      ['una', 'new'],
    ]);
    const before = (await publishedCallsOf(open.context, id, una))!;
    expect(before.version).toBe(1);
    expect(before.calls.map((call) => [call.arrive, call.sequence, call.status])).toEqual([['2027-03-08T11:00', 0, 'called']]);

    const second = await publish(id, (await store(id, smallPlan(660))).id);
    expect(second.number).toBe(2);
    expect(second.changes.map(({ person, kind, before: was, after }) => [person, kind, was?.arrive, after?.arrive])).toEqual([
      ['teo', 'moved', '2027-03-08T10:00', '2027-03-08T11:00'],
      ['una', 'moved', '2027-03-08T11:00', '2027-03-08T12:00'],
    ]);
    const after = (await publishedCallsOf(open.context, id, una))!;
    expect(after.calls.map((call) => [call.arrive, call.sequence, call.uid])).toEqual([['2027-03-08T12:00', 1, before.calls[0]!.uid]]);

    const third = await publish(id, (await store(id, smallPlan(660))).id);
    expect(third.changes.every(({ kind }) => kind === 'same')).toBe(true);
    expect((await publishedCallsOf(open.context, id, una))!.calls[0]).toMatchObject({ sequence: 1, uid: before.calls[0]!.uid });
  });

  it('keeps a cancelled call, with a higher sequence, and takes it up again under the same uid', async () => {
    const file = smallProduction();
    file.passes![1]!.priority = 'nice';
    const id = await productionOf(producer, file);
    const teoOnly = (): MadePlan => {
      const plan = smallPlan();
      return {
        ...plan,
        cost: { ...plan.cost, total: 635, call: 15, unplaced: 500 },
        bound: 150,
        items: plan.items.slice(0, 1),
        calls: plan.calls.slice(0, 1),
        unplaced: ['first-lead'],
      };
    };
    const una = String((await open.db.rows.people.findOne({ where: { productionId: id, key: 'una' } }))?.get('id'));
    const callNow = async () => (await publishedCallsOf(open.context, id, una))!.calls[0]!;
    await publish(id, (await store(id, smallPlan())).id);
    const { uid } = await callNow();
    const second = await publish(id, (await store(id, teoOnly())).id);
    expect(second.changes.find(({ person }) => person === 'una')).toMatchObject({ kind: 'cancelled', after: null });
    expect(await callNow()).toMatchObject({ uid, sequence: 1, status: 'cancelled', arrive: '2027-03-08T11:00' });
    await publish(id, (await store(id, teoOnly())).id);
    expect(await callNow()).toMatchObject({ uid, sequence: 1, status: 'cancelled' });
    const fourth = await publish(id, (await store(id, smallPlan())).id);
    expect(fourth.changes.find(({ person }) => person === 'una')).toMatchObject({ kind: 'new' });
    expect(await callNow()).toMatchObject({ uid, sequence: 2, status: 'called' });
  });

  it('publishes a plan once', async () => {
    const id = await productionOf(producer, smallProduction());
    const { id: plan } = await store(id, smallPlan());
    await publish(id, plan);
    const again = await producer.post(`/api/productions/${id}/versions`).send({ plan }).expect(409);
    expect(again.body.detail).toContain('version 1');
    expect(((await producer.get(`/api/productions/${id}/plans/${plan}`)).body as Draft).version).toBe(1);
  });

  it('gives every version a number of its own when two are published at once', async () => {
    const id = await productionOf(producer, smallProduction());
    const drafts = [await store(id, smallPlan()), await store(id, smallPlan(660)), await store(id, smallPlan(690))];
    const published = await Promise.all(drafts.map((draft) => publish(id, draft.id)));
    expect(published.map(({ number }) => number).sort()).toEqual([1, 2, 3]);
  });

  it('refuses a plan that no longer holds, and takes one that still does', async () => {
    const id = await productionOf(producer, smallProduction());
    const holds = await store(id, smallPlan());
    const breaks = await store(id, smallPlan(660));
    await producer
      .post(`/api/productions/${id}/changes`)
      .send({ changes: [aChange('people', 'una', 'update', { windows: [{ from: '2027-03-08T10:00', to: '2027-03-08T12:30' }] })] })
      .expect(200);
    const refused = await producer.post(`/api/productions/${id}/versions`).send({ plan: breaks.id }).expect(409);
    expect(refused.body.detail).toContain('no longer holds');
    expect((await publish(id, holds.id)).number).toBe(1);
  });

  it('keeps the production as it was for the sheets of that version', async () => {
    const id = await productionOf(producer, smallProduction());
    await publish(id, (await store(id, smallPlan())).id);
    await producer
      .post(`/api/productions/${id}/changes`)
      .send({ changes: [aChange('songs', 'first', 'update', { title: 'Another Name' })] })
      .expect(200);
    const version = await open.db.versions.findOne({ where: { productionId: id } });
    expect(version?.file.songs[0]?.title).toBe('Stone Ferry');
    const read = (await producer.get(`/api/productions/${id}/versions/1`).expect(200)).body as PublishedPlan;
    expect(read).toMatchObject({ number: 1, inputRevision: 1, outcome: smallPlan() });
    expect((await producer.get(`/api/productions/${id}`)).body.version).toBe(1);
    for (const strange of ['0', '2', 'x', '1e3', '-1', '99999999999999'])
      await producer.get(`/api/productions/${id}/versions/${strange}`).expect(404);
  });
});
