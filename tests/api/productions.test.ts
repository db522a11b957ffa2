import { readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ProductionSummary, StartingPoint } from '../../shared/contracts/api';
import type { ProductionFile } from '../../shared/contracts/resources';
import { readProductionFile } from '../../shared/file/read';
import { writeProductionFile } from '../../shared/file/write';
import { loadStartingPoints } from '../../server/resources/starting-points/service';
import { productionOf, someone, type Agent } from '../factories/accounts';
import { smallPlan, smallProduction } from '../factories/productions';
import { anyProduction } from '../factories/any-production';
import { openApp, type OpenApp } from '../support/app';

let open: OpenApp;
let producer: Agent;
beforeAll(async () => {
  open = await openApp();
  producer = (await someone(open.app, 'Wren')).agent;
});
afterAll(() => open.close());

function read(source: string): ProductionFile {
  const result = readProductionFile(source);
  if (!result.ok) throw new Error(JSON.stringify(result.faults));
  return result.file;
}
const upload = (source: string | Buffer, name = 'production.yaml') =>
  producer.post('/api/productions/import').attach('file', typeof source === 'string' ? Buffer.from(source) : source, name);
const exportOf = async (id: string) => (await producer.get(`/api/productions/${id}/file.yaml`).expect(200)).text;

describe('the starting points', () => {
  it('are those of the templates, described by their files', async () => {
    const points = (await producer.get('/api/starting-points').expect(200)).body as StartingPoint[];
    const names = readdirSync('templates/productions')
      .filter((name) => name.endsWith('.yaml'))
      .sort();
    expect(points.map((point) => `${point.slug}.yaml`)).toEqual(names);
    for (const point of points) {
      const file = read(readFileSync(`templates/productions/${point.slug}.yaml`, 'utf8'));
      expect(point).toMatchObject({ title: file.production.title, songs: file.songs.length, people: file.people.length });
      expect(point.summary.length).toBeGreaterThan(20);
    }
  });

  it.each(readdirSync('templates/productions').filter((name) => name.endsWith('.yaml')))(
    '%s imports and exports to the same production',
    async (name) => {
      const source = readFileSync(`templates/productions/${name}`, 'utf8');
      const { id } = (
        await producer
          .post('/api/productions')
          .send({ from: name.replace('.yaml', '') })
          .expect(201)
      ).body as { id: string };
      expect(read(await exportOf(id))).toEqual(read(source));
      const imported = (await upload(source).expect(201)).body as { id: string; warnings: unknown[] };
      expect(imported.warnings).toEqual([]);
      expect(await exportOf(imported.id)).toBe(await exportOf(id));
    },
  );

  it('are read again only where a file has changed', async () => {
    const before = await open.db.startingPoints.findAll({ raw: true });
    await open.db.startingPoints.update({ hash: '0'.repeat(64), title: 'Stale' }, { where: { slug: before[0]!.slug } });
    await open.db.startingPoints.create({
      slug: 'gone',
      hash: '0'.repeat(64),
      title: 'Gone',
      summary: '',
      songs: 0,
      people: 0,
      days: 0,
      source: '',
      position: 9,
    });
    await loadStartingPoints(open.context);
    const after = (await producer.get('/api/starting-points')).body as StartingPoint[];
    expect(after.map(({ slug, title }) => [slug, title])).toEqual(before.map(({ slug, title }) => [slug, title]));
  });

  it('that are not there cannot be begun from', async () => {
    await producer.post('/api/productions').send({ from: 'nowhere' }).expect(404);
  });
});

describe('import and export', () => {
  it('give any production back as it was, fields that are not given and unknown ones too', async () => {
    await fc.assert(
      fc.asyncProperty(anyProduction, async (file) => {
        const id = await productionOf(producer, file);
        expect(read(await exportOf(id))).toEqual(file);
      }),
      { numRuns: 25 },
    );
  });

  it('tell every fault of a wrong file with line and path, and make nothing', async () => {
    const before = (await producer.get('/api/productions')).body as ProductionSummary[];
    const source = `redpoll: 1
production: { code: X, title: X, timezone: Mars/Base }
rooms:
  - { id: a, open: [{ from: 2027-03-08T12:00, to: 2027-03-08T10:00 }] }
songs:
  - { id: Not OK }
`;
    const answer = await upload(source).expect(422);
    expect(answer.body.faults.map((fault: { path: string; line: number }) => [fault.path, fault.line])).toEqual([
      ['production.timezone', 2],
      ['rooms[0].open[0].to', 4],
      ['songs[0].id', 6],
    ]);
    expect(answer.body.detail).toContain('3 faults');
    expect((await producer.get('/api/productions')).body).toEqual(before);
  });

  it('keep a ring of dependencies and say so', async () => {
    const file = smallProduction();
    file.passes![0]!.after = [{ pass: 'first-lead' }];
    const answer = await upload(writeProductionFile(file)).expect(201);
    expect(answer.body.warnings[0].expected).toContain('ring');
  });

  it.each<[string, string | Buffer, number]>([
    ['YAML that breaks off', 'redpoll: 1\nproduction: { code: X, title: "X', 422],
    ['nothing', '', 422],
    ['a picture', Buffer.from([0x89, 0x50, 0x4e, 0x47, 0xff, 0xfe, 0x00]), 422],
    [
      'aliases of aliases',
      `redpoll: 1\na: &a [x,x,x,x,x,x,x,x,x]\n${'bcdefghij'
        .split('')
        .map((name, at) => `${name}: &${name} [${`*${'abcdefghi'[at]},`.repeat(9)}]`)
        .join('\n')}\n`,
      422,
    ],
    ['more than 5 MB', Buffer.alloc(6 * 1024 * 1024, 'a'), 413],
    ['20 MB of YAML', Buffer.alloc(20 * 1024 * 1024, '- a\n'), 413],
  ])('answer %s with what to do next', async (_what, source, status) => {
    const answer = await upload(source).expect(status);
    expect(answer.headers['content-type']).toContain('application/problem+json');
    expect(answer.body.detail).toMatch(/\.$/);
    expect(JSON.stringify(answer.body)).not.toMatch(/node_modules|at \w+ \(/);
  });

  it('ask for the file where there is none, or another field, or two', async () => {
    await producer.post('/api/productions/import').send({}).expect(400);
    await producer.post('/api/productions/import').attach('other', Buffer.from('x'), 'x.yaml').expect(400);
    await producer.post('/api/productions/import').attach('file', Buffer.from('x'), 'x').attach('file', Buffer.from('y'), 'y').expect(400);
    await producer.post('/api/productions/import').set('Content-Type', 'multipart/form-data; boundary=x').send('--x\r\nbroken').expect(400);
  });

  it('name the download after the code, whatever is in it', async () => {
    const file = smallProduction();
    file.production.code = '../"Brücke"\r\n7';
    const id = (
      await producer
        .post('/api/productions')
        .send({ code: file.production.code.replaceAll(/[\r\n]/g, ''), title: 'X', timezone: 'UTC' })
        .expect(201)
    ).body.id;
    const { headers } = await producer.get(`/api/productions/${id}/file.yaml`).expect(200);
    expect(headers['content-disposition']).toContain("filename*=UTF-8''Br%C3%BCcke-7.yaml");
    expect(headers['content-type']).toContain('yaml');
  });
});

describe('the list', () => {
  it('sums up each production, the last touched first', async () => {
    const { agent } = await someone(open.app);
    expect((await agent.get('/api/productions').expect(200)).body).toEqual([]);
    const first = await productionOf(agent, smallProduction());
    const blank = (await agent.post('/api/productions').send({ code: 'NEW', title: 'A blank one', timezone: 'UTC' }).expect(201)).body.id;
    const list = (await agent.get('/api/productions')).body as ProductionSummary[];
    expect(
      list.map(({ id, role, songs, people, firstDay, lastDay, version }) => [id, role, songs, people, firstDay, lastDay, version]),
    ).toEqual([
      [blank, 'producer', 0, 0, null, null, null],
      [first, 'producer', 1, 2, '2027-03-08', '2027-03-08', null],
    ]);
  });

  it.each([
    [{ code: 'X', title: 'X', timezone: 'Nowhere/Land' }, 'timezone'],
    [{ code: ' ', title: 'X', timezone: 'UTC' }, 'code'],
    [{ title: 'X' }, ''],
  ])('takes no blank production with %j', async (body, path) => {
    const answer = await producer.post('/api/productions').send(body).expect(422);
    expect(answer.body.faults[0].path).toBe(path);
  });
});

describe('deleting a production', () => {
  it('takes what was published with it', async () => {
    const id = await productionOf(producer, smallProduction());
    const plan = await producer
      .post(`/api/productions/${id}/plans`)
      .send({ inputRevision: 1, seed: 1, iterations: 1, outcome: smallPlan() })
      .expect(201);
    await producer.post(`/api/productions/${id}/versions`).send({ plan: plan.body.id }).expect(201);
    await producer.delete(`/api/productions/${id}`).expect(204);
    expect(await open.db.calls.count({ where: { productionId: id } })).toBe(0);
  });

  it('takes everything of it and nothing of another', async () => {
    const gone = (await producer.post('/api/productions').send({ from: 'nine-sluices' }).expect(201)).body.id as string;
    const kept = (await producer.post('/api/productions').send({ from: 'quillgate' }).expect(201)).body.id as string;
    const before = await exportOf(kept);
    await producer.delete(`/api/productions/${gone}`).expect(204);
    await producer.get(`/api/productions/${gone}`).expect(404);
    expect(await exportOf(kept)).toBe(before);
    for (const model of [...Object.values(open.db.entries), open.db.rows.passes, open.db.history, open.db.members])
      expect(await (model as typeof open.db.members).count({ where: { productionId: gone } })).toBe(0);
  });
});
