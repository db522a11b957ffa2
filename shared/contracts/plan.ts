import { z } from 'zod';
import type { PassId, PersonId, RoomId, SetupId, WallDate, WallTime } from '../domain/flavours';

/** What planning answers: the JSON object of the `plan` command, and what a draft plan stores. Times are wall clock in the production's zone. */

export const itemKinds = ['pass', 'rig', 'changeover', 'meal', 'break', 'listen', 'reserve', 'wrap', 'event'] as const;
export type ItemKind = (typeof itemKinds)[number];

const wall = z.string() as z.ZodType<WallTime, string>;
const date = z.string() as z.ZodType<WallDate, string>;

export const planItem = z.object({
  kind: z.enum(itemKinds),
  /** The pass or event; other kinds have none. */
  id: z.string().optional(),
  room: (z.string() as z.ZodType<RoomId, string>).optional(),
  setup: (z.string() as z.ZodType<SetupId, string>).optional(),
  start: wall,
  end: wall,
  people: z.array(z.string() as z.ZodType<PersonId, string>),
});
export type PlanItem = z.infer<typeof planItem>;

export const planCall = z.object({
  person: z.string() as z.ZodType<PersonId, string>,
  /** Date of the room-day, past midnight too. */
  date,
  arrive: wall,
  /** When they must be ready to play: the start of their first item. */
  ready: wall,
  release: wall,
  /** Minutes in items they belong to, and minutes waited. */
  working: z.number(),
  waiting: z.number(),
});
export type PlanCall = z.infer<typeof planCall>;

export const planCost = z.object({
  total: z.number(),
  waiting: z.number(),
  changeover: z.number(),
  day: z.number(),
  overtime: z.number(),
  call: z.number(),
  maybe: z.number(),
  unplaced: z.number(),
});
export type PlanCost = z.infer<typeof planCost>;

export const dayOdds = z.object({ room: z.string() as z.ZodType<RoomId, string>, date, p50: wall, p90: wall });
export type DayOdds = z.infer<typeof dayOdds>;

export const planOdds = z.object({
  /** Chance that every must pass gets done, 0 … 1. */
  musts: z.number(),
  days: z.array(dayOdds),
});
export type PlanOdds = z.infer<typeof planOdds>;

/** Facts that clash, by name: `people.lys.windows`, `passes.s6-basics`, `rules.step` …, and the sentence. */
export const conflict = z.object({ facts: z.array(z.string()), says: z.string() });
export type Conflict = z.infer<typeof conflict>;

export const madePlan = z.object({
  status: z.enum(['optimal', 'feasible']),
  cost: planCost,
  bound: z.number(),
  seconds: z.number(),
  items: z.array(planItem),
  calls: z.array(planCall),
  unplaced: z.array(z.string() as z.ZodType<PassId, string>),
  odds: planOdds,
  conflicts: z.array(conflict),
});
/** A plan that places every must pass. */
export type MadePlan = z.infer<typeof madePlan>;

export const noPlan = z.object({
  status: z.enum(['impossible', 'unsolved']),
  cost: z.null(),
  bound: z.null(),
  seconds: z.number(),
  items: z.tuple([]),
  calls: z.tuple([]),
  unplaced: z.array(z.string() as z.ZodType<PassId, string>),
  odds: z.null(),
  conflicts: z.array(conflict),
});
/** Proven impossible (with the facts that clash), or not known in the time given. */
export type NoPlan = z.infer<typeof noPlan>;

export const planOutcome = z.discriminatedUnion('status', [madePlan, noPlan]);
export type PlanOutcome = MadePlan | NoPlan;
