import request from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Member, NewMember } from '../../shared/contracts/api';
import { memberOf, PASSWORD, productionOf, someone, trialist, type Agent } from '../factories/accounts';
import { smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

const DAY = 24 * 60 * 60 * 1000;
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

const members = async (agent = producer) => (await agent.get(`/api/productions/${id}/members`).expect(200)).body as Member[];
const add = (body: object, agent = producer) => agent.post(`/api/productions/${id}/members`).send(body);

describe('members', () => {
  it('are added by the e-mail of their account, as one of the people, and listed', async () => {
    const { email } = await someone(open.app, 'Una F.');
    const added = (await add({ email: email.toUpperCase(), role: 'musician', person: 'una' }).expect(201)).body as NewMember;
    expect(added).toMatchObject({ name: 'Una F.', role: 'musician', person: 'una', invited: false, address: null });
    expect((await members()).map(({ name, role, person, self }) => [name, role, person, self])).toEqual([
      ['Wren', 'producer', null, true],
      ['Una F.', 'musician', 'una', false],
    ]);
    await add({ email, role: 'engineer' }).expect(409);
  });

  it('are refused in a role or as a person that there is not', async () => {
    const { email } = await someone(open.app);
    expect((await add({ email, role: 'boss' }).expect(422)).body.faults[0].path).toBe('role');
    expect((await add({ email, role: 'guest', person: 'ghost' }).expect(422)).body.faults[0].path).toBe('person');
    expect(await members()).toHaveLength(1);
  });

  it('are no two accounts for one person', async () => {
    await memberOf(open.app, producer, id, 'musician', 'una');
    const { email } = await someone(open.app);
    await add({ email, role: 'musician', person: 'una' }).expect(409);
  });

  it('change role, and lose what the old one allowed at once', async () => {
    const engineer = await memberOf(open.app, producer, id, 'engineer');
    await engineer.get(`/api/productions/${id}/plans`).expect(200);
    const { id: member } = (await members()).find(({ role }) => role === 'engineer')!;
    const changed = await producer.patch(`/api/productions/${id}/members/${member}`).send({ role: 'guest', person: 'teo' }).expect(200);
    expect(changed.body).toMatchObject({ role: 'guest', person: 'teo' });
    await engineer.get(`/api/productions/${id}/plans`).expect(403);
    await producer.patch(`/api/productions/${id}/members/${member}`).send({ person: null }).expect(200);
    expect((await members()).find((one) => one.id === member)).toMatchObject({ role: 'guest', person: null });
  });

  it('are taken out, and the production is gone for them', async () => {
    const engineer = await memberOf(open.app, producer, id, 'engineer');
    const { id: member } = (await members()).find(({ role }) => role === 'engineer')!;
    await producer.delete(`/api/productions/${id}/members/${member}`).expect(204);
    await engineer.get(`/api/productions/${id}`).expect(404);
    await producer.delete(`/api/productions/${id}/members/${member}`).expect(404);
    expect((await engineer.get('/api/productions')).body).toEqual([]);
  });

  it('of another production cannot be touched through this one', async () => {
    const other = await productionOf(producer, smallProduction());
    const elsewhere = (await producer.get(`/api/productions/${other}/members`)).body[0].id as string;
    await producer.delete(`/api/productions/${id}/members/${elsewhere}`).expect(404);
    await producer.patch(`/api/productions/${id}/members/${elsewhere}`).send({ role: 'guest' }).expect(404);
    await producer.delete(`/api/productions/${id}/members/no-id`).expect(404);
  });
});

describe('the last producer', () => {
  it('can neither leave nor step down, until there is another', async () => {
    const self = (await members())[0]!.id;
    const path = `/api/productions/${id}/members/${self}`;
    expect((await producer.delete(path).expect(409)).body.detail).toContain('somebody else a producer');
    await producer.patch(path).send({ role: 'engineer' }).expect(409);
    await producer.patch(path).send({ role: 'producer', person: 'una' }).expect(200);
    await memberOf(open.app, producer, id, 'producer');
    await producer.patch(path).send({ role: 'engineer' }).expect(200);
    await producer.patch(path).send({ role: 'producer' }).expect(403);
  });

  it('stays also when two producers leave at the same moment', async () => {
    const second = await memberOf(open.app, producer, id, 'producer');
    const list = await members();
    const paths = list.map((one) => `/api/productions/${id}/members/${one.id}`);
    const answers = await Promise.all([producer.delete(paths[0]!), second.delete(paths[1]!)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([204, 409]);
    expect(await open.db.members.count({ where: { productionId: id, role: 'producer' } })).toBe(1);
  });
});

describe('an invitation', () => {
  const invite = async (email = 'new@example.org') =>
    (await add({ email, role: 'assistant', person: 'teo' }).expect(201)).body as NewMember;
  const tokenOf = (invited: NewMember) => invited.address!.split('/').at(-1)!;
  const accept = (agent: Agent, token: string) => agent.post('/api/invitations').send({ token });

  it('goes to whoever has no account, and is taken up once by who holds the address', async () => {
    const invited = await invite();
    expect(invited).toMatchObject({ invited: true, role: 'assistant', email: 'new@example.org' });
    expect((await members()).at(-1)).toMatchObject({ invited: true, person: 'teo' });
    const kept = await open.db.invitations.findByPk(invited.id);
    expect(kept?.tokenHash).not.toContain(tokenOf(invited));
    const { agent } = await someone(open.app, 'Newcomer');
    expect((await accept(agent, tokenOf(invited)).expect(200)).body).toEqual({ id });
    expect((await agent.get(`/api/productions/${id}`).expect(200)).body.role).toBe('assistant');
    const other = await someone(open.app);
    await accept(other.agent, tokenOf(invited)).expect(404);
  });

  it('asks for an account first', async () => {
    await request(open.app)
      .post('/api/invitations')
      .send({ token: tokenOf(await invite('a@example.org')) })
      .expect(401);
  });

  it('made anew ends the one before, and withdrawn it is worth nothing', async () => {
    const first = await invite('b@example.org');
    const second = await invite('b@example.org');
    const { agent } = await someone(open.app);
    await accept(agent, tokenOf(first)).expect(404);
    await producer.delete(`/api/productions/${id}/members/${second.id}`).expect(204);
    await accept(agent, tokenOf(second)).expect(404);
    await accept(agent, 'x'.repeat(43)).expect(404);
  });

  it('does not lower the role of who is a member already', async () => {
    const invited = await invite('c@example.org');
    await accept(producer, tokenOf(invited)).expect(200);
    expect((await members()).filter(({ self }) => self)[0]!.role).toBe('producer');
  });

  it('runs out after thirty days', async () => {
    const later = await openApp();
    const { agent } = await someone(later.app);
    const production = await productionOf(agent, smallProduction());
    const invited = (await agent.post(`/api/productions/${production}/members`).send({ email: 'late@example.org', role: 'guest' }))
      .body as NewMember;
    later.wait(31 * DAY);
    const late = await someone(later.app);
    await accept(late.agent, tokenOf(invited)).expect(404);
    await later.close();
  });
});

describe('a trial’s production', () => {
  it('is still its own when the trial becomes an account', async () => {
    const agent = await trialist(open.app);
    const tried = await productionOf(agent, smallProduction());
    await agent.post('/api/account').send({ email: 'later@example.org', name: 'Later', password: PASSWORD }).expect(201);
    expect((await agent.get(`/api/productions/${tried}`).expect(200)).body.role).toBe('producer');
  });
});
