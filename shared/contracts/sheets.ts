import { z } from 'zod';
import { madePlan } from './plan';
import { productionFile } from './resources';

/** A plan that can be printed, and how its sheets are asked for. */
export const sheetChoice = z.object({
  /** What a sheet's address calls it: a version's number, or `draft:` and the id of a draft. */
  named: z.string(),
  /** Null for a draft. */
  version: z.int().nullable(),
  at: z.string(),
});
export type SheetChoice = z.infer<typeof sheetChoice>;

/** What the page of sheets is drawn from: one plan with the production as it was then, as this reader may see it. */
export const sheetsPlan = z.object({
  /** Every version, the newest first; for those who see drafts, the newest draft before them where it is newer. */
  choices: z.array(sheetChoice),
  shown: sheetChoice,
  file: productionFile,
  outcome: madePlan,
  /** The person of the production that this reader is; null for those who are none. */
  own: z.string().nullable(),
});
export type SheetsPlan = z.infer<typeof sheetsPlan>;
