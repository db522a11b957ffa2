import { z } from 'zod';
import type { EventId, GearId, PartId, PassId, PersonId, RoomId, SetupId, SongId } from '../domain/flavours';
import {
  amount,
  between,
  extra,
  flag,
  hours,
  idOf,
  list,
  partMode,
  positive,
  presence,
  priority,
  span,
  text,
  threePoint,
  wallDate,
  wallTime,
  whole,
} from './values';
import { production, type Production } from './head';

/**
 * The resources of a production in the form of the production file: the file reader, the change path of the API and the client's
 * store all use these schemas, and infer their types from them. References are ids of the file. A field that is not given stays
 * not given (defaults are applied by the planner), so that import and export give the same production.
 */

const roomId = idOf<'room'>();
const personId = idOf<'person'>();
const gearId = idOf<'gear'>();
const setupId = idOf<'setup'>();
const songId = idOf<'song'>();
const partId = idOf<'part'>();
const passId = idOf<'pass'>();
const eventId = idOf<'event'>();

export const room = z.object({
  id: roomId,
  name: text(200).optional(),
  /** Length, width, height in metres. */
  size: z.tuple([positive, positive, positive], { error: 'three sizes in metres: [length, width, height]' }).optional(),
  people: whole(1).optional(),
  inputs: whole(0).optional(),
  phones: whole(0).optional(),
  standing: flag.optional(),
  standard: whole(0).optional(),
  open: list(hours),
  loud: list(hours).optional(),
  hears: list(roomId).optional(),
  operators: list(personId).optional(),
  price: z.object({ day: amount.optional(), overtimeHour: amount.optional() }).optional(),
  note: text().optional(),
  extra,
});
export type Room = z.infer<typeof room> & { id: RoomId };

export const person = z.object({
  id: personId,
  name: text(200).optional(),
  short: text(60).optional(),
  plays: list(text(100)).optional(),
  crew: flag.optional(),
  windows: list(presence).optional(),
  limits: z.object({ voice: whole(0).optional(), day: whole(0).optional() }).optional(),
  away: whole(0).optional(),
  size: whole(1).optional(),
  fee: z.object({ waiting: amount.optional(), call: amount.optional(), perHour: amount.optional() }).optional(),
  email: text(200).optional(),
  phone: text(60).optional(),
  bring: list(text(200)).optional(),
  food: text(500).optional(),
  access: text(500).optional(),
  headphones: text(500).optional(),
  note: text().optional(),
  extra,
});
export type Person = z.infer<typeof person> & { id: PersonId };

export const gear = z.object({
  id: gearId,
  name: text(200).optional(),
  count: whole(1).optional(),
  price: amount.optional(),
  windows: list(hours).optional(),
  note: text().optional(),
  extra,
});
export type Gear = z.infer<typeof gear> & { id: GearId };

export const setup = z.object({
  id: setupId,
  name: text(200).optional(),
  room: roomId.optional(),
  rig: whole(0).optional(),
  ready: z.record(personId, whole(0)).optional(),
  keepUntil: z.literal('approved', { error: 'approved, or nothing' }).optional(),
  note: text().optional(),
  extra,
});
export type Setup = z.infer<typeof setup> & { id: SetupId };

export const changeover = z.object({ from: setupId, to: setupId, minutes: whole(0), extra });
export type Changeover = z.infer<typeof changeover>;

const use = z.object({ gear: gearId, count: whole(1).optional() });
export type GearUse = z.infer<typeof use>;

const lag = whole(0).optional();
const dependency = z.union(
  [
    z.strictObject({ pass: passId, kind: z.enum(['captured', 'approved'], { error: 'captured or approved' }).optional(), lag }),
    z.strictObject({ event: eventId, lag }),
  ],
  { error: 'a pass or an event: { pass: ID, kind: captured or approved, lag: minutes } or { event: ID }' },
);
export type Dependency = z.infer<typeof dependency>;

const beforeWhat = z.union([z.strictObject({ event: eventId }), z.strictObject({ pass: passId })], {
  error: 'an event or a pass: { event: ID } or { pass: ID }',
});
export type BeforeWhat = z.infer<typeof beforeWhat>;

/** A pin fixes a start (`at`), a day (the date on which the room opens), or bounds the start and the end. */
const pin = z
  .object({ at: wallTime.optional(), day: wallDate.optional(), notBefore: wallTime.optional(), notAfter: wallTime.optional() })
  .refine((value) => Object.keys(value).length > 0, { error: 'a pin with at, day, notBefore or notAfter' });
export type Pin = z.infer<typeof pin>;

const voice = z.record(personId, whole(0)).optional();

export const part = z.object({
  id: partId,
  name: text(200).optional(),
  players: list(personId).optional(),
  mode: partMode.optional(),
  instrument: text(100).optional(),
  minutes: threePoint.optional(),
  takes: whole(0).optional(),
  room: roomId.optional(),
  setup: setupId.optional(),
  priority: priority.optional(),
  fallback: text(500).optional(),
  needs: list(text(200)).optional(),
  loud: flag.optional(),
  quiet: flag.optional(),
  voice,
  uses: list(use).optional(),
  after: list(dependency).optional(),
  /** Focus rank in the mix (1 = first), pan −1 left … 1 right, width 0 … 1. */
  focus: whole(1).optional(),
  pan: between(-1, 1, 'a number from -1 (left) to 1 (right)').optional(),
  width: between(0, 1, 'a number from 0 to 1').optional(),
  note: text().optional(),
  extra,
});
export type Part = z.infer<typeof part> & { id: PartId };

export const song = z.object({
  id: songId,
  code: text(40).optional(),
  title: text(200).optional(),
  /** Minutes of music, such as 4.2. */
  length: positive.optional(),
  key: text(40).optional(),
  capo: whole(0).optional(),
  tuning: text(100).optional(),
  pitch: positive.optional(),
  tempo: positive.optional(),
  /** Free tempo; a tempo map may be made from the take. */
  free: flag.optional(),
  meter: text(20).optional(),
  click: flag.optional(),
  form: text(500).optional(),
  priority: priority.optional(),
  rehearsal: whole(0).max(4, { error: 'a rehearsal level from 0 to 4' }).optional(),
  minutes: threePoint.optional(),
  room: roomId.optional(),
  setup: setupId.optional(),
  parts: list(part).optional(),
  note: text().optional(),
  extra,
});
export type Song = z.infer<typeof song> & { id: SongId };

export const pass = z.object({
  id: passId,
  name: text(200).optional(),
  song: songId.optional(),
  parts: list(partId).optional(),
  people: list(personId).optional(),
  room: roomId.optional(),
  setup: setupId.optional(),
  minutes: threePoint,
  priority: priority.optional(),
  loud: flag.optional(),
  quiet: flag.optional(),
  voice,
  uses: list(use).optional(),
  after: list(dependency).optional(),
  before: list(beforeWhat).optional(),
  together: list(passId).optional(),
  apart: list(passId).optional(),
  pin: pin.optional(),
  /** Left out of the plan by hand: it is not placed, and a must that is left out is not missing. */
  leftOut: flag.optional(),
  note: text().optional(),
  extra,
});
export type Pass = z.infer<typeof pass> & { id: PassId };

export const event = z
  .object({
    id: eventId,
    name: text(200).optional(),
    kind: text(60).optional(),
    ...span,
    room: roomId.optional(),
    people: list(personId).optional(),
    note: text().optional(),
    extra,
  })
  .refine((value) => value.from < value.to, { error: 'an event whose `from` is before its `to`', path: ['to'] });
export type SessionEvent = z.infer<typeof event> & { id: EventId };

/** A whole production as the file holds it. `passes` absent = derived from the songs' parts. */
export interface ProductionFile {
  production: Production;
  rooms: Room[];
  people: Person[];
  gear: Gear[];
  setups: Setup[];
  changeovers: Changeover[];
  songs: Song[];
  passes?: Pass[];
  events: SessionEvent[];
}

/** A whole production as it goes over the wire where a plan is shown with what it was made from. */
export const productionFile: z.ZodType<ProductionFile> = z.object({
  production,
  rooms: list(room),
  people: list(person),
  gear: list(gear),
  setups: list(setup),
  changeovers: list(changeover),
  songs: list(song),
  passes: list(pass).optional(),
  events: list(event),
});

/** The kinds of rows that a change can name. Keys: the file's id; `from>to` for a changeover; `song/part` for a part; `production` for the head. */
export const resourceNames = [
  'production',
  'rooms',
  'people',
  'gear',
  'setups',
  'changeovers',
  'songs',
  'parts',
  'passes',
  'events',
] as const;
export type ResourceName = (typeof resourceNames)[number];
