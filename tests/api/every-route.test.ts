import { randomUUID } from 'node:crypto';
import type { Express } from 'express';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Draft, NewLink, NewMember } from '../../shared/contracts/api';
import { roles } from '../../shared/contracts/roles';
import { writeProductionFile } from '../../shared/file/write';
import { memberOf, PASSWORD, productionOf, someone, type Agent } from '../factories/accounts';
import { aChange, smallPlan, smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

/** Every route is asked by everybody. The routes are read from the app itself: one without an expectation here fails. */

const everybody = [...roles, 'stranger', 'nobody'] as const;
type Who = (typeof everybody)[number];
/** Statuses for producer, engineer, assistant, musician, guest, stranger and nobody. */
type Statuses = [number, number, number, number, number, number, number];

interface Expectation {
  statuses: Statuses;
  /** Sends what would be right if whoever sends it may. */
  send: (who: Agent, name: Who) => request.Test | Promise<request.Response>;
}

const all = (status: number): Statuses => [status, status, status, status, status, status, status];
const signedIn = (status: number): Statuses => [status, status, status, status, status, status, 401];
const members = (status: number): Statuses => [status, status, status, status, status, 404, 401];
const crew = (status: number): Statuses => [status, status, status, 403, 403, 404, 401];
const desk = (status: number): Statuses => [status, status, 403, 403, 403, 404, 401];
const producer = (status: number): Statuses => [status, 403, 403, 403, 403, 404, 401];

let open: OpenApp;
let owner: Agent;
let id: string;
let calendar: string;
const agents = {} as Record<Who, Agent>;

/** A production of the same members; what is done to it touches no other test. */
async function sharedProduction(): Promise<string> {
  const production = await productionOf(owner, smallProduction());
  const users = await open.db.members.findAll({ where: { productionId: id } });
  for (const { userId, role } of users)
    if (role !== 'producer') await open.db.members.create({ productionId: production, userId, role, personId: null });
  return production;
}
const draftIn = async (production: string, start = 600) => {
  const answer = await owner
    .post(`/api/productions/${production}/plans`)
    .send({ inputRevision: 1, seed: 1, iterations: 1, outcome: smallPlan(start) });
  return (answer.body as Draft).id;
};

beforeAll(async () => {
  open = await openApp();
  owner = (await someone(open.app, 'Wren')).agent;
  id = await productionOf(owner, smallProduction());
  agents.producer = owner;
  for (const role of roles)
    if (role !== 'producer') agents[role] = await memberOf(open.app, owner, id, role, role === 'musician' ? 'una' : undefined);
  agents.stranger = (await someone(open.app, 'Stranger')).agent;
  agents.nobody = request.agent(open.app);
  const plan = await draftIn(id);
  await owner.post(`/api/productions/${id}/versions`).send({ plan }).expect(201);
  const link = await owner.post(`/api/productions/${id}/links`).send({ kind: 'calendar', person: 'una' }).expect(201);
  calendar = new URL((link.body as NewLink).address).pathname;
});
afterAll(() => open.close());

const within = (path: string) => `/api/productions/${id}${path}`;
const account = () => ({ email: `${randomUUID()}@example.org`, name: 'New', password: PASSWORD });

const expectations: Record<string, Expectation> = {
  'GET /api/health': { statuses: all(200), send: (who) => who.get('/api/health') },
  'GET /{*path}': { statuses: all(404), send: (who) => who.get('/no-such-file.txt') },
  'GET /api/starting-points': { statuses: all(200), send: (who) => who.get('/api/starting-points') },
  'GET /calendar/:token.ics': { statuses: all(200), send: (who) => who.get(calendar) },

  'GET /api/session': { statuses: all(200), send: (who) => who.get('/api/session') },
  // Signing in, out and up would change who is asking: these are sent by agents of their own.
  'POST /api/session': {
    statuses: all(401),
    send: () => request(open.app).post('/api/session').send({ email: 'nobody@example.org', password: PASSWORD }),
  },
  'POST /api/session/trial': { statuses: all(201), send: () => request(open.app).post('/api/session/trial') },
  'DELETE /api/session': { statuses: all(204), send: () => request(open.app).delete('/api/session') },
  'POST /api/account': { statuses: all(201), send: () => request(open.app).post('/api/account').send(account()) },
  'PUT /api/account/password': {
    statuses: signedIn(204),
    send: (who) => who.put('/api/account/password').send({ current: PASSWORD, next: PASSWORD }),
  },

  'GET /api/productions': { statuses: signedIn(200), send: (who) => who.get('/api/productions') },
  'POST /api/productions': {
    statuses: signedIn(201),
    send: (who) => who.post('/api/productions').send({ code: 'X', title: 'X', timezone: 'UTC' }),
  },
  'POST /api/productions/import': {
    statuses: signedIn(201),
    send: (who) => who.post('/api/productions/import').attach('file', Buffer.from(writeProductionFile(smallProduction())), 'x.yaml'),
  },
  'POST /api/invitations': {
    statuses: signedIn(200),
    send: async (who) => {
      const invited = await owner.post(within('/members')).send({ email: `${randomUUID()}@example.org`, role: 'guest' });
      const production = await sharedProduction();
      await open.db.invitations.update({ productionId: production }, { where: { id: (invited.body as NewMember).id } });
      return who.post('/api/invitations').send({ token: (invited.body as NewMember).address!.split('/').at(-1) });
    },
  },

  'GET /api/productions/:production': { statuses: members(200), send: (who) => who.get(within('')) },
  'DELETE /api/productions/:production': {
    statuses: producer(204),
    send: async (who) => who.delete(`/api/productions/${await sharedProduction()}`),
  },
  'GET /api/productions/:production/file.yaml': { statuses: crew(200), send: (who) => who.get(within('/file.yaml')) },
  'GET /api/productions/:production/history': { statuses: crew(200), send: (who) => who.get(within('/history')) },
  'POST /api/productions/:production/changes': {
    statuses: desk(200),
    send: (who) => who.post(within('/changes')).send({ changes: [aChange('songs', 'first', 'update', { click: true })] }),
  },
  'GET /api/productions/:production/plans': { statuses: crew(200), send: (who) => who.get(within('/plans')) },
  'GET /api/productions/:production/plans/:plan': {
    statuses: crew(200),
    send: async (who) => who.get(within(`/plans/${(await open.db.plans.findOne({ where: { productionId: id } }))!.id}`)),
  },
  'POST /api/productions/:production/plans': {
    statuses: desk(201),
    send: async (who) =>
      who
        .post(`/api/productions/${await sharedProduction()}/plans`)
        .send({ inputRevision: 1, seed: 1, iterations: 1, outcome: smallPlan() }),
  },
  'GET /api/productions/:production/versions': { statuses: members(200), send: (who) => who.get(within('/versions')) },
  'GET /api/productions/:production/versions/:number': { statuses: members(200), send: (who) => who.get(within('/versions/1')) },
  'POST /api/productions/:production/versions': {
    statuses: desk(201),
    send: async (who) => {
      const production = await sharedProduction();
      return who.post(`/api/productions/${production}/versions`).send({ plan: await draftIn(production) });
    },
  },

  'GET /api/productions/:production/members': { statuses: crew(200), send: (who) => who.get(within('/members')) },
  'POST /api/productions/:production/members': {
    statuses: producer(201),
    send: (who) => who.post(within('/members')).send({ email: `${randomUUID()}@example.org`, role: 'guest' }),
  },
  'PATCH /api/productions/:production/members/:member': {
    statuses: producer(200),
    send: async (who) => {
      const guest = await open.db.members.findOne({ where: { productionId: id, role: 'guest' } });
      return who.patch(within(`/members/${guest!.id}`)).send({ role: 'guest' });
    },
  },
  'DELETE /api/productions/:production/members/:member': {
    statuses: producer(204),
    send: async (who) => {
      const production = await sharedProduction();
      const guest = await open.db.members.findOne({ where: { productionId: production, role: 'guest' } });
      return who.delete(`/api/productions/${production}/members/${guest!.id}`);
    },
  },

  // A musician sees, makes and withdraws addresses of their own calendar only.
  'GET /api/productions/:production/links': { statuses: [200, 200, 200, 200, 403, 404, 401], send: (who) => who.get(within('/links')) },
  'POST /api/productions/:production/links': {
    statuses: [201, 201, 403, 201, 403, 404, 401],
    send: (who) => who.post(within('/links')).send({ kind: 'calendar', person: 'una' }),
  },
  'DELETE /api/productions/:production/links/:link': {
    statuses: [204, 204, 404, 404, 403, 404, 401],
    send: async (who) => {
      const link = await owner.post(within('/links')).send({ kind: 'calendar', person: 'teo' });
      return who.delete(within(`/links/${(link.body as NewLink).id}`));
    },
  },
  'GET /api/productions/:production/sheets/plan': {
    statuses: [200, 200, 200, 200, 403, 404, 401],
    send: (who) => who.get(within('/sheets/plan?version=1')),
  },
  'GET /api/productions/:production/sheets/run-sheet.pdf': {
    statuses: crew(200),
    send: (who) => who.get(within('/sheets/run-sheet.pdf?version=1&date=2027-03-08')),
  },
  'GET /api/productions/:production/sheets/call-sheet.pdf': {
    statuses: [200, 200, 200, 403, 403, 404, 401],
    send: (who) => who.get(within('/sheets/call-sheet.pdf?version=1&person=teo')),
  },
};

interface Layer {
  route?: { path: string; stack: { method?: string }[] };
  handle?: { stack?: Layer[] };
  /** Whether it is mounted at the root. */
  slash?: boolean;
}

/** Every route of the app, as `METHOD path`. A router mounted below a path would hide its own, so there may be none. */
function routesIn(layers: readonly Layer[]): string[] {
  return layers.flatMap((layer): string[] => {
    if (layer.route) {
      const { path, stack } = layer.route;
      return [...new Set(stack.map(({ method }) => `${(method ?? 'all').toUpperCase()} ${path}`))];
    }
    if (!layer.handle?.stack) return [];
    if (!layer.slash) throw new Error('a router is mounted below a path: write its paths out in full');
    return routesIn(layer.handle.stack);
  });
}
const routesOf = (app: Express) => routesIn((app.router as unknown as { stack: Layer[] }).stack);

describe('every route', () => {
  it('has an expectation here, and none is expected that is not there', () => {
    expect(routesOf(open.app).sort()).toEqual(Object.keys(expectations).sort());
  });

  for (const [route, { statuses, send }] of Object.entries(expectations))
    it(`${route} → ${everybody.map((who, at) => `${who} ${statuses[at]}`).join(', ')}`, async () => {
      for (const [at, who] of everybody.entries()) {
        const answer = await send(agents[who], who);
        expect([who, answer.status, answer.status >= 400 ? answer.body.detail : '']).toEqual([
          who,
          statuses[at],
          answer.status >= 400 ? expect.stringMatching(/\.$/) : '',
        ]);
        if (answer.status >= 400) expect(answer.headers['content-type']).toContain('application/problem+json');
      }
    });
});

describe('a production that is not theirs', () => {
  it('is answered to a stranger as one that does not exist', async () => {
    const ghost = randomUUID();
    for (const path of ['', '/file.yaml', '/history', '/plans', '/versions', '/members', '/links']) {
      const theirs = await agents.stranger.get(`/api/productions/${id}${path}`).expect(404);
      const none = await agents.stranger.get(`/api/productions/${ghost}${path}`).expect(404);
      const strange = await agents.stranger.get(`/api/productions/no-id${path}`).expect(404);
      expect(theirs.body).toEqual(none.body);
      expect(strange.status).toBe(404);
    }
  });
});
