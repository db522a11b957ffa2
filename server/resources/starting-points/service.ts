import { createHash } from 'node:crypto';
import { readdir, readFile } from 'node:fs/promises';
import path from 'node:path';
import { Op } from 'sequelize';
import type { StartingPoint } from '../../../shared/contracts/api';
import type { ProductionFile } from '../../../shared/contracts/resources';
import { readProductionFile } from '../../../shared/file/read';
import type { Context } from '../../context';
import { Refusal } from '../../http/errors';

/** What the start page says of a file: the first paragraph of its note, and how large it is. */
function describe(file: ProductionFile) {
  const days = new Set(file.rooms.flatMap((room) => room.open.map((window) => window.from.slice(0, 10))));
  const [summary = ''] = (file.production.note ?? '').split(/\n\s*\n/);
  return {
    title: file.production.title,
    summary: summary.replaceAll(/\s+/g, ' ').trim(),
    songs: file.songs.length,
    people: file.people.length,
    days: days.size,
  };
}

/** Brings the table of starting points in step with the files; a file that is as it was is not read again. */
export async function loadStartingPoints({ db, config, log }: Context): Promise<void> {
  const names = (await readdir(config.startingPoints)).filter((name) => name.endsWith('.yaml')).sort();
  const known = new Map((await db.startingPoints.findAll()).map((point) => [point.slug, point]));
  for (const [position, name] of names.entries()) {
    const slug = path.basename(name, '.yaml');
    const source = await readFile(path.join(config.startingPoints, name), 'utf8');
    const hash = createHash('sha256').update(source).digest('hex');
    const point = known.get(slug);
    known.delete(slug);
    if (point?.hash === hash && point.position === position) continue;
    const read = readProductionFile(source);
    if (read.ok) await db.startingPoints.upsert({ slug, hash, source, position, ...describe(read.file) });
    else log.error({ file: name, faults: read.faults }, 'a starting point has faults and is left out');
  }
  await db.startingPoints.destroy({ where: { slug: { [Op.in]: [...known.keys()] } } });
}

export async function listStartingPoints({ db }: Context): Promise<StartingPoint[]> {
  const points = await db.startingPoints.findAll({ order: [['position', 'ASC']] });
  return points.map(({ slug, title, summary, songs, people, days }) => ({ slug, title, summary, songs, people, days }));
}

/** The production that a starting point holds. */
export async function startingFile({ db }: Context, slug: string): Promise<ProductionFile> {
  const point = await db.startingPoints.findByPk(slug);
  const read = point && readProductionFile(point.source);
  if (!read?.ok) throw new Refusal('not-found', 'There is no such starting point. Choose one of those on the start page.');
  return read.file;
}
