import { lengthOf, overlap } from './spans';
import { nameOf, type Item, type Reading, type Say } from './reading';

/** Every item: on the grid, in an open room of the file, with people and a set-up that the file knows; one at a time in a room. */
export function checkItems(reading: Reading, say: Say): void {
  for (const item of reading.items) {
    checkGrid(reading, item, say);
    checkPlace(reading, item, say);
    checkNames(reading, item, say);
  }
  checkOneAtATime(reading, say);
}

function checkGrid(reading: Reading, item: Item, say: Say): void {
  const { step } = reading.rules;
  if (lengthOf(item) <= 0) {
    say('times', `The ${nameOf(item)} ends before or when it starts.`);
    return;
  }
  const minuteOfDay = Number(item.start.slice(11, 13)) * 60 + Number(item.start.slice(14, 16));
  if (minuteOfDay % step !== 0) say('grid', `The ${nameOf(item)} starts at ${item.start}, off the grid of ${step} min.`);
  if (lengthOf(item) % step !== 0) say('grid', `The ${nameOf(item)} lasts ${lengthOf(item)} min, no multiple of ${step}.`);
}

function checkPlace(reading: Reading, item: Item, say: Say): void {
  if (item.room === undefined) say('rooms', `The ${item.kind} ${item.id ?? `at ${item.start}`} is in no room.`);
  else if (!reading.rooms.has(item.room)) say('rooms', `The ${nameOf(item)} is in ${item.room}, a room that the file does not have.`);
  else if (!item.roomDay) say('hours', `The ${nameOf(item)} (${item.start}) does not lie inside one open window of ${item.room}.`);
}

function checkNames(reading: Reading, item: Item, say: Say): void {
  const strangers = item.people.filter((person) => !reading.people.has(person));
  if (strangers.length > 0) say('people', `The ${nameOf(item)} names people that the file does not have: ${strangers.join(', ')}.`);
  if (new Set(item.people).size < item.people.length) say('people', `The ${nameOf(item)} names somebody twice.`);
  if (item.kind !== 'rig' && item.kind !== 'changeover') return;
  const setup = item.setup === undefined ? undefined : reading.setups.get(item.setup);
  if (!setup) say('set-ups', `The ${nameOf(item)} names no set-up of the file.`);
  else if (setup.room !== undefined && setup.room !== item.room)
    say('set-ups', `${setup.id} belongs to ${setup.room}, not to ${item.room}.`);
}

/** A room holds one item at a time, events of the file among them. */
function checkOneAtATime(reading: Reading, say: Say): void {
  for (const room of reading.rooms.keys()) {
    const inside = [...reading.items, ...reading.events.values()].filter((item) => item.room === room);
    inside.sort((one, other) => one.from - other.from || one.to - other.to);
    inside.forEach((item, position) => {
      for (const later of inside.slice(position + 1)) {
        if (later.from >= item.to) break;
        if (overlap(item, later)) say('rooms', `${room} holds two things at ${later.start}: ${nameOf(item)} and ${nameOf(later)}.`);
      }
    });
  }
}
