import { ref, type ComputedRef, type Ref } from 'vue';
import type { Pin, ProductionFile } from '../../../shared/contracts/resources';
import type { PassId } from '../../../shared/domain/flavours';
import { editsToSetPass } from '../../../shared/domain/passes';
import { namesOf } from '../../../shared/domain/sheets/names';
import type { PlanDay } from '../../../shared/planner/day';
import { type Direction, dropOf, findPass, type Move, moveOf, type NoMove, pinInWords } from '../../../shared/planner/moves';
import { zoneClock } from '../../../shared/time/wall';
import type { Edit } from '../../../shared/domain/edits';
import type { Mending } from './facts';
import type { Landing } from './usePassDrag';

interface Desk {
  file: ComputedRef<ProductionFile>;
  days: ComputedRef<PlanDay[]>;
  mayChange: ComputedRef<boolean>;
  /** Applies edits; false where they were refused. */
  apply: (edits: Edit[]) => boolean;
  /** Applies edits that the plan as it stands already keeps. */
  applyInPlace: (edits: Edit[]) => boolean;
  /** Whether no plan holds at the moment, so that any change wants a new one. */
  failed: () => boolean;
  /** Plans again around what has changed. */
  replan: () => void;
  say: (sentence: string) => void;
}

export interface LastAction {
  says: string;
  /** The edits that take it back; none where nothing was done. */
  back: Edit[];
}

/** Pins, moves and leaving out: each is a change of the production, said aloud, and can be taken back. */
export function usePlanActions({ file, days, mayChange, apply, applyInPlace, failed, replan, say }: Desk): {
  last: Ref<LastAction | null>;
  togglePin: (pass: PassId) => void;
  mend: (mending: Mending) => void;
  toggleLeftOut: (pass: PassId) => void;
  move: (pass: PassId, direction: Direction) => void;
  drop: (landing: Landing) => void;
  takeBack: () => void;
} {
  const last = ref<LastAction | null>(null);
  const passOf = (id: PassId) => namesOf(file.value).pass(id);

  function set(id: PassId, fields: Edit['fields'], says: string, thenPlan: boolean): void {
    const before = passOf(id);
    if (!before || !mayChange.value) return;
    const known: Record<string, unknown> = { ...before };
    const old = Object.fromEntries(Object.keys(fields).map((field) => [field, known[field] ?? null]));
    const taken = (thenPlan ? apply : applyInPlace)(editsToSetPass(file.value, id, fields));
    if (!taken) return say('That was not taken; see what was refused at the top right.');
    last.value = { says, back: [{ resource: 'passes', key: id, op: 'update', fields: old }] };
    say(says);
    if (thenPlan) replan();
  }

  function setPin(id: PassId, pin: Pin, says: string): void {
    set(id, { pin }, says, true);
  }

  /** A plan that keeps a pin holds without it too. */
  function unpin(id: PassId): void {
    set(id, { pin: null }, 'Unpinned.', failed());
  }

  function togglePin(id: PassId): void {
    const pass = passOf(id);
    if (pass?.pin) return unpin(id);
    const found = findPass(days.value, id);
    if (!found) return;
    const pin = { at: zoneClock(file.value.production.timezone).wallOf(found.item.from) };
    // The plan stands as it is: what is pinned where it is needs no new one.
    set(id, { pin }, `Pinned ${pinInWords(pin)}.`, false);
  }

  function toggleLeftOut(id: PassId): void {
    const out = passOf(id)?.leftOut ?? false;
    set(id, { leftOut: out ? null : true }, out ? 'Taken in again.' : 'Left out.', true);
  }

  /** What the page offers where facts clash. */
  function mend({ does, pass }: Mending): void {
    if (does === 'unpin') unpin(pass);
    else toggleLeftOut(pass);
  }

  function move(id: PassId, direction: Direction): void {
    settle(id, moveOf(file.value, days.value, id, direction));
  }

  function drop({ pass, date, at }: Landing): void {
    settle(pass, dropOf(file.value, days.value, pass, { date, at }));
  }

  function settle(id: PassId, moved: Move | NoMove): void {
    if ('refused' in moved) refuse(moved.refused);
    else setPin(id, moved.pin, `${moved.says}. Pinned there.`);
  }

  /** Said aloud and shown, in the place of what was done last. */
  function refuse(says: string): void {
    last.value = { says, back: [] };
    say(says);
  }

  function takeBack(): void {
    if (!last.value || !apply(last.value.back)) return;
    last.value = null;
    say('Taken back.');
    replan();
  }

  return { last, togglePin, mend, toggleLeftOut, move, drop, takeBack };
}
