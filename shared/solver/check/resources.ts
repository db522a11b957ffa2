import type { GearId, Minutes } from '../../domain/flavours';
import type { Pass } from '../../contracts/resources';
import { castOf, nameOf, type Item, type Reading, type Say } from './reading';
import { covers, overlap } from './spans';

type Placed = readonly [Pass, Item];

/** What passes share: gear and its hire, the people a room can hold, loud hours and quiet neighbours, and the one song file. */
export function checkResources(reading: Reading, say: Say): void {
  const placed = [...reading.placed].flatMap(([id, item]): Placed[] => {
    const pass = reading.passes.get(id);
    return pass ? [[pass, item]] : [];
  });
  checkGear(reading, placed, say);
  checkHeads(reading, say);
  for (const [pass, item] of placed) {
    const loud = item.room === undefined ? undefined : reading.rooms.get(item.room)?.loud;
    if (pass.loud === true && loud && !covers(loud, item))
      say('loud', `The pass ${pass.id} is loud at ${item.start}, outside the loud hours of ${item.room}.`);
  }
  placed.forEach(([pass, item], position) => {
    for (const [other, beside] of placed.slice(position + 1)) {
      if (item.room === beside.room || !overlap(item, beside)) continue;
      if (reading.rules.oneRoomPerSong && pass.song !== undefined && pass.song === other.song)
        say('rooms', `${pass.song} is open in two rooms at once: ${pass.id} in ${item.room} and ${other.id} in ${beside.room}.`);
      if (hear(reading, item, beside)) checkQuiet(pass, other, item, say);
    }
  });
}

/** Whether loud work of one room spoils quiet work of the other; it is enough that one of them says so. */
function hear(reading: Reading, one: Item, other: Item): boolean {
  const hears = (here: Item, there: Item) =>
    here.room !== undefined && there.room !== undefined && (reading.rooms.get(here.room)?.room.hears ?? []).includes(there.room);
  return hears(one, other) || hears(other, one);
}

function checkQuiet(one: Pass, other: Pass, at: Item, say: Say): void {
  for (const [quiet, loud] of [
    [one, other],
    [other, one],
  ] as const)
    if (quiet.quiet === true && loud.loud === true) say('loud', `${loud.id} is loud beside the quiet ${quiet.id} around ${at.start}.`);
}

function checkGear(reading: Reading, placed: readonly Placed[], say: Say): void {
  const used = (pass: Pass, gear: GearId): Minutes =>
    (pass.uses ?? []).reduce((sum, use) => sum + (use.gear === gear ? (use.count ?? 1) : 0), 0);
  for (const [id, { gear, windows }] of reading.gear) {
    const users = placed.filter(([pass]) => used(pass, id) > 0);
    const count = gear.count ?? 1;
    for (const [pass, item] of users) {
      if (windows && !covers(windows, item)) say('gear', `${pass.id} at ${item.start} uses ${id} when it is not there.`);
      // The number in use only grows where a pass starts, so its starts are the minutes to look at.
      const together = users.filter(([, other]) => other.from <= item.from && item.from < other.to);
      const wanted = together.reduce((sum, [other]) => sum + used(other, id), 0);
      if (wanted > count)
        say(
          'gear',
          `${wanted} of ${id} are in use at ${item.start} (${together.map(([other]) => other.id).join(', ')}), there are ${count}.`,
        );
    }
  }
  for (const [pass] of placed)
    for (const use of pass.uses ?? [])
      if (!reading.gear.has(use.gear)) say('gear', `${pass.id} uses ${use.gear}, which the file does not have.`);
}

function checkHeads(reading: Reading, say: Say): void {
  for (const item of reading.items) {
    const most = item.room === undefined ? undefined : reading.rooms.get(item.room)?.room.people;
    if (most === undefined || (item.kind !== 'pass' && item.kind !== 'listen')) continue;
    const pass = item.kind === 'pass' && item.id !== undefined ? reading.passes.get(item.id) : undefined;
    const inside = new Set([...item.people, ...(pass ? castOf(reading, pass, item.room) : [])]);
    const heads = [...inside].reduce((sum, person) => sum + (reading.people.get(person)?.person.size ?? 1), 0);
    if (heads > most) say('rooms', `${heads} people are in ${item.room} for the ${nameOf(item)}; it holds ${most}.`);
  }
}
