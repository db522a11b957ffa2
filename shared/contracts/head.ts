import { z } from 'zod';
import { amount, flag, positive, text, title, whole, extra } from './values';

/** Rules of a production; the defaults and their meaning stand in `shared/domain/defaults.ts`. */
export const rules = z.object({
  step: whole(1).optional(),
  mealAfter: whole(0).optional(),
  meal: whole(0).optional(),
  breakAfter: whole(0).optional(),
  break: whole(0).optional(),
  wrap: whole(0).optional(),
  listen: whole(0).optional(),
  reserve: amount.optional(),
  turnaround: whole(0).optional(),
  changeover: whole(0).optional(),
  oneRoomPerSong: flag.optional(),
});
export type Rules = z.infer<typeof rules>;

export const weights = z.object({
  waiting: amount.optional(),
  changeover: amount.optional(),
  day: amount.optional(),
  overtime: amount.optional(),
  call: amount.optional(),
  maybe: amount.optional(),
  should: amount.optional(),
  nice: amount.optional(),
});
export type Weights = z.infer<typeof weights>;

const CURRENCY = 'a currency of three capital letters such as EUR';

/** What is one per production: its name, place, rules and weights. */
export const production = z.object({
  code: text(40).regex(/\S/, { error: 'a short code such as SLUICE' }),
  title,
  timezone: text(64).refine(isZone, { error: 'an IANA time zone such as Europe/Lisbon' }),
  currency: z
    .string({ error: CURRENCY })
    .regex(/^[A-Z]{3}$/, { error: CURRENCY })
    .optional(),
  pitch: positive.optional(),
  recording: z.object({ rate: whole(1).optional(), bits: whole(1).optional() }).optional(),
  paper: z.enum(['A4', 'Letter'], { error: 'A4 or Letter' }).optional(),
  /** Where the session is, for call sheets and calendars. */
  place: z
    .object({
      name: text(200).optional(),
      address: text(500).optional(),
      door: text(500).optional(),
      parking: text(500).optional(),
      phone: text(60).optional(),
    })
    .optional(),
  /** Whom a late musician rings: name and number as one line. */
  late: text(200).optional(),
  dress: text(500).optional(),
  note: text(4000).optional(),
  rules: rules.optional(),
  weights: weights.optional(),
  extra,
});
export type Production = z.infer<typeof production>;

/** Whether this engine knows the time zone of that name. */
function isZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return !/^[+-]/.test(name);
  } catch {
    return false;
  }
}
