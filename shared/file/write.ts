import { Document, isCollection, isMap, isScalar, isSeq, Scalar, visit } from 'yaml';
import type { z } from 'zod';
import * as head from '../contracts/head';
import * as resources from '../contracts/resources';
import type { ExtraField } from '../contracts/values';
import { type Fields, isFields, type Path, setOwn } from './paths';
import { separate } from './unknown';

/** A line is read at a glance up to here; what is longer is written over several. */
const LINE = 110;
/** Characters that a YAML reader would take for the end of a line or pass over. */
const UNSAFE_PLAIN = /[\r\u0085\u2028\u2029\uFEFF]/;

/**
 * Writes a production as a production file: short things on one line, unknown fields back at their place. Reading what is written
 * gives the same production.
 */
export function writeProductionFile(file: resources.ProductionFile): string {
  const document = new Document(fieldsOf(file), { version: '1.2', schema: 'core', merge: false, aliasDuplicateObjects: false });
  visit(document, {
    Scalar: (_, node) => {
      if (typeof node.value === 'string' && UNSAFE_PLAIN.test(node.value)) node.type = Scalar.QUOTE_DOUBLE;
    },
  });
  const root = document.contents;
  if (isMap(root))
    for (const pair of root.items) {
      if (isScalar(pair.key)) pair.key.spaceBefore = pair.key.value !== 'redpoll';
      layOut(pair.value, isScalar(pair.key) ? String(pair.key.value).length + 2 : LINE);
      if (isSeq(pair.value)) pair.value.flow = pair.value.items.length === 0;
    }
  return document.toString({ lineWidth: 0, flowCollectionPadding: true, singleQuote: false });
}

/** The production in the order and shape of the file. */
function fieldsOf(file: resources.ProductionFile): Fields {
  const { rules, weights, extra, ...production } = file.production;
  const root: Fields = { redpoll: 1, production: inOrder(head.production, production) };
  if (rules) root.rules = inOrder(head.rules, rules);
  if (weights) root.weights = inOrder(head.weights, weights);
  const list = (name: string, items: Kept[], schema: z.ZodType) => {
    if (items.length > 0) root[name] = items.map((item) => written(schema, item));
  };
  root.rooms = [];
  list('rooms', file.rooms, resources.room);
  list('people', file.people, resources.person);
  list('gear', file.gear, resources.gear);
  list('setups', file.setups, resources.setup);
  list('changeovers', file.changeovers, resources.changeover);
  if (file.songs.length > 0) root.songs = file.songs.map(songFields);
  if (file.passes) root.passes = [];
  list('passes', file.passes ?? [], resources.pass);
  list('events', file.events, resources.event);
  return restored(root, extra);
}

/** A resource with the unknown fields it came with. */
type Kept = { extra?: ExtraField[] };

/** Fields in the order of the format, whatever order a database kept them in. */
const inOrder = (schema: z.ZodType, fields: object): unknown => separate(schema, fields).known;

function written(schema: z.ZodType, resource: Kept): Fields {
  const { extra, ...fields } = resource;
  return restored(inOrder(schema, fields) as Fields, extra);
}

function songFields(song: resources.Song): Fields {
  const { parts, ...rest } = song;
  const fields = written(resources.song, rest);
  if (parts) fields.parts = parts.map((part) => written(resources.part, part));
  return fields;
}

/** Puts unknown fields back. One whose surroundings are gone has nowhere to stand. */
function restored(fields: Fields, extra: ExtraField[] = []): Fields {
  for (const { path, value } of extra) {
    const key = path.at(-1);
    const owner = ownerAt(fields, path.slice(0, -1));
    if (owner && typeof key === 'string' && !Object.hasOwn(owner, key)) setOwn(owner, key, value);
  }
  return fields;
}

function ownerAt(root: unknown, path: Path): Fields | undefined {
  let at = root;
  for (const step of path) {
    if (typeof step === 'number') at = Array.isArray(at) ? at[step] : undefined;
    else at = isFields(at) && Object.hasOwn(at, step) ? at[step] : undefined;
  }
  return isFields(at) ? at : undefined;
}

/** Writes a list or mapping on one line where it fits, else one item a line. Answers its width on one line. */
function layOut(node: unknown, before: number): number {
  if (isScalar(node)) return typeof node.value === 'string' ? JSON.stringify(node.value).length : String(node.value).length;
  if (!isCollection(node)) return 0;
  let width = 4;
  if (isMap(node))
    for (const pair of node.items) {
      const key = isScalar(pair.key) ? String(pair.key.value).length + 2 : LINE;
      width += key + 2 + layOut(pair.value, before + key + 2);
    }
  if (isSeq(node)) for (const item of node.items) width += 2 + layOut(item, before + 4);
  node.flow = before + width <= LINE;
  return width;
}
