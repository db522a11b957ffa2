import jwt from 'jsonwebtoken';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PASSWORD, productionOf, someone, trialist } from '../factories/accounts';
import { smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

const DAY = 24 * 60 * 60 * 1000;
let open: OpenApp;
beforeAll(async () => {
  open = await openApp();
});
afterAll(() => open.close());

const cookieOf = (answer: request.Response) => String(answer.headers['set-cookie']).split(';')[0]!;

describe('an account', () => {
  it('is created, signed in to and out of, with a cookie that scripts cannot read', async () => {
    const agent = request.agent(open.app);
    expect((await agent.get('/api/session').expect(200)).body).toEqual({ user: null, trialAllowed: true });
    const made = await agent.post('/api/account').send({ email: 'Wren@Example.org', name: 'Wren', password: PASSWORD }).expect(201);
    expect(made.body.user).toMatchObject({ name: 'Wren', email: 'wren@example.org', trial: false });
    expect(String(made.headers['set-cookie'])).toMatch(/HttpOnly; SameSite=Lax/);
    expect((await agent.get('/api/session')).body.user.email).toBe('wren@example.org');
    await agent.delete('/api/session').expect(204);
    expect((await agent.get('/api/session')).body.user).toBeNull();
    await agent.post('/api/session').send({ email: 'wren@EXAMPLE.org', password: PASSWORD }).expect(200);
    await agent.get('/api/productions').expect(200);
  });

  it('is refused a second time with the same e-mail, whatever its letters', async () => {
    const { email } = await someone(open.app);
    const again = await request(open.app)
      .post('/api/account')
      .send({ email: email.toUpperCase(), name: 'Other', password: PASSWORD })
      .expect(409);
    expect(again.body.detail).toContain('Sign in instead');
  });

  it('says the same of a wrong password and an unknown e-mail', async () => {
    const { email } = await someone(open.app);
    const wrong = await request(open.app).post('/api/session').send({ email, password: 'not the password' }).expect(401);
    const unknown = await request(open.app).post('/api/session').send({ email: 'nobody@example.org', password: PASSWORD }).expect(401);
    expect(wrong.body).toEqual(unknown.body);
    expect(wrong.headers['content-type']).toContain('application/problem+json');
  });

  it('takes as long to refuse an unknown e-mail as a wrong password', async () => {
    const app = open.withSettings({ passwordCost: 10 });
    const { email } = await someone(app);
    const quickest = async (asked: string) => {
      const times: number[] = [];
      for (let attempt = 0; attempt < 4; attempt++) {
        const began = performance.now();
        await request(app).post('/api/session').send({ email: asked, password: 'not the password' }).expect(401);
        times.push(performance.now() - began);
      }
      return Math.min(...times);
    };
    const [known, unknown] = [await quickest(email), await quickest('nobody@example.org')];
    expect(unknown).toBeGreaterThan(known / 3);
  });

  it.each([
    [{ email: 'no address', name: 'X', password: PASSWORD }, 'email'],
    [{ email: 'x@example.org', name: 'X', password: 'short' }, 'password'],
    [{ email: 'x@example.org', name: 'X', password: 'ü'.repeat(37) }, 'password'],
    [{ email: 'x@example.org', name: ' ', password: PASSWORD }, 'name'],
    [{ email: 'x@example.org', name: 'X' }, 'password'],
  ])('is refused with what was expected: %j', async (body, path) => {
    const answer = await request(open.app).post('/api/account').send(body).expect(422);
    expect(answer.body.faults[0].path).toBe(path);
  });

  it('keeps no password that can be read', async () => {
    const { email } = await someone(open.app);
    const user = await open.db.users.findOne({ where: { email } });
    expect(user?.passwordHash).toMatch(/^\$2[ab]\$/);
    expect(JSON.stringify(user)).not.toContain(PASSWORD);
  });
});

describe('a new password', () => {
  it('ends the other sessions and keeps this one', async () => {
    const { agent, email } = await someone(open.app);
    const elsewhere = request.agent(open.app);
    await elsewhere.post('/api/session').send({ email, password: PASSWORD }).expect(200);
    await agent.put('/api/account/password').send({ current: 'something else', next: 'another long password' }).expect(403);
    await elsewhere.get('/api/productions').expect(200);
    await agent.put('/api/account/password').send({ current: PASSWORD, next: 'another long password' }).expect(204);
    await agent.get('/api/productions').expect(200);
    const refused = await elsewhere.get('/api/productions').expect(401);
    expect(refused.body.detail).toContain('Sign in again');
    await elsewhere.post('/api/session').send({ email, password: PASSWORD }).expect(401);
    await elsewhere.post('/api/session').send({ email, password: 'another long password' }).expect(200);
  });
});

describe('a token', () => {
  it('is worth nothing after sign-out, though it is not yet over', async () => {
    const { email } = await someone(open.app);
    const signedIn = await request(open.app).post('/api/session').send({ email, password: PASSWORD });
    const cookie = cookieOf(signedIn);
    await request(open.app).get('/api/productions').set('Cookie', cookie).expect(200);
    await request(open.app).delete('/api/session').set('Cookie', cookie).expect(204);
    await request(open.app).get('/api/productions').set('Cookie', cookie).expect(401);
  });

  it('runs out after thirty days', async () => {
    const later = await openApp();
    const { agent } = await someone(later.app);
    later.wait(29 * DAY);
    await agent.get('/api/productions').expect(200);
    later.wait(2 * DAY);
    await agent.get('/api/productions').expect(401);
    await later.close();
  });

  it('is refused when forged, unsigned or of another user', async () => {
    const { email } = await someone(open.app);
    const [wren, other] = [await open.db.users.findOne({ where: { email } }), await someone(open.app)];
    const session = await open.db.sessions.findOne({ where: { userId: wren!.id } });
    const claims = { sid: session!.id };
    const forged = [
      jwt.sign(claims, 'another secret that is long enough', { subject: wren!.id }),
      jwt.sign(claims, '', { subject: wren!.id, algorithm: 'none' }),
      jwt.sign(claims, open.context.config.jwtSecret, { subject: (await open.db.users.findOne({ where: { email: other.email } }))!.id }),
      jwt.sign({ sid: 'no id' }, open.context.config.jwtSecret, { subject: wren!.id }),
      jwt.sign(claims, open.context.config.jwtSecret, { subject: wren!.id, expiresIn: -1 }),
      'not a token',
    ];
    for (const token of forged) await request(open.app).get('/api/productions').set('Cookie', `redpoll=${token}`).expect(401);
    const good = jwt.sign(claims, open.context.config.jwtSecret, { subject: wren!.id });
    await request(open.app).get('/api/productions').set('Cookie', `redpoll=${good}`).expect(200);
  });
});

describe('a trial', () => {
  it('is kept by creating an account, with its productions, and its old token ends', async () => {
    const agent = request.agent(open.app);
    const began = await agent.post('/api/session/trial').expect(201);
    expect(began.body.user).toMatchObject({ email: null, trial: true });
    const again = await agent.post('/api/session/trial').expect(201);
    expect(again.body.user.id).toBe(began.body.user.id);
    const id = await productionOf(agent, smallProduction());
    const made = await agent.post('/api/account').send({ email: 'kept@example.org', name: 'Kept', password: PASSWORD }).expect(201);
    expect(made.body.user).toMatchObject({ id: began.body.user.id, trial: false });
    expect((await agent.get('/api/productions')).body.map((one: { id: string }) => one.id)).toEqual([id]);
    await request(open.app).get('/api/productions').set('Cookie', cookieOf(began)).expect(401);
  });

  it('is kept by signing in to an account that exists', async () => {
    const { agent: known, email } = await someone(open.app);
    const own = await productionOf(known, smallProduction());
    const agent = await trialist(open.app);
    const tried = await productionOf(agent, smallProduction());
    await agent.post('/api/session').send({ email, password: PASSWORD }).expect(200);
    const ids = (await agent.get('/api/productions')).body.map((one: { id: string }) => one.id);
    expect(ids.sort()).toEqual([own, tried].sort());
  });

  it.each([
    ['a name of another host', { Host: 'redpoll.example.org' }],
    ['a forwarded request', { 'X-Forwarded-For': '10.0.0.1' }],
    ['a forwarded host', { 'X-Forwarded-Host': 'redpoll.example.org' }],
    ['a Forwarded header', { Forwarded: 'for=10.0.0.1' }],
    ['a proxy that says Via', { Via: '1.1 proxy' }],
  ])('is not opened, nor gone on with, through %s', async (_how, headers) => {
    const app = open.withSettings({ publicHosts: ['redpoll.example.org'] });
    expect((await request(app).get('/api/session').set(headers).expect(200)).body.trialAllowed).toBe(false);
    const refused = await request(app).post('/api/session/trial').set(headers).expect(403);
    expect(refused.body.detail).toContain('create an account or sign in');
    const agent = await trialist(app);
    await agent.get('/api/productions').expect(200);
    await agent.get('/api/productions').set(headers).expect(401);
  });

  it('is not opened where the server listens beyond this machine', async () => {
    const app = open.withSettings({ host: '0.0.0.0' });
    await request(app).post('/api/session/trial').expect(403);
    expect((await request(app).get('/api/session')).body.trialAllowed).toBe(false);
  });

  it('has no password to change', async () => {
    const agent = await trialist(open.app);
    await agent.put('/api/account/password').send({ current: 'x', next: PASSWORD }).expect(409);
  });
});

describe('a request', () => {
  it('for a host that is not ours gets 421, before anything else', async () => {
    const answer = await request(open.app).get('/api/health').set('Host', 'evil.example.org').expect(421);
    expect(answer.body.title).toBe('Unknown host');
    for (const host of ['localhost:3000', '127.0.0.1', '[::1]:3000'])
      await request(open.app).get('/api/health').set('Host', host).expect(200);
    await request(open.withSettings({ publicHosts: ['redpoll.example.org'] }))
      .get('/api/health')
      .set('Host', 'Redpoll.Example.org:8443')
      .expect(200);
    for (const host of ['127.0.0.1.example.org', 'localhost.example.org', 'example.org:127.0.0.1'])
      await request(open.app).get('/api/health').set('Host', host).expect(421);
  });

  it.each([
    [{ 'Sec-Fetch-Site': 'cross-site' }, 403],
    [{ 'Sec-Fetch-Site': 'same-site' }, 403],
    [{ 'Sec-Fetch-Site': 'same-origin' }, 201],
    [{ 'Sec-Fetch-Site': 'none' }, 201],
    [{ Origin: 'https://evil.example.org' }, 403],
    [{ Origin: 'null' }, 403],
    [{ Origin: 'http://localhost:9', Host: 'localhost:10' }, 403],
    [{ Origin: 'http://localhost:9', Host: 'localhost:9' }, 201],
    [{}, 201],
  ])('that writes is taken from our own page only: %j → %i', async (headers, status) => {
    await request(open.app).post('/api/session/trial').set(headers).expect(status);
  });

  it('that only reads may come from anywhere', async () => {
    await request(open.app).get('/api/health').set('Sec-Fetch-Site', 'cross-site').expect(200);
  });

  it('that is no JSON, too much, or for nothing we have, is answered as a problem', async () => {
    const broken = await request(open.app).post('/api/session').set('Content-Type', 'application/json').send('{"email":').expect(400);
    expect(broken.headers['content-type']).toContain('application/problem+json');
    expect(broken.body.detail).not.toContain('JSON.parse');
    await request(open.app)
      .post('/api/session')
      .send({ email: 'x'.repeat(200_000) })
      .expect(413);
    await request(open.app).post('/api/session').type('form').send({ email: 'a@example.org', password: PASSWORD }).expect(422);
    const nowhere = await request(open.app).get('/api/nowhere').expect(404);
    expect(nowhere.body).toMatchObject({ status: 404, title: 'Not found' });
    expect(nowhere.body.detail.length).toBeGreaterThan(10);
    await request(open.app).get('/api/productions/%E0%A4%A').expect(400);
  });

  it('is answered under a policy that lets no foreign script in', async () => {
    const { headers } = await request(open.app).get('/api/health');
    expect(headers['content-security-policy']).toContain("default-src 'none'");
    expect(headers['content-security-policy']).not.toContain('unsafe');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['cache-control']).toBe('no-store');
    expect(headers['x-powered-by']).toBeUndefined();
  });
});

describe('too many attempts', () => {
  it('on one account are stopped without locking out another', async () => {
    const app = open.withSettings({ signInLimit: 3 });
    const { email } = await someone(open.app);
    for (let attempt = 0; attempt < 3; attempt++)
      await request(app).post('/api/session').send({ email, password: 'wrong again' }).expect(401);
    const stopped = await request(app).post('/api/session').send({ email, password: PASSWORD }).expect(429);
    expect(stopped.body.detail).toContain('quarter of an hour');
    const other = await someone(open.app);
    await request(app).post('/api/session').send({ email: other.email, password: PASSWORD }).expect(200);
  });

  it('to open trials are stopped', async () => {
    const app = open.withSettings({ newLimit: 2 });
    await request(app).post('/api/session/trial').expect(201);
    await request(app).post('/api/session/trial').expect(201);
    await request(app).post('/api/session/trial').expect(429);
  });
});
