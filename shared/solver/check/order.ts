import type { Pass } from '../../contracts/resources';
import type { PassId } from '../../domain/flavours';
import { nameOf, type Item, type Reading, type Say } from './reading';
import { overlap } from './spans';

/** Dependencies, passes that go together or apart, and pins. */
export function checkOrder(reading: Reading, say: Say): void {
  for (const pass of reading.passes.values()) {
    const item = reading.placed.get(pass.id);
    checkTogether(reading, pass, item, say);
    checkBeforePasses(reading, pass, item, say);
    if (!item) continue;
    checkAfter(reading, pass, item, say);
    for (const { event } of (pass.before ?? []).flatMap((what) => ('event' in what ? [what] : []))) {
      const fixed = reading.events.get(event);
      if (fixed && item.to > fixed.from) say('order', `${pass.id} ends after the event ${event} starts (${fixed.start}).`);
    }
    for (const other of pass.apart ?? []) {
      const beside = reading.placed.get(other);
      if (beside && overlap(item, beside)) say('order', `${pass.id} and ${other} are to be apart, and overlap at ${item.start}.`);
    }
    checkPin(reading, pass, item, say);
  }
}

function checkAfter(reading: Reading, pass: Pass, item: Item, say: Say): void {
  for (const dependency of pass.after ?? []) {
    const name = 'event' in dependency ? dependency.event : dependency.pass;
    const earlier = 'event' in dependency ? reading.events.get(dependency.event) : reading.placed.get(dependency.pass);
    const lag = dependency.lag ?? 0;
    if (!earlier) {
      say('order', `${pass.id} is placed, but ${name} that must come before it is not.`);
      continue;
    }
    if (item.from < earlier.to + lag)
      say(
        'order',
        `${pass.id} starts at ${item.start}, before the ${nameOf(earlier)} is over${lag > 0 ? ` and ${lag} min have gone by` : ''}.`,
      );
    if ('event' in dependency || dependency.kind !== 'approved') continue;
    const heard = reading.approvals.some((listen) => listen.from >= earlier.to && listen.to <= item.from);
    if (!heard) say('order', `${pass.id} starts at ${item.start}, before ${name} was listened to.`);
  }
}

/** `before` a pass is the same as that pass `after` this one. */
function checkBeforePasses(reading: Reading, pass: Pass, item: Item | undefined, say: Say): void {
  for (const what of pass.before ?? []) {
    if ('event' in what) continue;
    const later = reading.placed.get(what.pass);
    if (!later) continue;
    if (!item) say('order', `${what.pass} is placed, but ${pass.id} that must come before it is not.`);
    else if (later.from < item.to) say('order', `${what.pass} starts at ${later.start}, before ${pass.id} is over.`);
  }
}

function checkTogether(reading: Reading, pass: Pass, item: Item | undefined, say: Say): void {
  for (const other of pass.together ?? []) {
    const beside = reading.placed.get(other);
    if (item && !beside) sayAlone(pass.id, other, say);
    else if (!item && beside) sayAlone(other, pass.id, say);
    else if (item && beside && item.from !== beside.from)
      say('order', `${pass.id} starts at ${item.start} and ${other}, that goes together with it, at ${beside.start}.`);
  }
}

function sayAlone(placed: PassId, missing: PassId, say: Say): void {
  say('order', `${placed} is placed without ${missing}, that goes together with it.`);
}

function checkPin(reading: Reading, pass: Pass, item: Item, say: Say): void {
  const { pin } = pass;
  if (!pin) return;
  const at = pin.at === undefined ? null : reading.minuteOf(pin.at);
  const notBefore = pin.notBefore === undefined ? null : reading.minuteOf(pin.notBefore);
  const notAfter = pin.notAfter === undefined ? null : reading.minuteOf(pin.notAfter);
  if (at !== null && item.from !== at) say('order', `${pass.id} is pinned at ${pin.at} and placed at ${item.start}.`);
  if (pin.day !== undefined && item.roomDay?.date !== pin.day)
    say('order', `${pass.id} is pinned on ${pin.day} and placed at ${item.start}.`);
  if (notBefore !== null && item.from < notBefore)
    say('order', `${pass.id} is pinned not before ${pin.notBefore} and placed at ${item.start}.`);
  if (notAfter !== null && item.to > notAfter) say('order', `${pass.id} at ${item.start} ends after ${pin.notAfter}, where it is pinned.`);
}
