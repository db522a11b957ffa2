import { randomUUID } from 'node:crypto';
import { QueryTypes } from 'sequelize';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { z } from 'zod';
import { resourceNames } from '../../shared/contracts/resources';
import { rowSchemas } from '../../shared/contracts/rows';
import { createApp } from '../../server/app';
import { migrate, migrator } from '../../server/migrations';
import { openDatabase } from '../../server/models/database';
import { resourceFields } from '../../server/models/tables';
import { PASSWORD, productionOf, someone, type Agent } from '../factories/accounts';
import { aChange, smallPlan, smallProduction } from '../factories/productions';
import { openApp, type OpenApp } from '../support/app';
import { freshDatabase } from '../support/database';

let open: OpenApp;
let producer: Agent;
let id: string;
let other: string;
beforeAll(async () => {
  open = await openApp();
  producer = (await someone(open.app, 'Wren')).agent;
  id = await productionOf(producer, smallProduction());
  other = await productionOf(producer, smallProduction());
  const plan = await producer.post(`/api/productions/${id}/plans`).send({ inputRevision: 1, seed: 1, iterations: 1, outcome: smallPlan() });
  await producer.post(`/api/productions/${id}/versions`).send({ plan: plan.body.id }).expect(201);
});
afterAll(() => open.close());

const select = <Row extends object>(sql: string, replacements: Record<string, unknown> = {}) =>
  open.db.sequelize.query<Row>(sql, { type: QueryTypes.SELECT, replacements });
/** The SQLSTATE with which the database refuses a statement. */
const refusal = (sql: string) =>
  open.db.sequelize.query(sql, { replacements: { id, other, fresh: randomUUID() } }).then(
    () => 'taken',
    (error: { original?: { code?: string } }) => error.original?.code,
  );
const CHECK = '23514';
const FOREIGN = '23503';
const UNIQUE = '23505';
const NOT_NULL = '23502';
const RESTRICT = '23001';
const DATE = '22008';

// prettier-ignore
describe('the database itself', () => {
  const person = `(select id from people where production_id = :id and key = 'una')`;
  const foreignPerson = `(select id from people where production_id = :other and key = 'una')`;
  const room = `(select id from rooms where production_id = :id)`;
  const pass = `(select id from passes where production_id = :id and key = 'first-lead')`;
  const song = `(select id from songs where production_id = :id)`;

  it.each([
    ['a key with capitals', `insert into people (production_id, key, position, revision) values (:id, 'Not-A-Key', 0, 1)`, CHECK],
    ['a key given twice', `insert into people (production_id, key, position, revision) values (:id, 'una', 0, 1)`, UNIQUE],
    ['a row of no production', `insert into people (production_id, key, position, revision) values (:fresh, 'ida', 0, 1)`, FOREIGN],
    ['a row without a key', `insert into people (production_id, position, revision) values (:id, 0, 1)`, NOT_NULL],
    ['a window that ends before it starts', `insert into windows (production_id, person_id, position, from_wall, to_wall) values (:id, ${person}, 9, '2027-03-08T12:00', '2027-03-08T11:00')`, CHECK],
    ['a window with seconds', `insert into windows (production_id, person_id, position, from_wall, to_wall) values (:id, ${person}, 9, '2027-03-08T10:00:00', '2027-03-08T11:00')`, CHECK],
    ['hours on a date that does not exist', `insert into hours (production_id, room_id, position, kind, from_wall, to_wall) values (:id, ${room}, 9, 'open', '2027-02-29T10:00', '2027-03-01T11:00')`, DATE],
    ['hours of no known kind', `insert into hours (production_id, room_id, position, kind, from_wall, to_wall) values (:id, ${room}, 9, 'shut', '2027-03-08T10:00', '2027-03-08T11:00')`, CHECK],
    ['somebody of another production in a pass', `insert into pass_people (production_id, pass_id, person_id, position) values (:id, ${pass}, ${foreignPerson}, 9)`, FOREIGN],
    ['somebody of another production behind a desk', `insert into room_operators (production_id, room_id, person_id, position) values (:other, ${room}, ${foreignPerson}, 9)`, FOREIGN],
    ['minutes in the wrong order', `update passes set minutes_low = 60, minutes_likely = 50 where id = ${pass}`, CHECK],
    ['a pass without minutes', `update passes set minutes_low = null, minutes_likely = null, minutes_high = null, minutes_form = null where id = ${pass}`, CHECK],
    ['half of three minutes', `update songs set minutes_low = 5 where id = ${song}`, CHECK],
    ['a priority of its own', `update passes set priority = 'perhaps' where id = ${pass}`, CHECK],
    ['a rehearsal level of five', `update songs set rehearsal = 5 where id = ${song}`, CHECK],
    ['a negative fee', `update people set fee_call = -1 where id = ${person}`, CHECK],
    ['an endless weight', `update productions set weights_day = 'infinity' where id = :id`, CHECK],
    ['a step of nothing', `update productions set rules_step = 0 where id = :id`, CHECK],
    ['two of three sizes of a room', `update rooms set size_length = 5, size_width = 4 where id = ${room}`, CHECK],
    ['a pass that waits for itself', `insert into dependencies (production_id, pass_id, kind, needed_pass_id, position) values (:id, ${pass}, 'after', ${pass}, 9)`, CHECK],
    ['a dependency on nothing', `insert into dependencies (production_id, pass_id, kind, position) values (:id, ${pass}, 'after', 9)`, CHECK],
    ['a part of a mode of its own', `update parts set mode = 'whistled' where production_id = :id`, CHECK],
    ['a person that a pass names taken away', `delete from people where id = ${person}`, FOREIGN],
    ['a role of its own', `update members set role = 'boss' where production_id = :id`, CHECK],
    ['one user twice in a production', `insert into members (production_id, user_id, role) select production_id, user_id, 'guest' from members where production_id = :id`, UNIQUE],
    ['an e-mail in capitals', `insert into users (email, name, password_hash) values ('A@example.org', 'A', 'x')`, CHECK],
    ['an account without a password', `insert into users (email, name) values ('a@example.org', 'A')`, CHECK],
    ['a token that is no hash', `insert into links (production_id, kind, person_id, token_hash, created_by) select :id, 'calendar', ${person}, 'the token itself', created_by from productions where id = :id`, CHECK],
    ['a calendar of nobody', `insert into links (production_id, kind, token_hash, created_by) select :id, 'calendar', repeat('a', 64), created_by from productions where id = :id`, CHECK],
    ['a change applied twice', `insert into history (production_id, change_id, revision, user_id, by_name, at, resource, key, op) select production_id, change_id, revision, user_id, by_name, at, resource, key, op from history where production_id = :id`, UNIQUE],
    ['a draft that is changed', `update plans set seed = 2 where production_id = :id`, RESTRICT],
    ['a published version that is changed', `update versions set note = 'x' where production_id = :id`, RESTRICT],
    ['a published version taken away', `delete from versions where production_id = :id`, RESTRICT],
    ['a published call that is moved', `update calls set arrive = '2027-03-08T09:00', ready = '2027-03-08T09:00' where production_id = :id`, RESTRICT],
    ['a published call taken away', `delete from calls where production_id = :id`, RESTRICT],
    ['a version number given twice', `insert into versions (production_id, number, plan_id, file_revision, file, changes, published_by, by_name, published_at) select production_id, number, plan_id, file_revision, file, changes, published_by, by_name, now() from versions where production_id = :id`, UNIQUE],
    ['a plan without cost that says it is one', `insert into plans (production_id, input_revision, seed, iterations, status, outcome, file, created_by) select :id, 1, 1, 1, 'optimal', '{}', '{}', created_by from productions where id = :id`, CHECK],
    ['a take of another production’s song', `insert into takes (production_id, song_id, number, started_at, ending) select :other, ${song}, 1, '2027-03-08T10:00', 'complete'`, FOREIGN],
  ])('refuses %s', async (_what, sql, code) => {
    expect(await refusal(sql)).toBe(code);
  });

  it('has an index for every foreign key', async () => {
    const bare = await select<{ name: string }>(`
      select c.conrelid::regclass || '.' || c.conname as name
      from pg_constraint c
      where c.contype = 'f' and c.connamespace = 'public'::regnamespace and not exists (
        select 1 from pg_index i
        where i.indrelid = c.conrelid and i.indkey[0] = any(c.conkey)
          and (i.indkey[0] <> (select attnum from pg_attribute a where a.attrelid = c.conrelid and a.attname = 'production_id')
            or array_length(c.conkey, 1) = 1))`);
    expect(bare.map(({ name }) => name)).toEqual([]);
  });

  it('has a column for every attribute of the models', async () => {
    const columns = await select<{ at: string }>(
      `select table_name || '.' || column_name as at from information_schema.columns where table_schema = 'public'`,
    );
    const known = new Set(columns.map(({ at }) => at));
    const wanted = Object.values(open.db.sequelize.models).flatMap((model) =>
      Object.values(model.getAttributes()).map((attribute) => `${String(model.getTableName())}.${attribute.field}`),
    );
    expect(wanted.length).toBeGreaterThan(300);
    expect(wanted.filter((at) => !known.has(at))).toEqual([]);
  });

  it('comes down step by step and up again', async () => {
    const db = openDatabase(await freshDatabase());
    await migrator(db.sequelize).down({ to: 0 });
    const tables = await db.sequelize.query(`select table_name from information_schema.tables where table_schema = 'public'`, {
      type: QueryTypes.SELECT,
    });
    expect(tables).toEqual([{ table_name: 'schema_migrations' }]);
    await migrator(db.sequelize).up();
    expect(await db.users.count()).toBe(0);
    await db.close();
  });
});

describe('two servers on one database', () => {
  it('bring it up to date one after the other', async () => {
    const url = await freshDatabase();
    const [one, two] = [openDatabase(url), openDatabase(url)];
    await migrator(one.sequelize).down({ to: 0 });
    await Promise.all([migrate(one.sequelize), migrate(two.sequelize)]);
    expect(await two.users.count()).toBe(0);
    await Promise.all([one.close(), two.close()]);
  });

  it('share sessions, and put the changes of one production in a row', async () => {
    const db = openDatabase(open.context.config.databaseUrl);
    const second = createApp({ ...open.context, db });
    const { agent, email } = await someone(open.app);
    const elsewhere = request.agent(second);
    await elsewhere.post('/api/session').send({ email, password: PASSWORD }).expect(200);
    const production = await productionOf(agent, smallProduction());
    const path = `/api/productions/${production}/changes`;
    const answers = await Promise.all(
      Array.from({ length: 10 }, (_, at) =>
        (at % 2 ? agent : elsewhere).post(path).send({ changes: [aChange('people', `extra-${at}`, 'create')] }),
      ),
    );
    expect(answers.map(({ body }) => body.revision).sort((a, b) => a - b)).toEqual(answers.map((_, at) => at + 2));
    await agent.delete('/api/session').expect(204);
    await elsewhere.get(`/api/productions/${production}`).expect(200);
    await db.close();
  });
});

describe('the mapping of fields', () => {
  it.each(resourceNames)('of %s has a place for every field of the file, and no other', (resource) => {
    const inFile = Object.keys(rowSchemas[resource].shape).filter((name) => name !== 'id' && name !== 'extra');
    // A song keeps `parts` only where the file gave an empty list; each part is a row of its own.
    const mapped = [...Object.keys(resourceFields[resource]), ...(resource === 'songs' ? ['parts'] : [])];
    expect(mapped.sort()).toEqual(inFile.sort());
  });

  it.each(resourceNames)('of %s has a column for every field of its groups', (resource) => {
    const shape: Record<string, unknown> = rowSchemas[resource].shape;
    for (const [name, field] of Object.entries(resourceFields[resource]))
      if (field.kind === 'group') {
        const group = shape[name] as z.ZodOptional<z.ZodObject>;
        expect([name, Object.keys(field.fields).sort()]).toEqual([name, Object.keys(group.unwrap().shape).sort()]);
      }
  });
});
