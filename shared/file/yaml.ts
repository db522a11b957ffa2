import { isAlias, isMap, isNode, isScalar, isSeq, LineCounter, parseDocument } from 'yaml';
import type { Alias, Document, Node, Pair, YAMLError, YAMLMap, YAMLSeq } from 'yaml';
import { NO_CONTROL_CHARACTERS, unprintableAt } from '../contracts/values';
import { LIMITS, textFault } from './limits';
import { type Fields, type Path, setOwn } from './paths';

/** A fault of the file before it has a line: `key` asks for the line of the field's name rather than of its value. */
export interface PathFault {
  path: Path;
  expected: string;
  key?: boolean;
}

/** A YAML text as plain values, and the way back from a path to the line it stands on. */
export interface ReadText {
  /** Absent where nothing can be told about the values. */
  root?: unknown;
  faults: PathFault[];
  lineOf(fault: PathFault): number;
}

/** What was expected, by the parser's own codes. */
const SYNTAX: Record<YAMLError['code'], string> = {
  ALIAS_PROPS: 'an alias (*name) without a tag or an anchor',
  BAD_ALIAS: 'an alias such as *name, without further signs',
  BAD_DIRECTIVE: 'a text without this directive, or %YAML 1.2',
  BAD_DQ_ESCAPE: 'a known escape after \\ in double quotes, such as \\n or \\"',
  BAD_INDENT: 'lines indented as deep as what they belong to, and every bracket closed',
  BAD_PROP_ORDER: 'tags and anchors before the value',
  BAD_SCALAR_START: 'quotes around text that begins with this sign',
  BLOCK_AS_IMPLICIT_KEY: 'one field a line; put text that holds ": " in quotes',
  BLOCK_IN_FLOW: 'no indented list or mapping inside { } or [ ]',
  DUPLICATE_KEY: 'a field that is given once',
  IMPOSSIBLE: 'YAML 1.2',
  KEY_OVER_1024_CHARS: 'a field name of at most 1024 characters',
  MISSING_CHAR: 'the sign that is missing: a closing quote or bracket, a comma, or a colon after a field name',
  MULTILINE_IMPLICIT_KEY: 'a field name on one line',
  MULTIPLE_ANCHORS: 'one anchor a value',
  MULTIPLE_DOCS: 'one document in the file',
  MULTIPLE_TAGS: 'one tag a value',
  NON_STRING_KEY: 'a field name that is text',
  RESOURCE_EXHAUSTION: `values nested at most ${LIMITS.depth} deep`,
  TAB_AS_INDENT: 'spaces instead of a tab at the start of the line',
  TAG_RESOLVE_FAILED: 'a value without this tag',
  UNEXPECTED_TOKEN: 'YAML that goes on in another way here: look for a missing dash, comma, quote or bracket',
  BAD_COLLECTION_TYPE: 'a tag that fits the value',
};

/**
 * Reads one YAML 1.2 document with the core schema. Never throws: whatever is wrong with the text is a fault. Aliases are followed, and
 * count each time against the limits, so a bomb of them ends as a fault as well.
 */
export function readText(text: string): ReadText {
  const lines = new LineCounter();
  const line = (offset: number) => lines.linePos(offset).line;
  const early = textFault(text);
  if (early) {
    lines.lineStarts = lineStartsOf(text, early.offset);
    return { faults: [{ path: [], expected: early.expected }], lineOf: () => line(early.offset) };
  }
  const document = parseDocument(text, {
    version: '1.2',
    schema: 'core',
    merge: false,
    resolveKnownTags: false,
    stringKeys: true,
    // Repeated names are looked for below: the parser's own way takes the square of their number.
    uniqueKeys: false,
    lineCounter: lines,
    prettyErrors: false,
    logLevel: 'error',
  });
  const places = new Map<PathFault, number>();
  const faults: PathFault[] = [];
  for (const error of [...document.errors, ...document.warnings]) {
    const { path, node } = around(document, error.pos[0]);
    const fault = { path, expected: SYNTAX[error.code] };
    // A quote that is never closed is seen at the end of what it swallowed; it is told where it opens.
    const quoted = isScalar(node) && (node.type === 'QUOTE_DOUBLE' || node.type === 'QUOTE_SINGLE');
    places.set(fault, line((error.code === 'MISSING_CHAR' && quoted ? startOf(node) : undefined) ?? error.pos[0]));
    faults.push(fault);
  }
  const { yaml } = document.directives ?? {};
  if (yaml?.explicit && yaml.version !== '1.2') faults.push({ path: [], expected: SYNTAX.BAD_DIRECTIVE });
  const values = new Plain();
  const offsetOf = offsetsOf(document, values.aliases);
  const lineOf = (fault: PathFault) => places.get(fault) ?? line(offsetOf(fault));
  // A text that does not parse is told alone: what its values seem to be would only mislead.
  if (document.errors.length > 0) return { faults, lineOf };
  const root = values.of(document.contents, []);
  faults.push(...values.faults);
  return values.tooMany ? { faults, lineOf } : { root, faults, lineOf };
}

function lineStartsOf(text: string, until: number): number[] {
  const starts = [0];
  for (let at = text.indexOf('\n'); at >= 0 && at < until; at = text.indexOf('\n', at + 1)) starts.push(at + 1);
  return starts;
}

/** Turns nodes into plain values, notes what they may not hold, and keeps count. */
class Plain {
  readonly faults: PathFault[] = [];
  readonly aliases = new Map<Alias, Node>();
  tooMany = false;
  private readonly anchors = new Map<string, Node>();
  private count = 0;
  private following = 0;

  of(node: unknown, path: Path): unknown {
    if (this.tooMany || !isNode(node)) return null;
    this.count++;
    if (this.count > LIMITS.values) return this.stop(path, `a file of at most ${LIMITS.values} values`);
    if (path.length > LIMITS.depth) return this.stop(path, `values nested at most ${LIMITS.depth} deep`);
    if (isAlias(node)) return this.follow(node, path);
    // Inside an alias the anchors have been met before, and may have been given to something else since.
    if (node.anchor !== undefined && this.following === 0) this.anchors.set(node.anchor, node);
    if (isMap(node)) return this.mapping(node, path);
    if (isSeq(node)) return this.list(node, path);
    return isScalar(node) ? this.scalar(node.value, path) : null;
  }

  private stop(path: Path, expected: string): null {
    this.tooMany = true;
    this.faults.push({ path: path.slice(0, 8), expected });
    return null;
  }

  private follow(alias: Alias, path: Path): unknown {
    const target = this.aliases.get(alias) ?? this.anchors.get(alias.source);
    if (!target) {
      this.faults.push({ path, expected: `an alias of an anchor that stands before it (&${alias.source})` });
      return null;
    }
    this.aliases.set(alias, target);
    this.following++;
    const value = this.of(target, path);
    this.following--;
    return value;
  }

  private mapping(map: YAMLMap, path: Path): Fields {
    const fields: Fields = {};
    for (const pair of map.items) {
      const key = keyOf(pair);
      if (Object.hasOwn(fields, key)) {
        this.faults.push({ path: [...path, key], expected: SYNTAX.DUPLICATE_KEY, key: true });
        continue;
      }
      if (unprintableAt(key) >= 0) this.faults.push({ path: [...path, key], expected: NO_CONTROL_CHARACTERS, key: true });
      setOwn(fields, key, this.of(pair.value, [...path, key]));
    }
    return fields;
  }

  private list(seq: YAMLSeq, path: Path): unknown[] {
    return seq.items.map((item, index) => this.of(item, [...path, index]));
  }

  private scalar(value: unknown, path: Path): unknown {
    if (typeof value === 'string' && unprintableAt(value) >= 0) this.faults.push({ path, expected: NO_CONTROL_CHARACTERS });
    if (typeof value === 'number' && !Number.isFinite(value)) this.faults.push({ path, expected: 'a finite number' });
    return value;
  }
}

/** A key that is no text is a fault of the parser; it is not written out, because it may be endless. */
const keyOf = (pair: Pair): string => (isScalar(pair.key) ? String(pair.key.value) : '?');

/**
 * Finds the offset of the value at a path, of the field's name where the path ends in one, or of the nearest thing around it that is
 * there. Where a name is given twice, `key` asks for the last one.
 */
function offsetsOf(document: Document, aliases: ReadonlyMap<Alias, Node>): (fault: PathFault) => number {
  const indices = new Map<YAMLMap, Map<string, { first: Pair; last: Pair }>>();
  const indexOf = (map: YAMLMap) => {
    const known = indices.get(map);
    if (known) return known;
    const index = new Map<string, { first: Pair; last: Pair }>();
    for (const pair of map.items) index.set(keyOf(pair), { first: index.get(keyOf(pair))?.first ?? pair, last: pair });
    indices.set(map, index);
    return index;
  };
  return ({ path, key }) => {
    let at: unknown = document.contents;
    let offset = startOf(at) ?? 0;
    for (const [depth, step] of path.entries()) {
      while (isAlias(at)) at = aliases.get(at);
      if (isMap(at)) {
        const named = indexOf(at).get(String(step));
        if (!named) return offset;
        const pair = key && depth === path.length - 1 ? named.last : named.first;
        offset = startOf(pair.key) ?? offset;
        at = pair.value;
      } else if (isSeq(at) && typeof step === 'number' && at.items[step] !== undefined) {
        at = at.items[step];
        offset = startOf(at) ?? offset;
      } else return offset;
    }
    return offset;
  };
}

const startOf = (node: unknown): number | undefined => (isNode(node) ? node.range?.[0] : undefined);

/** The innermost value around an offset, and its path. */
function around(document: Document, offset: number): { path: Path; node: unknown } {
  const path: (string | number)[] = [];
  const endsBefore = (node: unknown) => !isNode(node) || node.range == null || node.range[1] < offset;
  let node: unknown = document.contents;
  while (!endsBefore(node)) {
    if (isMap(node)) {
      const pair = node.items.findLast((candidate) => (startOf(candidate.key) ?? Infinity) <= offset);
      if (!pair || (endsBefore(pair.key) && endsBefore(pair.value))) break;
      path.push(keyOf(pair));
      node = endsBefore(pair.value) ? pair.key : pair.value;
    } else if (isSeq(node)) {
      const index = node.items.findLastIndex((item) => (startOf(item) ?? Infinity) <= offset && !endsBefore(item));
      if (index < 0) break;
      path.push(index);
      node = node.items[index];
    } else break;
  }
  return { path, node };
}
