import { z } from 'zod';
import type { Flavour, WallDate, WallTime } from '../domain/flavours';

/** The values that resources are made of. Every message says what was expected, for the file reader and the API alike. */

/** An id of one list; the flavour keeps a person's id from being used as a room's. */
export function idOf<Name extends string>(): z.ZodType<Flavour<string, Name>, string> {
  return z
    .string({ error: 'an id such as room-a (text)' })
    .max(64, { error: 'an id of at most 64 characters' })
    .regex(/^[a-z0-9][a-z0-9-]*$/, { error: 'an id of small letters, digits and hyphens, such as room-a' });
}

function exists(year: number, month: number, day: number): boolean {
  const date = new Date(Date.UTC(year, month - 1, day));
  return date.getUTCFullYear() === year && date.getUTCMonth() === month - 1 && date.getUTCDate() === day;
}

const DATE = /^(\d{4})-(\d\d)-(\d\d)$/;
const TIME = /^(\d{4})-(\d\d)-(\d\d)T([01]\d|2[0-3]):([0-5]\d)$/;

export const wallDate = z
  .string({ error: 'a date such as 2027-03-08' })
  .regex(DATE, { error: 'a date such as 2027-03-08' })
  .refine(
    (text) => {
      const m = DATE.exec(text);
      return !m || exists(Number(m[1]), Number(m[2]), Number(m[3]));
    },
    { error: 'a date that exists' },
  ) as unknown as z.ZodType<WallDate, string>;

export const wallTime = z
  .string({ error: 'a wall-clock time such as 2027-03-08T10:00' })
  .regex(TIME, { error: 'a wall-clock time such as 2027-03-08T10:00' })
  .refine(
    (text) => {
      const m = TIME.exec(text);
      return !m || exists(Number(m[1]), Number(m[2]), Number(m[3]));
    },
    { error: 'a date that exists' },
  ) as unknown as z.ZodType<WallTime, string>;

/** Control characters other than tab and line breaks, halves of a surrogate pair, and two code points that are no characters. */
const UNPRINTABLE = /[^\P{Cc}\t\n\r]|\p{Cs}|[\uFFFE\uFFFF]/u;
export const NO_CONTROL_CHARACTERS = 'text without control characters';
/** Position of the first such character, or -1. */
export const unprintableAt = (value: string): number => value.search(UNPRINTABLE);

/** One line or more of text without control characters other than line breaks and tabs. */
export const text = (max = 10_000) =>
  z
    .string({ error: ({ input }) => (input === undefined ? 'text' : 'text; put numbers and true or false in quotes') })
    .max(max, { error: `text of at most ${max} characters` })
    .refine((value) => unprintableAt(value) < 0, { error: NO_CONTROL_CHARACTERS });

export const title = text(200).refine((value) => value.trim() !== '', { error: 'text that is not empty' });

export const flag = z.boolean({ error: 'true or false' });

const LARGEST = 1_000_000_000;
export const whole = (least: number) =>
  z
    .int({ error: `a whole number of at least ${least}` })
    .min(least, { error: `a whole number of at least ${least}` })
    .max(LARGEST, { error: 'a number of at most 1000000000' });

/** A finite number that is not negative: weights, fees, prices, shares. */
export const amount = z
  .number({ error: 'a number of at least 0' })
  .min(0, { error: 'a number of at least 0' })
  .max(LARGEST, { error: 'a number of at most 1000000000' });

export const positive = z
  .number({ error: 'a number above 0' })
  .positive({ error: 'a number above 0' })
  .max(LARGEST, { error: 'a number of at most 1000000000' });

export const between = (least: number, most: number, error: string) => z.number({ error }).min(least, { error }).max(most, { error });

const EXPECTED_MINUTES = 'whole minutes above 0, or [low, likely, high] with low ≤ likely ≤ high';
const oneMinutes = z.int({ error: EXPECTED_MINUTES }).min(1, { error: EXPECTED_MINUTES }).max(100_000, { error: 'at most 100000 minutes' });
/** Minutes of a pass: one number (means all three), or low, likely, high. */
export const threePoint = z.union(
  [
    oneMinutes,
    z.tuple([oneMinutes]),
    z
      .tuple([oneMinutes, oneMinutes, oneMinutes])
      .refine(([low, likely, high]) => low <= likely && likely <= high, { error: EXPECTED_MINUTES }),
  ],
  { error: EXPECTED_MINUTES },
);
export type ThreePoint = z.infer<typeof threePoint>;

export const span = { from: wallTime, to: wallTime };
const inOrder = (window: { from: string; to: string }) => window.from < window.to;
const IN_ORDER = { error: 'a window whose `from` is before its `to`', path: ['to'] };

/** A stretch of wall-clock time in which something is open, loud work may happen, or gear is there. */
export const hours = z.object(span).refine(inOrder, IN_ORDER);
export type Hours = z.infer<typeof hours>;

/** A stretch of time in which a person can be there; `sure: false` is a maybe. */
export const presence = z.object({ ...span, sure: flag.optional() }).refine(inOrder, IN_ORDER);
export type Presence = z.infer<typeof presence>;

export const priority = z.enum(['must', 'should', 'nice'], { error: 'must, should or nice' });
export type Priority = z.infer<typeof priority>;

export const partMode = z.enum(['live', 'guide', 'overdub', 'double', 'stack', 'repair'], {
  error: 'live, guide, overdub, double, stack or repair',
});
export type PartMode = z.infer<typeof partMode>;

export const list = <Item extends z.ZodType>(item: Item, most = 2000) =>
  z.array(item, { error: 'a list' }).max(most, { error: `a list of at most ${most}` });

/**
 * A field of the file that this version does not know, kept for export; `path` is relative to its resource. The production's paths
 * begin at the root of the file, because its rules and weights stand beside it: `[production, place, floor]`, `[rules, tea]`.
 */
export const extraField = z.object({ path: z.array(z.union([z.string(), z.number()])), value: z.unknown() });
export type ExtraField = z.infer<typeof extraField>;
export const extra = z.array(extraField).optional();
