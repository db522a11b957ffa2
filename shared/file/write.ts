import { Document, isCollection, isMap, isScalar, isSeq, Scalar, visit } from 'yaml';
import type { ExtraField, ProductionFile } from '../contracts/resources';
import { type Fields, isFields, type Path, setOwn } from './paths';

/** A line is read at a glance up to here; what is longer is written over several. */
const LINE = 110;
/** Characters that a YAML reader would take for the end of a line or pass over. */
const UNSAFE_PLAIN = /[\r\u0085\u2028\u2029\uFEFF]/;

/**
 * Writes a production as a production file: short things on one line, unknown fields back at their place. Reading what is written
 * gives the same production.
 */
export function writeProductionFile(file: ProductionFile): string {
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
function fieldsOf(file: ProductionFile): Fields {
  const { rules, weights, extra, ...production } = file.production;
  const root: Fields = { redpoll: 1, production };
  if (rules) root.rules = rules;
  if (weights) root.weights = weights;
  root.rooms = file.rooms.map(withExtra);
  if (file.people.length > 0) root.people = file.people.map(withExtra);
  if (file.gear.length > 0) root.gear = file.gear.map(withExtra);
  if (file.setups.length > 0) root.setups = file.setups.map(withExtra);
  if (file.changeovers.length > 0) root.changeovers = file.changeovers.map(withExtra);
  if (file.songs.length > 0)
    root.songs = file.songs.map((song) => withExtra({ ...song, ...(song.parts ? { parts: song.parts.map(withExtra) } : {}) }));
  if (file.passes) root.passes = file.passes.map(withExtra);
  if (file.events.length > 0) root.events = file.events.map(withExtra);
  return restored(root, extra);
}

function withExtra<Resource extends { extra?: ExtraField[] }>(resource: Resource): Fields {
  const { extra, ...fields } = resource;
  return restored(fields, extra);
}

/** Puts unknown fields back. One whose surroundings are gone has nowhere to stand. */
function restored(fields: Fields, extra: ExtraField[] | undefined): Fields {
  if (!extra || extra.length === 0) return fields;
  const copy = structuredCopy(fields);
  for (const { path, value } of extra) {
    const key = path.at(-1);
    const owner = ownerAt(copy, path.slice(0, -1));
    if (owner && typeof key === 'string' && !Object.hasOwn(owner, key)) setOwn(owner, key, value);
  }
  return copy as Fields;
}

function ownerAt(root: unknown, path: Path): Fields | undefined {
  let at = root;
  for (const step of path) {
    if (typeof step === 'number') at = Array.isArray(at) ? at[step] : undefined;
    else at = isFields(at) && Object.hasOwn(at, step) ? at[step] : undefined;
  }
  return isFields(at) ? at : undefined;
}

function structuredCopy(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(structuredCopy);
  if (!isFields(value)) return value;
  const copy: Fields = {};
  for (const [key, field] of Object.entries(value)) setOwn(copy, key, structuredCopy(field));
  return copy;
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
