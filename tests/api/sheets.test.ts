import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Draft } from '../../shared/contracts/api';
import type { MadePlan } from '../../shared/contracts/plan';
import type { SheetsPlan } from '../../shared/contracts/sheets';
import { memberOf, productionOf, someone, type Agent } from '../factories/accounts';
import { smallPlan, smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';
import { askOfPdf, factOfPdf, textOfPdf } from '../support/pdf';

describe('sheets over the API', () => {
  let open: OpenApp;
  let producer: Agent;
  let production: string;
  let draft: Draft;
  beforeAll(async () => {
    open = await openApp();
    producer = (await someone(open.app, 'Wren')).agent;
    production = await productionOf(producer, smallProduction());
    draft = await store(smallPlan());
    await producer.post(`/api/productions/${production}/versions`).send({ plan: draft.id }).expect(201);
  });
  afterAll(() => open.close());

  async function store(outcome: MadePlan): Promise<Draft> {
    const asked = { inputRevision: 1, seed: 1, iterations: 1, outcome };
    return (await producer.post(`/api/productions/${production}/plans`).send(asked).expect(201)).body as Draft;
  }
  const get = (agent: Agent, sheet: string, query: object, from = production) =>
    agent
      .get(`/api/productions/${from}/sheets/${sheet}.pdf`)
      .query(query)
      .buffer(true)
      .parse((response, done) => {
        const chunks: Buffer[] = [];
        response.on('data', (chunk: Buffer) => chunks.push(chunk));
        response.on('end', () => done(null, Buffer.concat(chunks)));
      });
  const date = '2027-03-08';

  it('say the next step while nothing is published', async () => {
    const fresh = await productionOf(producer, smallProduction());
    const answer = await get(producer, 'run-sheet', { date }, fresh).expect(404);
    expect(JSON.parse(String(answer.body)).detail).toContain('Publish a plan first');
  });

  it('print a draft as a draft and a version under its number', async () => {
    const asDraft = await get(producer, 'run-sheet', { date, version: `draft:${draft.id}` }).expect(200);
    expect(textOfPdf(asDraft.body as Buffer)).toContain('DRAFT');
    const answer = await get(producer, 'run-sheet', { date, version: '1', paper: 'Letter' }).expect(200);
    expect(answer.headers['content-type']).toBe('application/pdf');
    expect(answer.headers['content-disposition']).toBe('attachment; filename="BRIDGE_V1_2027-03-08_RUN-SHEET.pdf"');
    expect(factOfPdf(askOfPdf('pdfinfo', answer.body as Buffer), 'Page size')).toContain('letter');
    const text = textOfPdf(answer.body as Buffer);
    for (const words of ['Version 1', 'Stone Ferry', '10:00', '11:00', '12:00', 'Teo', 'Una']) expect(text).toContain(words);
    for (const money of ['400', '90', '120', 'EUR']) expect(text).not.toContain(money);
  });

  it('let a musician print the own call sheet of a published plan and nothing else', async () => {
    const musician = await memberOf(open.app, producer, production, 'musician', 'una');
    const own = await get(musician, 'call-sheet', {}).expect(200);
    expect(own.headers['content-disposition']).toContain('BRIDGE_V1_UNA_CALL-SHEET.pdf');
    expect(textOfPdf(own.body as Buffer)).toContain('Una Fenn');
    await get(musician, 'call-sheet', { person: 'una' }).expect(200);
    await get(musician, 'call-sheet', { person: 'teo' }).expect(403);
    await get(musician, 'call-sheet', { version: `draft:${draft.id}` }).expect(403);
    await get(musician, 'run-sheet', { date }).expect(403);
  });

  it('are there for the crew, and not for guests and strangers', async () => {
    for (const role of ['engineer', 'assistant'] as const) {
      const agent = await memberOf(open.app, producer, production, role);
      await get(agent, 'call-sheet', { person: 'teo' }).expect(200);
    }
    const guest = await memberOf(open.app, producer, production, 'guest');
    await get(guest, 'run-sheet', { date }).expect(403);
    await get(guest, 'call-sheet', { person: 'una' }).expect(403);
    await get((await someone(open.app)).agent, 'run-sheet', { date }).expect(404);
  });

  it('are previewed from the same plan and the production as it was then, as far as the reader may see it', async () => {
    const plan = `/api/productions/${production}/sheets/plan`;
    const shown = (await producer.get(plan).expect(200)).body as SheetsPlan;
    expect(shown).toMatchObject({ shown: { named: '1', version: 1 }, own: null, outcome: smallPlan() });
    expect(shown.file).toEqual(smallProduction());

    // A newer draft stands first among the choices, and is shown only where it is named.
    open.wait(60_000);
    const newer = await store(smallPlan(660));
    const choices = ((await producer.get(plan).expect(200)).body as SheetsPlan).choices;
    expect(choices.map(({ named }) => named)).toEqual([`draft:${newer.id}`, '1']);
    const asDraft = (
      await producer
        .get(plan)
        .query({ version: `draft:${newer.id}` })
        .expect(200)
    ).body as SheetsPlan;
    expect(asDraft).toMatchObject({ shown: { version: null }, outcome: smallPlan(660) });

    const musician = await memberOf(open.app, producer, production, 'musician', 'teo');
    const own = (await musician.get(plan).expect(200)).body as SheetsPlan;
    expect(own).toMatchObject({ own: 'teo', choices: [{ named: '1' }] });
    for (const hidden of ['una@example.org', '+351 555 010 001', '"fee"', '"price"']) expect(JSON.stringify(own)).not.toContain(hidden);
    await musician
      .get(plan)
      .query({ version: `draft:${newer.id}` })
      .expect(403);
    await (await memberOf(open.app, producer, production, 'guest')).get(plan).expect(403);
  });

  it('refuse what is not there with a sentence', async () => {
    for (const [sheet, query, status] of [
      ['run-sheet', {}, 422],
      ['run-sheet', { date: '2027-02-30' }, 422],
      ['run-sheet', { date, paper: 'A3' }, 422],
      ['run-sheet', { date: '2027-03-09' }, 404],
      ['run-sheet', { date, room: 'cellar' }, 404],
      ['run-sheet', { date, version: '9' }, 404],
      ['run-sheet', { date, version: 'draft:nonsense' }, 404],
      ['call-sheet', {}, 422],
      ['call-sheet', { person: 'nobody' }, 404],
    ] as const) {
      const answer = await get(producer, sheet, query);
      expect([sheet, query, answer.status]).toEqual([sheet, query, status]);
      expect(answer.headers['content-type']).toContain('application/problem+json');
      expect(JSON.parse(String(answer.body)).detail).toMatch(/^[A-Z].*\.$/);
    }
  });
});
