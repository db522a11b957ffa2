import { itemsOf, nameOf, type Item, type Reading, type RoomDay, type Say } from './reading';
import { lengthOf, longRuns } from './spans';

const WORK: readonly Item['kind'][] = ['pass', 'rig', 'changeover', 'listen', 'wrap', 'reserve'];
const sumOf = (items: readonly Item[]) => items.reduce((sum, item) => sum + lengthOf(item), 0);

/** What every room-day with a pass holds (wrap, listen, reserve), and how long work in a room goes on without a meal or a break. */
export function checkRoomDays(reading: Reading, say: Say): void {
  for (const { room, days } of reading.rooms.values()) {
    for (const day of days) checkDay(reading, day, say);
    const work = reading.items.filter((item) => item.room === room.id && WORK.includes(item.kind));
    const { meal, mealAfter, breakAfter } = reading.rules;
    if (meal > 0)
      for (const run of longRuns(work, { most: mealAfter, pause: meal, excuseOne: false }))
        say('meals', `Work in ${room.id} has gone on for more than ${mealAfter} min without a meal by the end of ${nameOf(run.last)}.`);
    if (breakAfter > 0 && reading.rules.break > 0)
      for (const run of longRuns(work, { most: breakAfter, pause: reading.rules.break, excuseOne: true }))
        say('breaks', `Work in ${room.id} has gone on for more than ${breakAfter} min without a pause by the end of ${nameOf(run.last)}.`);
  }
  checkListens(reading, say);
}

function checkDay(reading: Reading, day: RoomDay, say: Say): void {
  const items = itemsOf(reading, day);
  const passes = items.filter((item) => item.kind === 'pass');
  if (passes.length === 0) return;
  const { wrap, listen, reserve, step } = reading.rules;
  const where = `${day.room} on ${day.date}`;
  // The last to begin and the last to end: they differ only where items overlap.
  const ending = [items.at(-1)!, items.reduce((latest, item) => (item.to > latest.to ? item : latest))];
  if (wrap > 0 && ending.some((item) => item.kind !== 'wrap' || lengthOf(item) < wrap))
    say('wrap', `${where} does not end with a wrap of ${wrap} min.`);
  const first = items[0]!;
  const captured = [...reading.placed.values()].some((pass) => (pass.roomDay?.date ?? pass.start.slice(0, 10)) < day.date);
  if (listen > 0 && captured && (first.kind !== 'listen' || lengthOf(first) < listen))
    say('listen', `${where} does not begin with a listen of ${listen} min, although there is an earlier capture.`);
  const need = Math.floor((reserve * sumOf(passes)) / step) * step;
  const got = sumOf(items.filter((item) => item.kind === 'reserve'));
  if (got < need) say('reserve', `${where} has ${got} min of reserve and needs ${need}.`);
}

function checkListens(reading: Reading, say: Say): void {
  const { listen } = reading.rules;
  for (const item of reading.items) {
    if (item.kind !== 'listen') continue;
    if (listen === 0) say('listen', `The ${nameOf(item)} is not wanted: the production has no listens.`);
    else if (lengthOf(item) < listen) say('listen', `The ${nameOf(item)} lasts ${lengthOf(item)} min, less than ${listen}.`);
  }
}
