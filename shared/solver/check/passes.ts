import { castOf, likelyMinutes, priorityOf, roomOf, type Item, type Reading, type Say, type StatedPlan } from './reading';
import { lengthOf } from './spans';

/** Each pass is placed at most once, in its room, for its likely minutes, with exactly its people; every must is there; the rest is listed as unplaced. */
export function checkPasses(reading: Reading, plan: StatedPlan, say: Say): void {
  for (const item of reading.items) if (item.kind === 'pass') checkPass(reading, item, say);
  for (const pass of reading.passes.values()) {
    if (reading.placed.has(pass.id) || pass.leftOut === true || priorityOf(reading, pass) !== 'must') continue;
    say('musts', `The must pass ${pass.id} is not placed.`);
  }
  checkUnplaced(reading, plan, say);
}

function checkPass(reading: Reading, item: Item, say: Say): void {
  const pass = item.id === undefined ? undefined : reading.passes.get(item.id);
  if (!pass) {
    say('passes', `The plan places a pass ${item.id ?? 'without an id'} that the file does not have.`);
    return;
  }
  if (reading.placed.get(pass.id) !== item) say('passes', `The pass ${pass.id} is placed twice, again at ${item.start}.`);
  if (pass.leftOut === true) say('passes', `The pass ${pass.id} was left out by hand and is placed at ${item.start}.`);
  const room = roomOf(reading, pass);
  if (room === undefined) say('passes', `The file gives the pass ${pass.id} no room.`);
  else if (room !== item.room) say('passes', `The pass ${pass.id} is in ${item.room ?? 'no room'} instead of ${room}.`);
  if (item.setup !== pass.setup)
    say('passes', `The pass ${pass.id} is listed with the set-up ${item.setup ?? 'none'} instead of ${pass.setup ?? 'none'}.`);
  const wanted = likelyMinutes(pass.minutes, reading.rules.step);
  if (lengthOf(item) !== wanted) say('passes', `The pass ${pass.id} lasts ${lengthOf(item)} min instead of ${wanted}.`);
  const cast = castOf(reading, pass, item.room);
  const missing = cast.filter((person) => !item.people.includes(person));
  const extra = item.people.filter((person) => !cast.includes(person));
  if (missing.length > 0) say('passes', `The pass ${pass.id} is without ${missing.join(', ')}.`);
  if (extra.length > 0) say('passes', `The pass ${pass.id} names ${extra.join(', ')}, who have no part in it.`);
}

function checkUnplaced(reading: Reading, plan: StatedPlan, say: Say): void {
  const listed = new Set(plan.unplaced);
  if (listed.size < plan.unplaced.length) say('unplaced', 'A pass stands twice among the unplaced ones.');
  for (const id of listed) {
    if (!reading.passes.has(id)) say('unplaced', `${id} is listed as unplaced, but the file has no such pass.`);
    else if (reading.placed.has(id)) say('unplaced', `The pass ${id} is placed and listed as unplaced.`);
  }
  for (const id of reading.passes.keys())
    if (!reading.placed.has(id) && !listed.has(id)) say('unplaced', `The pass ${id} is neither placed nor listed as unplaced.`);
}
