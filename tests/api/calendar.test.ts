import ICAL from 'ical.js';
import nodeIcal from 'node-ical';
import request from 'supertest';
import { Temporal } from 'temporal-polyfill';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Draft, Link, NewLink } from '../../shared/contracts/api';
import type { MadePlan } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { memberOf, productionOf, someone, type Agent } from '../factories/accounts';
import { aChange, smallPlan, smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';

let open: OpenApp;
let producer: Agent;
beforeAll(async () => {
  open = await openApp();
  producer = (await someone(open.app, 'Wren')).agent;
});
afterAll(() => open.close());

async function publish(production: string, outcome: MadePlan, inputRevision = 1): Promise<void> {
  const answer = await producer
    .post(`/api/productions/${production}/plans`)
    .send({ inputRevision, seed: 1, iterations: 1, outcome })
    .expect(201);
  await producer
    .post(`/api/productions/${production}/versions`)
    .send({ plan: (answer.body as Draft).id })
    .expect(201);
}

async function link(agent: Agent, production: string, person: string): Promise<NewLink> {
  const answer = await agent.post(`/api/productions/${production}/links`).send({ kind: 'calendar', person }).expect(201);
  return answer.body as NewLink;
}
const pathOf = (made: NewLink) => new URL(made.address).pathname;

/** Whoever has the address: no cookie, no session. */
const stranger = () => request(open.app);
const read = async (path: string) => (await stranger().get(path).expect(200)).text;

interface Seen {
  uid: string;
  sequence: number;
  stamp: string;
  status: string;
  start: number;
  end: number;
  description: string;
}
function eventsOf(text: string): Seen[] {
  const calendar = new ICAL.Component(ICAL.parse(text));
  for (const zone of calendar.getAllSubcomponents('vtimezone')) ICAL.TimezoneService.register(zone);
  return calendar.getAllSubcomponents('vevent').map((component) => {
    const event = new ICAL.Event(component);
    return {
      uid: event.uid,
      sequence: event.sequence,
      stamp: String(component.getFirstPropertyValue('dtstamp')),
      status: String(component.getFirstPropertyValue('status')),
      start: event.startDate.toJSDate().getTime(),
      end: event.endDate.toJSDate().getTime(),
      description: event.description,
    };
  });
}
const instant = (wall: string, zone: string) => Temporal.PlainDateTime.from(wall).toZonedDateTime(zone).epochMilliseconds;

describe('the calendar of a person', () => {
  it('is empty and valid before anything is published', async () => {
    const production = await productionOf(producer, smallProduction());
    const text = await read(pathOf(await link(producer, production, 'teo')));
    expect(eventsOf(text)).toEqual([]);
    expect(text).toContain('NAME:Two Bridges');
  });

  it('equals the published calls of that person and shows nobody else’s', async () => {
    const production = await productionOf(producer, smallProduction());
    await publish(production, smallPlan());
    const text = await read(pathOf(await link(producer, production, 'teo')));
    const [call] = smallPlan().calls;
    expect(eventsOf(text)).toMatchObject([
      { sequence: 0, status: 'CONFIRMED', start: instant(call!.arrive, 'Europe/Lisbon'), end: instant(call!.release, 'Europe/Lisbon') },
    ]);
    const other = Object.values(nodeIcal.sync.parseICS(text)).filter((one) => one?.type === 'VEVENT');
    expect(other).toMatchObject([{ summary: 'Two Bridges: call' }]);
    const words = text
      .replaceAll('\r\n ', '')
      .split('\r\n')
      .filter((line) => /^(SUMMARY|DESCRIPTION|LOCATION|NAME|X-)/.test(line));
    for (const foreign of ['una', 'Una', '555', 'voice', '90', '400']) expect(words.join('\n')).not.toContain(foreign);
  });

  it.each([
    ['Europe/Lisbon', '2027-03-28'],
    ['America/New_York', '2027-03-14'],
    ['Australia/Lord_Howe', '2027-04-04'],
    ['Asia/Kathmandu', '2027-03-28'],
  ])('means the same moments as the plan in %s in the night of %s', async (timezone, date) => {
    const move = (wall: string) => wall.replace('2027-03-08', date);
    const small = smallProduction();
    const file: ProductionFile = {
      ...small,
      production: { ...small.production, timezone },
      rooms: [{ ...small.rooms[0]!, open: [{ from: `${date}T00:00`, to: `${date}T23:00` }] }],
    };
    const plan = smallPlan(240);
    const moved: MadePlan = {
      ...plan,
      items: plan.items.map((item) => ({ ...item, start: move(item.start), end: move(item.end) })),
      calls: plan.calls.map((call) => ({
        ...call,
        date,
        arrive: move(call.arrive),
        ready: move(call.ready),
        release: move(call.release),
      })),
      odds: { musts: 1, days: [] },
    };
    const production = await productionOf(producer, file);
    await publish(production, moved);
    const text = await read(pathOf(await link(producer, production, 'una')));
    const call = moved.calls.find((one) => one.person === 'una')!;
    expect(eventsOf(text)).toMatchObject([{ start: instant(call.arrive, timezone), end: instant(call.release, timezone) }]);
    expect(text).toContain(`DTSTART;TZID=${timezone}:${date.replaceAll('-', '')}T050000`);
  });

  it('raises the sequence of a call that moved, and of no other', async () => {
    const production = await productionOf(producer, smallProduction());
    const teo = pathOf(await link(producer, production, 'teo'));
    const una = pathOf(await link(producer, production, 'una'));
    await publish(production, smallPlan());
    const [before] = eventsOf(await read(teo));
    const [unaBefore] = eventsOf(await read(una));

    // The voice an hour later, the drums as they were.
    open.wait(60_000);
    const later = smallPlan();
    const shift = { start: '2027-03-08T12:00', end: '2027-03-08T13:00' };
    later.items[1] = { ...later.items[1]!, ...shift };
    later.calls[1] = { ...later.calls[1]!, arrive: shift.start, ready: shift.start, release: shift.end };
    await publish(production, later);

    expect(eventsOf(await read(teo))).toEqual([before]);
    const [unaAfter] = eventsOf(await read(una));
    expect(unaAfter).toMatchObject({ uid: unaBefore!.uid, sequence: 1, start: instant(shift.start, 'Europe/Lisbon') });
    expect(unaAfter!.stamp > unaBefore!.stamp).toBe(true);
  });

  it('stamps a call anew when its words change, without raising the sequence', async () => {
    const production = await productionOf(producer, smallProduction());
    const teo = pathOf(await link(producer, production, 'teo'));
    await publish(production, smallPlan());
    const [before] = eventsOf(await read(teo));
    open.wait(60_000);
    await producer
      .post(`/api/productions/${production}/changes`)
      .send({ changes: [aChange('songs', 'first', 'update', { title: 'Stone Ferry, slower' })] })
      .expect(200);
    await publish(production, smallPlan(), 2);
    const [after] = eventsOf(await read(teo));
    expect(after).toMatchObject({ uid: before!.uid, sequence: 0, description: expect.stringContaining('Stone Ferry, slower') });
    expect(after!.stamp > before!.stamp).toBe(true);
  });

  it('keeps a call that is gone as a cancelled one', async () => {
    const production = await productionOf(
      producer,
      smallProduction({ passes: smallProduction().passes!.map((pass) => ({ ...pass, priority: 'nice' })) }),
    );
    const una = pathOf(await link(producer, production, 'una'));
    await publish(production, smallPlan());
    const [before] = eventsOf(await read(una));
    const without: MadePlan = {
      ...smallPlan(),
      items: smallPlan().items.slice(0, 1),
      calls: smallPlan().calls.slice(0, 1),
      unplaced: ['first-lead'],
      cost: { ...smallPlan().cost, total: 635, call: 15, unplaced: 500 },
    };
    await publish(production, without);
    expect(eventsOf(await read(una))).toMatchObject([{ uid: before!.uid, sequence: 1, status: 'CANCELLED', start: before!.start }]);
  });
});

describe('a private address', () => {
  it('answers 304 to who has the newest already, by tag or by date', async () => {
    const production = await productionOf(producer, smallProduction());
    await publish(production, smallPlan());
    const path = pathOf(await link(producer, production, 'teo'));
    // Each request of the test listens on another port; a calendar keeps to one address.
    const get = () => stranger().get(path).set('Host', '127.0.0.1:3000');
    const first = await get().expect(200);
    expect(first.headers['content-type']).toBe('text/calendar; charset=utf-8');
    expect(first.headers['cache-control']).toBe('private, no-cache');
    const { etag, 'last-modified': changed } = first.headers as { etag: string; 'last-modified': string };
    const same = await get().set('If-None-Match', `"other", W/${etag}`).expect(304);
    expect([same.text, same.headers.etag, same.headers['cache-control']]).toEqual(['', etag, 'private, no-cache']);
    await get().set('If-None-Match', etag).set('Cache-Control', 'no-cache').expect(304);
    await get().set('If-Modified-Since', changed).expect(304);
    await get().set('If-None-Match', '"other"').set('If-Modified-Since', changed).expect(200);
    open.wait(60_000);
    await publish(production, smallPlan(660));
    await get().set('If-None-Match', etag).expect(200);
  });

  it('is long, is told once and kept as a hash only', async () => {
    const production = await productionOf(producer, smallProduction());
    const made = await link(producer, production, 'teo');
    const token = /\/calendar\/([\w-]+)\.ics$/.exec(made.address)?.[1] ?? '';
    expect(Buffer.from(token, 'base64url')).toHaveLength(32);
    const listed = await producer.get(`/api/productions/${production}/links`).expect(200);
    expect(listed.body).toMatchObject([{ id: made.id, kind: 'calendar', person: 'teo', revokedAt: null, lastUsedAt: null }]);
    expect(JSON.stringify(listed.body)).not.toContain(token);
    const stored = await open.db.links.findAll({ where: { productionId: production }, raw: true });
    expect(JSON.stringify(stored)).not.toContain(token);
  });

  it('answers alike when it was withdrawn, never was, or is nonsense', async () => {
    const production = await productionOf(producer, smallProduction());
    const made = await link(producer, production, 'teo');
    await producer.delete(`/api/productions/${production}/links/${made.id}`).expect(204);
    await producer.delete(`/api/productions/${production}/links/${made.id}`).expect(204);
    const answers = await Promise.all(
      [pathOf(made), `/calendar/${'A'.repeat(43)}.ics`, '/calendar/x.ics', '/calendar/%F0%9F%8F%AE.ics'].map((path) =>
        stranger().get(path),
      ),
    );
    for (const answer of answers) {
      expect(answer.status).toBe(404);
      expect(answer.text).toBe(answers[0]!.text);
    }
  });

  it('notes its use once an hour, and reading changes nothing else', async () => {
    const production = await productionOf(producer, smallProduction());
    const made = await link(producer, production, 'teo');
    const used = async () => ((await producer.get(`/api/productions/${production}/links`)).body as Link[])[0]!.lastUsedAt;
    await read(pathOf(made));
    const first = await used();
    expect(first).not.toBeNull();
    open.wait(59 * 60_000);
    await read(pathOf(made));
    expect(await used()).toBe(first);
    open.wait(2 * 60_000);
    await read(pathOf(made));
    expect(Date.parse((await used())!)).toBeGreaterThan(Date.parse(first!));
    await stranger().post(pathOf(made)).expect(404);
  });
});

describe('who may make and withdraw an address', () => {
  it('the producer and the engineer for everybody, a musician for themselves, others not at all', async () => {
    const production = await productionOf(producer, smallProduction());
    const engineer = await memberOf(open.app, producer, production, 'engineer');
    const musician = await memberOf(open.app, producer, production, 'musician', 'una');
    const assistant = await memberOf(open.app, producer, production, 'assistant');
    const guest = await memberOf(open.app, producer, production, 'guest');
    const foreign = (await someone(open.app)).agent;
    const links = `/api/productions/${production}/links`;
    const ask = (agent: Agent, person: string) => agent.post(links).send({ kind: 'calendar', person });

    const ofTeo = (await ask(engineer, 'teo').expect(201)).body as NewLink;
    const own = (await ask(musician, 'una').expect(201)).body as NewLink;
    await ask(musician, 'teo').expect(403);
    await ask(assistant, 'teo').expect(403);
    await ask(guest, 'una').expect(403);
    await ask(foreign, 'una').expect(404);
    expect((await musician.get(links).expect(200)).body).toMatchObject([{ id: own.id }]);
    expect((await engineer.get(links).expect(200)).body).toHaveLength(2);
    await musician.delete(`${links}/${ofTeo.id}`).expect(404);
    await musician.delete(`${links}/${own.id}`).expect(204);
  });

  it('only for somebody who is in the production, and only calendars', async () => {
    const production = await productionOf(producer, smallProduction());
    const ask = (body: object) => producer.post(`/api/productions/${production}/links`).send(body);
    await ask({ kind: 'calendar', person: 'nobody' }).expect(422);
    await ask({ kind: 'calendar' }).expect(422);
    await ask({ kind: 'guest' }).expect(422);
    await ask({ kind: 'calendar', person: "una'; drop table links; --" }).expect(422);
  });
});
