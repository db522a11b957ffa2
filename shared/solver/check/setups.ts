import type { SetupId } from '../../domain/flavours';
import { likelyMinutes, type Item, type Reading, type RoomReading, type Say } from './reading';
import { lengthOf } from './spans';

/** What stands in a room, and since when nothing was played on it. */
interface Standing {
  setup: SetupId;
  /** The last pass that used it. */
  last: Item;
}

/**
 * The first pass of a set-up in a bare room has its rig before it, that of another set-up its changeover, each inside one open window and
 * between the two passes; a set-up that is kept until approved is listened to before it goes. A pass without a set-up disturbs none.
 */
export function checkSetups(reading: Reading, say: Say): void {
  for (const room of reading.rooms.values()) checkRoom(reading, room, say);
}

function checkRoom(reading: Reading, { room }: RoomReading, say: Say): void {
  const work = reading.items.filter((item) => item.room === room.id && (item.kind === 'rig' || item.kind === 'changeover'));
  const played = reading.items.filter((item) => item.room === room.id && item.kind === 'pass' && setupOf(reading, item) !== undefined);
  let standing: Standing | undefined;
  let before = -Infinity;
  for (const pass of played) {
    const setup = setupOf(reading, pass)!;
    const between = work.filter((item) => item.from >= before && item.to <= pass.from);
    const clearedOvernight = room.standing === false && standing !== undefined && standing.last.roomDay !== pass.roomDay;
    if (clearedOvernight) standing = undefined;
    if (standing?.setup !== setup) {
      // What is rigged in a room that is cleared every night must be rigged in the same room-day.
      const useful = room.standing === false && !standing ? between.filter((item) => item.roomDay === pass.roomDay) : between;
      checkBuilt(reading, standing, setup, pass, useful, say);
      if (standing) checkApproved(reading, standing, pass, between, say);
    }
    const other = between.find((item) => item.setup !== setup);
    if (other)
      say('set-ups', `The ${other.kind} of ${other.setup ?? 'no set-up'} at ${other.start} is followed by ${pass.id} on ${setup}.`);
    standing = { setup, last: pass };
    before = pass.to;
  }
}

function setupOf(reading: Reading, item: Item): SetupId | undefined {
  return item.id === undefined ? undefined : reading.passes.get(item.id)?.setup;
}

function checkBuilt(
  reading: Reading,
  standing: Standing | undefined,
  setup: SetupId,
  pass: Item,
  between: readonly Item[],
  say: Say,
): void {
  const { step } = reading.rules;
  const kind = standing ? 'changeover' : 'rig';
  const entry = reading.file.changeovers.findLast((change) => change.from === standing?.setup && change.to === setup);
  const minutes = standing ? (entry?.minutes ?? reading.rules.changeover) : (reading.setups.get(setup)?.rig ?? 0);
  const need = likelyMinutes(minutes, step);
  const got = Math.max(0, ...between.filter((item) => item.kind === kind && item.setup === setup && item.roomDay).map(lengthOf));
  if (got < need) {
    const what = standing ? `changeover from ${standing.setup} to ${setup}` : `rig of ${setup}`;
    say('set-ups', `${pass.id} at ${pass.start} needs a ${what} of ${need} min before it; the longest there is ${got} min.`);
  }
}

/** A set-up kept until approved was listened to after its last pass and before anything is built instead of it. */
function checkApproved(reading: Reading, standing: Standing, next: Item, between: readonly Item[], say: Say): void {
  if (reading.setups.get(standing.setup)?.keepUntil !== 'approved') return;
  const until = Math.min(next.from, ...between.map((item) => item.from));
  const heard = reading.approvals.some((listen) => listen.from >= standing.last.to && listen.to <= until);
  if (!heard) say('set-ups', `${standing.setup} is taken down for ${next.id} before ${standing.last.id} was listened to.`);
}
