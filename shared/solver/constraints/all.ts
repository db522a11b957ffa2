import { apart } from './apart';
import type { StartConstraint } from './constraint';
import { gearCount } from './gear-count';
import { dayLimit } from './limits';
import { ownMeals } from './own-meals';
import { stays } from './stays';
import { turnaround } from './turnaround';
import { voice } from './voice';

/** Asked once for each try of a start. */
export const OF_THE_PASS: readonly StartConstraint[] = [apart, gearCount];

/** Asked for each person of the pass, once the new items are among those of the person's date. */
export const OF_A_PERSON: readonly StartConstraint[] = [stays, turnaround, dayLimit, ownMeals, voice];
