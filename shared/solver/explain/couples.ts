import type { Pass } from '../../contracts/resources';
import type { Minute, Minutes, PersonId } from '../../domain/flavours';
import { leastEntry } from './days';
import { usedBy, type Place } from './places';
import type { Edge, Pair } from './statement';
import { castOf, edgesThatHold, fieldOf, minutesOf, pairsThatHold, roomIdOf, roundUp, ruleOf, type View } from './view';

/** How two passes bind each other. */
export interface Couple {
  one: Pass;
  other: Pass;
  together: boolean;
  /** Whether they may run at the same time. */
  meet: boolean;
  /** Least minutes from the end of the first to the start of the second, by who is first; null = may not be in that order. */
  oneFirst: Gap | null;
  otherFirst: Gap | null;
  /** People of both. */
  shared: PersonId[];
}
export interface Gap {
  least: Minutes;
  /** Where the first must be listened to before the second: minutes between that and the start of the second. */
  heard: Minutes | null;
}

/** @returns null where the two do not bind each other at all */
export function coupleOf(view: View, one: Pass, other: Pass): Couple | null {
  const { statement } = view;
  const between = (pair: Pair) => pair.one !== pair.other && [pair.one, pair.other].includes(other.id);
  const forward = edgesThatHold(
    view,
    (statement.edgesFrom.get(one.id) ?? []).filter((edge) => edge.to === other.id),
  );
  const backward = edgesThatHold(
    view,
    (statement.edgesFrom.get(other.id) ?? []).filter((edge) => edge.to === one.id),
  );
  const together = pairsThatHold(view, (statement.togetherWith.get(one.id) ?? []).filter(between)).length > 0;
  const theirs = castOf(statement, other);
  const shared = [...castOf(statement, one)].filter((person) => theirs.has(person));
  const meet =
    shared.length === 0 &&
    roomIdOf(statement, one) !== roomIdOf(statement, other) &&
    !oneSongInTwoRooms(view, one, other) &&
    !spoils(view, one, other) &&
    !spoils(view, other, one) &&
    !lackGear(view, one, other) &&
    pairsThatHold(view, (statement.apartFrom.get(one.id) ?? []).filter(between)).length === 0;
  if (meet && !together && forward.length === 0 && backward.length === 0) return null;
  return {
    one,
    other,
    together,
    meet,
    oneFirst: backward.length > 0 ? null : gapOf(view, one, other, forward, shared.length > 0),
    otherFirst: forward.length > 0 ? null : gapOf(view, other, one, backward, shared.length > 0),
    shared,
  };
}

function gapOf(view: View, first: Pass, second: Pass, edges: readonly Edge[], shared: boolean): Gap {
  const lag = edges.reduce((most, edge) => Math.max(most, edge.lag), 0);
  const heard = edges.some((edge) => edge.approved) ? 0 : null;
  const sameRoom = roomIdOf(view.statement, first) === roomIdOf(view.statement, second);
  const change = sameRoom ? changeBetween(view, first, second) : null;
  const work = minutesOf(view, first) + (change?.minutes ?? 0) + minutesOf(view, second);
  const pause = sameRoom ? pauseWithin(view, work) : 0;
  const meal = shared && isLonger(minutesOf(view, first) + minutesOf(view, second), view, 'meal') ? ruleOf(view, 'meal') : 0;
  return {
    least: Math.max(lag, (change?.minutes ?? 0) + pause, meal),
    heard: change?.kept ? change.minutes : heard,
  };
}

/** The least minutes of changing from one set-up to another; `kept` = only once the first was listened to. */
function changeBetween(view: View, first: Pass, second: Pass): { minutes: Minutes; kept: boolean } | null {
  if (first.setup === undefined || second.setup === undefined || first.setup === second.setup) return null;
  const { setups, rooms } = view.statement;
  const from = fieldOf(view, first, 'setup');
  const to = fieldOf(view, second, 'setup');
  if (from === undefined || to === undefined) return null;
  // A room that is cleared overnight takes a set-up down unheard.
  const standing = rooms.get(roomIdOf(view.statement, first) ?? '')?.room.standing !== false;
  return { minutes: leastEntry(view, to), kept: standing && setups.get(from)?.keepUntil === 'approved' };
}

/** Whether so much work asks for a meal or a break in it. */
function isLonger(work: Minutes, view: View, pause: 'meal' | 'break'): boolean {
  const most = ruleOf(view, pause === 'meal' ? 'mealAfter' : 'breakAfter');
  return ruleOf(view, pause) > 0 && (pause === 'meal' || most > 0) && work > most;
}

/** The longest pause that some work in a room, of more than one item, must have in it. */
function pauseWithin(view: View, work: Minutes): Minutes {
  return Math.max(isLonger(work, view, 'meal') ? ruleOf(view, 'meal') : 0, isLonger(work, view, 'break') ? ruleOf(view, 'break') : 0);
}

function oneSongInTwoRooms(view: View, one: Pass, other: Pass): boolean {
  return one.song !== undefined && one.song === other.song && ruleOf(view, 'oneRoomPerSong');
}

/** Whether the loud one spoils the quiet one, in rooms that hear each other. */
function spoils(view: View, loud: Pass, quiet: Pass): boolean {
  if (loud.loud !== true || quiet.quiet !== true) return false;
  const { statement } = view;
  const here = statement.rooms.get(roomIdOf(statement, loud) ?? '')?.room;
  const there = statement.rooms.get(roomIdOf(statement, quiet) ?? '')?.room;
  const hears = here && there && (here.hears?.includes(there.id) || there.hears?.includes(here.id));
  return hears === true && fieldOf(view, loud, 'loud') === true && fieldOf(view, quiet, 'quiet') === true;
}

function lackGear(view: View, one: Pass, other: Pass): boolean {
  return (one.uses ?? []).some(({ gear }) => {
    const facts = view.statement.gear.get(gear);
    const wanted = usedBy(one, gear) + usedBy(other, gear);
    if (!facts || usedBy(other, gear) === 0 || wanted <= (facts.gear.count ?? 1)) return false;
    return view.has(`gear.${gear}.count`) && fieldOf(view, one, 'uses') !== undefined && fieldOf(view, other, 'uses') !== undefined;
  });
}

/** The first minute at which what ended at a minute can have been listened to. Events of kind listen are never dropped: they only help. */
function heardBy(view: View, ended: Minute): Minute {
  const { statement } = view;
  const events = [...statement.events.values()].filter(({ event, from }) => event.kind === 'listen' && from >= ended).map(({ to }) => to);
  const item = statement.rules.listen > 0 || !view.has('rules.listen') ? [ended + roundUp(view, ruleOf(view, 'listen'))] : [];
  return Math.min(Infinity, ...events, ...item);
}

/** When the second of two can start at the earliest where the first ended at a minute. */
export function soonestAfter(view: View, ended: Minute, gap: Gap): Minute {
  const rested = ended + gap.least;
  return gap.heard === null ? rested : Math.max(rested, heardBy(view, ended) + gap.heard);
}

/** Whether the couple fits with one of them in each of these places. */
export function fits(view: View, couple: Couple, here: Place, there: Place): boolean {
  const { one, other, together, meet } = couple;
  const unordered = couple.oneFirst !== null && couple.otherFirst !== null;
  if (together) return meet && unordered && Math.max(here.from, there.from) <= Math.min(here.to, there.to);
  if (unordered && meet) return true;
  return (
    (couple.oneFirst !== null && inOrder(view, couple, couple.oneFirst, [one, here], [other, there])) ||
    (couple.otherFirst !== null && inOrder(view, couple, couple.otherFirst, [other, there], [one, here]))
  );
}

function inOrder(view: View, couple: Couple, gap: Gap, [first, here]: [Pass, Place], [second, there]: [Pass, Place]): boolean {
  const ended = here.from + minutesOf(view, first);
  if (soonestAfter(view, ended, gap) > there.to) return false;
  if (here.date === null || there.date === null) return true;
  const sameDate = here.date === there.date;
  return couple.shared.every((person) =>
    sameDate ? inOneDay(view, person, [first, here], [second, there]) : there.to - ended >= ruleOf(view, 'turnaround'),
  );
}

/** Whether a person can have both on one date: within their longest day and, without time off between, within one of their windows. */
function inOneDay(view: View, person: PersonId, [first, here]: [Pass, Place], [second, there]: [Pass, Place]): boolean {
  const facts = view.statement.people.get(person)!;
  const { limits, away } = facts.person;
  const length = Math.max(minutesOf(view, first) + minutesOf(view, second), there.from + minutesOf(view, second) - here.to);
  if (limits?.day !== undefined && length > limits.day && view.has(`people.${person}.limits`)) return false;
  if (!facts.windows || away !== undefined || !view.has(`people.${person}.windows`)) return true;
  return facts.windows.some(
    (window) => window.from <= here.from && here.to < window.to && window.from <= there.from && there.to < window.to,
  );
}
