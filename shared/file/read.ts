import type { z } from 'zod';
import type { Fault } from '../contracts/api';
import * as head from '../contracts/head';
import * as resources from '../contracts/resources';
import type { ExtraField } from '../contracts/values';
import { doubts } from './checks';
import { crossFaults } from './cross';
import { expectedBy, faultsOf } from './issues';
import { LIMITS } from './limits';
import { fieldOf, type Fields, isFields, itemsOf, type Path, writePath } from './paths';
import { LISTS } from './references';
import { separate, type UnknownField } from './unknown';
import { type PathFault, readText } from './yaml';

export type ReadResult =
  { ok: true; file: resources.ProductionFile; warnings: Fault[] } | { ok: false; faults: Fault[]; warnings: Fault[] };

const ROOT_FIELDS = ['redpoll', 'production', 'rules', 'weights', ...LISTS];
/** The head of the file; its rules and weights stand beside it. */
const headFields = head.production.omit({ rules: true, weights: true });
const songHead = resources.song.omit({ parts: true });
/** Pairs of set-ups are many more than anything else. */
const MOST_CHANGEOVERS = 20_000;
const MOST = 5_000;

/**
 * Reads a production file. Everything that is wrong is told, with its line, its path and what was expected; unknown fields are
 * warnings and are kept for export. Never throws.
 * @param text the file's text; a byte order mark and CRLF are accepted
 */
export function readProductionFile(text: string): ReadResult {
  const read = readText(text.startsWith('\uFEFF') ? text.slice(1) : text);
  const found = new Findings();
  found.faults.push(...read.faults);
  const file = read.root === undefined && read.faults.length > 0 ? undefined : readRoot(read.root, found);
  const warnings = tell(found.warnings, read.lineOf);
  if (!file || found.faults.length > 0) return { ok: false, faults: tell(found.faults, read.lineOf), warnings };
  return { ok: true, file, warnings: [...warnings, ...tell(doubts(file), read.lineOf)] };
}

/** Faults with their lines, in the order of the file; of several at one value the first, because it often brings the others about. */
function tell(faults: PathFault[], lineOf: (fault: PathFault) => number): Fault[] {
  const told = new Map<string, Fault & { line: number }>();
  for (const fault of faults.slice(0, LIMITS.faults)) {
    const one = { path: writePath(fault.path), line: lineOf(fault), expected: fault.expected };
    if (one.path === 'file' || !told.has(one.path)) told.set(one.path === 'file' ? `file ${one.line}` : one.path, one);
  }
  const sorted = [...told.values()].sort((a, b) => a.line - b.line);
  const more = faults.length - LIMITS.faults;
  const last = sorted.at(-1)?.line ?? 1;
  return more > 0 ? [...sorted, { path: 'file', line: last, expected: `fewer faults: ${more} more are not shown` }] : sorted;
}

/** Gathers what is found, and reads values by their schemas. */
class Findings {
  readonly faults: PathFault[] = [];
  readonly warnings: PathFault[] = [];

  /** The value by its schema, unknown fields beside it; nothing where a fault was found in it. */
  value<Schema extends z.ZodType>(
    schema: Schema,
    raw: unknown,
    path: Path,
  ): { data: z.output<Schema> | undefined; unknown: UnknownField[] } {
    const { known, unknown } = separate(schema, raw);
    for (const field of unknown)
      this.warnings.push({ path: [...path, ...field.path], expected: 'a known field; this one is kept as it is', key: true });
    const read = schema.safeParse(known, { error: expectedBy });
    if (read.success) return { data: read.data, unknown };
    this.faults.push(...faultsOf(read.error, path));
    return { data: undefined, unknown };
  }

  /** A list of resources, those without faults. */
  list<Item extends object>(root: Fields, name: string, most: number, read: (raw: unknown, path: Path) => Item | undefined): Item[] {
    return this.items(fieldOf(root, name), [name], most, read);
  }

  items<Item extends object>(raw: unknown, path: Path, most: number, read: (raw: unknown, path: Path) => Item | undefined): Item[] {
    if (raw === undefined) return [];
    if (!Array.isArray(raw)) this.faults.push({ path, expected: 'a list; leave the field out where there is nothing' });
    if (itemsOf(raw).length > most) this.faults.push({ path, expected: `a list of at most ${most}` });
    return itemsOf(raw).flatMap((item, index) => read(item, [...path, index]) ?? []);
  }

  /** Reads a resource and keeps its unknown fields in `extra`. */
  resource<Schema extends z.ZodType<object>>(schema: Schema) {
    return (raw: unknown, path: Path): (z.output<Schema> & { extra?: ExtraField[] }) | undefined => {
      const { data, unknown } = this.value(schema, raw, path);
      return data && { ...data, ...extraOf(unknown) };
    };
  }
}

function extraOf(unknown: UnknownField[]): { extra?: ExtraField[] } {
  return unknown.length > 0 ? { extra: unknown.map(({ path, value }) => ({ path: [...path], value })) } : {};
}

function readRoot(root: unknown, found: Findings): resources.ProductionFile | undefined {
  if (!isFields(root)) {
    found.faults.push({ path: [], expected: 'a production file: a mapping that begins with `redpoll: 1`' });
    return undefined;
  }
  if (root.redpoll !== 1) {
    found.faults.push({ path: ['redpoll'], expected: '1, the version of the format' });
    if (root.redpoll !== undefined) return undefined;
  }
  const production = readHead(root, found);
  if (root.rooms === undefined) found.faults.push({ path: ['rooms'], expected: 'a list of rooms with their hours' });
  const { passes } = root;
  const rest = {
    rooms: found.list(root, 'rooms', MOST, found.resource(resources.room)),
    people: found.list(root, 'people', MOST, found.resource(resources.person)),
    gear: found.list(root, 'gear', MOST, found.resource(resources.gear)),
    setups: found.list(root, 'setups', MOST, found.resource(resources.setup)),
    changeovers: found.list(root, 'changeovers', MOST_CHANGEOVERS, found.resource(resources.changeover)),
    songs: found.list(root, 'songs', MOST, (raw, path) => readSong(raw, path, found)),
    ...(passes === undefined ? {} : { passes: found.list(root, 'passes', MOST, found.resource(resources.pass)) }),
    events: found.list(root, 'events', MOST, found.resource(resources.event)),
  };
  found.faults.push(...crossFaults(root));
  return production && { production, ...rest };
}

/** The production with its rules and weights. Paths of its unknown fields begin at the root of the file. */
function readHead(root: Fields, found: Findings): head.Production | undefined {
  const unknown: UnknownField[] = Object.keys(root)
    .filter((key) => !ROOT_FIELDS.includes(key))
    .map((key) => ({ path: [key], value: root[key] }));
  for (const { path } of unknown) found.warnings.push({ path, expected: 'a known field; this one is kept as it is', key: true });
  const read = <Schema extends z.ZodType>(schema: Schema, key: string) => {
    const part = found.value(schema, fieldOf(root, key), [key]);
    unknown.push(...part.unknown.map((field) => ({ ...field, path: [key, ...field.path] })));
    return part.data;
  };
  const production = read(headFields, 'production');
  const rules = root.rules === undefined ? undefined : read(head.rules, 'rules');
  const weights = root.weights === undefined ? undefined : read(head.weights, 'weights');
  return production && { ...production, ...(rules ? { rules } : {}), ...(weights ? { weights } : {}), ...extraOf(unknown) };
}

function readSong(raw: unknown, path: Path, found: Findings): resources.Song | undefined {
  const { parts: rawParts, ...rest } = isFields(raw) ? raw : {};
  const song = found.resource(songHead)(isFields(raw) ? rest : raw, path);
  const parts = found.items(rawParts, [...path, 'parts'], MOST, found.resource(resources.part));
  return song && { ...song, ...(rawParts === undefined ? {} : { parts }) };
}
