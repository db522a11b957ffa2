import type { Role } from '../contracts/roles';
import type { ResourceName } from '../contracts/resources';

/**
 * Who may do and see what in a production: one table for the server, which enforces it, and for the client, which leaves out what
 * would be refused. What is not listed is denied.
 */

const PRODUCER: readonly Role[] = ['producer'];
const DESK: readonly Role[] = ['producer', 'engineer'];
const CREW: readonly Role[] = ['producer', 'engineer', 'assistant'];
const BAND: readonly Role[] = ['producer', 'engineer', 'assistant', 'musician'];
const ALL: readonly Role[] = ['producer', 'engineer', 'assistant', 'musician', 'guest'];

const ACTIONS = {
  /** Open the production: its rows as far as the fields' readers allow. */
  read: ALL,
  /** Send changes; which rows and fields is decided by `refusalOf`. */
  change: BAND,
  readHistory: CREW,
  export: CREW,
  readDrafts: CREW,
  plan: DESK,
  readVersions: ALL,
  publish: DESK,
  /** Print any sheet; a musician prints the call sheet of their own from a published version. */
  print: CREW,
  printOwn: BAND,
  /** Make, see and withdraw a calendar address of one's own; `manageLinks` everybody's. */
  ownLinks: BAND,
  manageLinks: DESK,
  readMembers: CREW,
  manageMembers: PRODUCER,
  remove: PRODUCER,
} as const satisfies Record<string, readonly Role[]>;

/** What a member may ask for, besides the fields of a row. */
export type Action = keyof typeof ACTIONS;
export const actions = Object.keys(ACTIONS) as Action[];

/** Whether somebody of that role may do that in the production. */
export function may(role: Role, action: Action): boolean {
  return ACTIONS[action].includes(role);
}

/** Somebody who reads or writes: their role, and the person of the production they are, if any. */
export interface Reader {
  role: Role;
  person: string | null;
}

interface FieldReaders {
  /** Roles that see rows of this kind at all. */
  row: readonly Role[];
  /** Readers of single fields or of fields within a group (`fee.call`); a field that is not listed has the row's readers. */
  fields: Readonly<Record<string, readonly Role[]>>;
  /** Fields that a person also reads, and may write, in their own row. */
  own?: readonly string[];
}

const READERS: Readonly<Record<ResourceName, FieldReaders>> = {
  production: {
    row: ALL,
    fields: {
      'place.address': BAND,
      'place.door': BAND,
      'place.parking': BAND,
      'place.phone': BAND,
      late: BAND,
      dress: BAND,
      note: CREW,
      weights: CREW,
      extra: CREW,
    },
  },
  rooms: { row: ALL, fields: { price: PRODUCER, note: CREW, extra: CREW } },
  people: {
    row: ALL,
    fields: {
      'fee.call': PRODUCER,
      'fee.perHour': PRODUCER,
      fee: CREW,
      windows: CREW,
      limits: CREW,
      away: CREW,
      email: CREW,
      phone: CREW,
      bring: CREW,
      food: CREW,
      access: CREW,
      headphones: CREW,
      note: CREW,
      extra: CREW,
    },
    own: ['windows', 'email', 'phone', 'bring', 'food', 'access', 'headphones'],
  },
  gear: { row: CREW, fields: { price: PRODUCER } },
  setups: { row: ALL, fields: { note: CREW, extra: CREW } },
  changeovers: { row: CREW, fields: {} },
  songs: { row: ALL, fields: { rehearsal: CREW, note: CREW, extra: CREW } },
  parts: { row: ALL, fields: { fallback: CREW, note: CREW, extra: CREW } },
  passes: { row: ALL, fields: { note: CREW, extra: CREW } },
  events: { row: ALL, fields: { note: CREW, extra: CREW } },
};

const isOwn = (reader: Reader, resource: ResourceName, key: string) =>
  resource === 'people' && reader.person !== null && reader.person === key;

/** Paths of a row (`phone`, `fee.call`) that this reader does not see; null where they do not see the row at all. */
export function hiddenPaths(reader: Reader, resource: ResourceName, key: string): string[] | null {
  const { row, fields, own = [] } = READERS[resource];
  if (!row.includes(reader.role)) return null;
  return Object.entries(fields)
    .filter(([path, readers]) => !readers.includes(reader.role) && !(isOwn(reader, resource, key) && own.includes(path)))
    .map(([path]) => path);
}

const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null && !Array.isArray(value);

/** Unknown fields of the file stand under `extra` with their path; those inside a hidden group, such as a fee, are hidden with it. */
function isHiddenExtra(entry: unknown, hidden: readonly string[]): boolean {
  const first: unknown = isRecord(entry) && Array.isArray(entry.path) ? entry.path[0] : undefined;
  return hidden.some((path) => path.split('.')[0] === first);
}

/** The fields of a row as this reader may see them; null where they do not see the row. The fields given are not changed. */
export function readableFields(
  reader: Reader,
  resource: ResourceName,
  key: string,
  fields: Readonly<Record<string, unknown>>,
): Record<string, unknown> | null {
  const hidden = hiddenPaths(reader, resource, key);
  if (hidden === null) return null;
  const seen: Record<string, unknown> = { ...fields };
  for (const path of hidden) {
    const [group, inner] = path.split('.') as [string, string | undefined];
    const value = seen[group];
    if (inner === undefined) delete seen[group];
    else if (isRecord(value) && inner in value) {
      const rest = { ...value };
      delete rest[inner];
      if (Object.keys(rest).length > 0) seen[group] = rest;
      else delete seen[group];
    }
  }
  if (Array.isArray(seen.extra)) seen.extra = seen.extra.filter((entry) => !isHiddenExtra(entry, hidden));
  return seen;
}

/**
 * The fields sent by a writer, completed with what the stored row holds and the writer cannot see, so that an edit of a group
 * (`fee: { waiting: 2 }`) never clears a hidden half of it.
 */
export function keepHidden(
  reader: Reader,
  resource: ResourceName,
  key: string,
  stored: Readonly<Record<string, unknown>>,
  sent: Readonly<Record<string, unknown>>,
): Record<string, unknown> {
  const hidden = hiddenPaths(reader, resource, key) ?? [];
  const whole: Record<string, unknown> = { ...sent };
  for (const path of hidden) {
    const [group, inner] = path.split('.') as [string, string | undefined];
    const kept = stored[group];
    if (inner === undefined || !(group in sent) || !isRecord(kept) || !(inner in kept)) continue;
    const value = whole[group];
    whole[group] = { ...(isRecord(value) ? value : {}), [inner]: kept[inner] };
  }
  if ('extra' in sent && Array.isArray(stored.extra)) {
    const kept = stored.extra.filter((entry) => isHiddenExtra(entry, hidden));
    if (kept.length > 0) whole.extra = [...(Array.isArray(sent.extra) ? sent.extra : []), ...kept];
  }
  return whole;
}

/** What a writer asks for; `fields` as sent. */
export interface Attempt {
  resource: ResourceName;
  key: string;
  op: 'create' | 'update' | 'remove' | 'restore';
  fields: Readonly<Record<string, unknown>>;
}

/** Why this writer may not make this change, as a sentence; null where they may. */
export function refusalOf(writer: Reader, attempt: Attempt): string | null {
  const { resource, key, op, fields } = attempt;
  if (!DESK.includes(writer.role)) {
    if (!isOwn(writer, resource, key) || op !== 'update') return 'Only the producer and the engineer change this. Ask one of them.';
    const own = READERS[resource].own ?? [];
    const foreign = Object.keys(fields).find((field) => !own.includes(field));
    return foreign === undefined
      ? null
      : `You may change your own ${own.join(', ')}, but not ${foreign}. Ask the producer or the engineer for that.`;
  }
  const hidden = hiddenPaths(writer, resource, key);
  if (hidden === null) return 'You cannot see this, and so not change it. Ask the producer.';
  for (const path of hidden) {
    const [group, inner] = path.split('.') as [string, string | undefined];
    const value = fields[group];
    const names = inner === undefined ? group in fields : isRecord(value) && inner in value;
    if (names) return `Only the producer sees and changes ${path}. Leave it out, or ask the producer.`;
  }
  if (Array.isArray(fields.extra) && fields.extra.some((entry) => isHiddenExtra(entry, hidden)))
    return 'Only the producer changes unknown fields beside money. Leave them out, or ask the producer.';
  return null;
}
