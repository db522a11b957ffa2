import { z } from 'zod';
import { production } from './head';
import { changeover, event, gear, part, pass, person, room, setup, song, type ResourceName } from './resources';
import { flag } from './values';

/**
 * What the fields of one row may be, per kind of row: the resource in the form of the file. Two kinds differ from the file:
 * the head says whether the passes were written by hand (`passesByHand`; without it they are derived from the parts), and a song's
 * parts are rows of their own, so that a song keeps `parts` only where the file gave an empty list.
 */
export const rowSchemas = {
  production: production.extend({ passesByHand: flag.optional() }),
  rooms: room,
  people: person,
  gear,
  setups: setup,
  changeovers: changeover,
  songs: song.extend({ parts: z.tuple([], { error: 'no parts here: each part is a row of its own' }).optional() }),
  parts: part,
  passes: pass,
  events: event,
} as const satisfies Record<ResourceName, z.ZodObject>;

/** Words for one row of each kind, for sentences. */
export const rowWords: Record<ResourceName, string> = {
  production: 'production',
  rooms: 'room',
  people: 'person',
  gear: 'gear',
  setups: 'set-up',
  changeovers: 'changeover',
  songs: 'song',
  parts: 'part',
  passes: 'pass',
  events: 'event',
};
