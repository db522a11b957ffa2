import { randomUUID } from 'node:crypto';
import { QueryTypes } from 'sequelize';
import { z } from 'zod';
import { role } from '../../../shared/contracts/roles';
import type { Fault, ProductionSummary, Snapshot } from '../../../shared/contracts/api';
import type { ProductionFile } from '../../../shared/contracts/resources';
import { changesOf, fileOf } from '../../../shared/domain/changes';
import { readProductionFile } from '../../../shared/file/read';
import { writeProductionFile } from '../../../shared/file/write';
import type { Context } from '../../context';
import type { Actor, Membership } from '../../http/actor';
import { Refusal } from '../../http/errors';
import type { VersionModel } from '../../models/plans';
import { presentRows } from '../changes/rows';
import { applyWithin, readProduction } from '../changes/service';

/** Songs, parts, passes, people and so on together: some twenty times a long production. */
const MOST_ROWS = 30_000;

/** A production with all of a file's rows; who makes it is its producer. */
export async function createProduction(context: Context, actor: Actor, file: ProductionFile): Promise<{ id: string }> {
  const { db } = context;
  const { code, title, timezone } = file.production;
  const changes = changesOf(file, randomUUID);
  if (changes.length > MOST_ROWS)
    throw new Refusal('too-large', `This production has more than ${MOST_ROWS} rows. Split it into several productions.`);
  return db.sequelize.transaction(async (transaction) => {
    const production = await db.productions.create({ createdBy: actor.userId, code, title, timezone }, { transaction });
    await db.members.create({ productionId: production.id, userId: actor.userId, role: 'producer', personId: null }, { transaction });
    const writer = { role: 'producer', person: null, productionId: production.id, userId: actor.userId, name: actor.name } as const;
    await applyWithin(context, writer, changes, transaction);
    return { id: production.id };
  });
}

/** A production from the text of a file; every fault of it is told. */
export async function importProduction(context: Context, actor: Actor, source: string): Promise<{ id: string; warnings: Fault[] }> {
  const read = readProductionFile(source);
  if (!read.ok) {
    const [first] = read.faults;
    const count = read.faults.length === 1 ? 'one fault' : `${read.faults.length} faults`;
    const place = first
      ? ` The first: ${first.line === undefined ? '' : `line ${first.line}, `}${first.path} should be ${first.expected}.`
      : '';
    throw new Refusal(
      'wrong-fields',
      `The file has ${count}.${place} Nothing was imported: correct the file and choose it again.`,
      read.faults,
    );
  }
  const { id } = await createProduction(context, actor, read.file);
  return { id, warnings: read.warnings };
}

/** A production that has nothing but its name yet. */
export const blankFile = (production: ProductionFile['production']): ProductionFile => ({
  production,
  rooms: [],
  people: [],
  gear: [],
  setups: [],
  changeovers: [],
  songs: [],
  events: [],
});

const summaryRow = z.object({
  id: z.string(),
  code: z.string(),
  title: z.string(),
  role,
  songs: z.coerce.number(),
  people: z.coerce.number(),
  firstDay: z.string().nullable(),
  lastDay: z.string().nullable(),
  version: z.number().nullable(),
  updatedAt: z.date(),
});

/** The productions of which this user is a member, the last touched first. */
export async function listProductions({ db }: Context, actor: Actor): Promise<ProductionSummary[]> {
  const rows = await db.sequelize.query(
    `select p.id, p.code, p.title, m.role, p.updated_at as "updatedAt",
       (select count(*) from songs s where s.production_id = p.id and s.removed_at is null) as songs,
       (select count(*) from people q where q.production_id = p.id and q.removed_at is null) as people,
       left(min(h.from_wall), 10) as "firstDay", left(max(h.from_wall), 10) as "lastDay",
       (select max(number) from versions v where v.production_id = p.id) as version
     from members m
     join productions p on p.id = m.production_id
     left join rooms r on r.production_id = p.id and r.removed_at is null
     left join hours h on h.room_id = r.id and h.kind = 'open'
     where m.user_id = :user
     group by p.id, m.role
     order by p.updated_at desc, p.id`,
    { replacements: { user: actor.userId }, type: QueryTypes.SELECT },
  );
  return z
    .array(summaryRow)
    .parse(rows)
    .map((row) => ({ ...row, updatedAt: row.updatedAt.toISOString() }));
}

/** What a member's device holds: every row they may see, or those written after a revision. */
export async function snapshotOf(context: Context, member: Membership, since: number | undefined): Promise<Snapshot> {
  const known = await context.db.productions.findByPk(member.productionId, { attributes: ['revision'] });
  const newest = await context.db.versions.max<number | null, VersionModel>('number', { where: { productionId: member.productionId } });
  const head = { id: member.productionId, role: member.role, person: member.person, version: newest ?? null };
  if (known && since !== undefined && since >= known.revision) return { ...head, revision: known.revision, rows: [] };
  const { revision, rows } = await readProduction(context, member.productionId);
  const fresh = rows.all().filter((row) => since === undefined || row.revision > since);
  return { ...head, revision, rows: presentRows(fresh, member) };
}

/** The production file as this member may see it, with its code for the name of the download. */
export async function exportOf(context: Context, member: Membership): Promise<{ code: string; source: string }> {
  const { rows } = await readProduction(context, member.productionId);
  const file = fileOf(presentRows(rows.all(), member));
  return { code: file.production.code, source: writeProductionFile(file) };
}

export async function deleteProduction({ db }: Context, productionId: string): Promise<void> {
  await db.productions.destroy({ where: { id: productionId } });
}
