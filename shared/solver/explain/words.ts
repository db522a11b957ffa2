import type { Pass } from '../../contracts/resources';
import type { Minutes, WallTime } from '../../domain/flavours';
import { eventName, passInWords } from '../../domain/passes';
import { clock, dateOfWall, dayWords, length } from '../../time/words';
import type { Statement } from './statement';
import { castOf, roomIdOf } from './view';

/** Facts of a file as clauses of a sentence that a producer understands. */

const MOST_WINDOWS = 4;
/** More passes than this are not told one by one. */
const MOST_PASSES = 4;

export function passWords(statement: Statement, id: string): string {
  const pass = statement.passes.get(id);
  if (!pass) return id;
  const words = passInWords(statement.file, pass);
  return words === id ? id : `${words} (${id})`;
}
export function personWords(statement: Statement, id: string): string {
  const person = statement.people.get(id)?.person;
  return person?.name ?? person?.short ?? id;
}
export function roomWords(statement: Statement, id: string): string {
  return statement.rooms.get(id)?.room.name ?? `room ${id}`;
}
export function gearWords(statement: Statement, id: string): string {
  return statement.gear.get(id)?.gear.name ?? id;
}
export function eventWords(statement: Statement, id: string): string {
  const event = statement.events.get(id)?.event;
  return event ? eventName(event) : id;
}
export function listWords(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}
/** `Mon 8 March 10:00–20:00`, or with both days where it goes past midnight. */
export function spanWords({ from, to }: { from: WallTime; to: WallTime }): string {
  const end = dateOfWall(from) === dateOfWall(to) ? clock(to) : `${dayWords(dateOfWall(to))} ${clock(to)}`;
  return `${dayWords(dateOfWall(from))} ${clock(from)}–${end}`;
}
function windowsWords(windows: readonly { from: WallTime; to: WallTime }[]): string {
  const words = [...windows].sort((one, other) => (one.from < other.from ? -1 : 1)).map(spanWords);
  const more = words.length - MOST_WINDOWS;
  return more > 1 ? `${words.slice(0, MOST_WINDOWS).join(', ')} and ${more} times more` : listWords(words);
}
export function momentWords(wall: WallTime): string {
  return `${dayWords(dateOfWall(wall))} ${clock(wall)}`;
}

/** The facts of a clash as the reasons for it; many passes that only take their time are told in one. */
export function reasonWords(statement: Statement, facts: readonly string[]): string {
  const plain = facts.filter((fact) => /^passes\.[^.]+$/.test(fact));
  if (plain.length <= MOST_PASSES) return facts.map((fact) => factWords(statement, fact)).join('; ');
  const ids = plain.map((fact) => fact.slice(fact.indexOf('.') + 1));
  const sum = ids.reduce((minutes, id) => minutes + likelyMinutes(statement.passes.get(id)!), 0);
  const others = facts.filter((fact) => !plain.includes(fact)).map((fact) => factWords(statement, fact));
  return [...others, `${listWords(ids.map((id) => passWords(statement, id)))} take ${length(sum)} together`].join('; ');
}

/** What a fact says, for the second half of a sentence. */
export function factWords(statement: Statement, fact: string): string {
  const [list, id = '', field] = fact.split('.');
  switch (list) {
    case 'people':
      return personFact(statement, id, field);
    case 'rooms':
      return roomFact(statement, id, field);
    case 'gear': {
      const gear = statement.gear.get(id)?.gear;
      if (field === 'count') return `there is ${gear?.count ?? 1} of ${gearWords(statement, id)}`;
      const windows = gear?.windows ?? [];
      return `${gearWords(statement, id)} is ${windows.length > 0 ? `there ${windowsWords(windows)}` : 'never there'}`;
    }
    case 'events': {
      const event = statement.events.get(id)!.event;
      const where = event.room === undefined ? '' : ` in ${roomWords(statement, event.room)}`;
      const people = (event.people ?? []).map((person) => personWords(statement, person));
      return `${eventWords(statement, id)} is ${spanWords(event)}${where}${people.length > 0 ? ` with ${listWords(people)}` : ''}`;
    }
    case 'rules':
      return ruleWords(statement, id);
    default:
      return passFact(statement, id, field);
  }
}

function personFact(statement: Statement, id: string, field: string | undefined): string {
  const { person } = statement.people.get(id)!;
  const name = personWords(statement, id);
  if (field === 'windows')
    return person.windows!.length > 0 ? `${name} is free only ${windowsWords(person.windows!)}` : `${name} is never free`;
  const { day, voice } = person.limits ?? {};
  const limits = [
    ...(day === undefined ? [] : [`is called for at most ${length(day)} a day`]),
    ...(voice === undefined ? [] : [`sings at most ${voice} min a day`]),
  ];
  return `${name} ${listWords(limits)}`;
}

function roomFact(statement: Statement, id: string, field: string | undefined): string {
  const { room } = statement.rooms.get(id)!;
  const name = roomWords(statement, id);
  if (field === 'people') return `${name} holds ${room.people === 1 ? 'one person' : `${room.people} people`}`;
  if (field === 'loud') return `${name} may ${room.loud?.length ? `be loud ${windowsWords(room.loud)}` : 'never be loud'}`;
  return `${name} is ${room.open.length > 0 ? `open ${windowsWords(room.open)}` : 'never open'}`;
}

function ruleWords(statement: Statement, name: string): string {
  const { rules } = statement;
  switch (name) {
    case 'step':
      return `work starts and lasts by steps of ${rules.step} min`;
    case 'mealAfter':
      return `nobody works longer than ${length(rules.mealAfter)} without a meal`;
    case 'meal':
      return `a meal takes ${rules.meal} min`;
    case 'breakAfter':
      return `a room works at most ${length(rules.breakAfter)} without a pause`;
    case 'break':
      return `a break takes ${rules.break} min`;
    case 'wrap':
      return `each room-day ends with a wrap of ${rules.wrap} min`;
    case 'listen':
      return rules.listen === 0 ? 'there are no listens' : `what was captured is listened to for ${rules.listen} min`;
    case 'reserve':
      return `each room-day keeps ${Math.round(rules.reserve * 100)} % of its pass minutes in reserve`;
    case 'turnaround':
      return `${length(rules.turnaround)} lie between a release and the next day’s arrival`;
    case 'changeover':
      return `a changeover takes ${rules.changeover} min where no entry says otherwise`;
    default:
      return 'one song is never open in two rooms at once';
  }
}

function passFact(statement: Statement, id: string, field: string | undefined): string {
  const pass = statement.passes.get(id)!;
  const name = passWords(statement, id);
  switch (field) {
    case undefined:
      return `${name} takes ${placeWords(statement, pass)}`;
    case 'pin':
      return `${name} is pinned ${pinWords(pass)}`;
    case 'after':
      return `${name} comes after ${listWords((pass.after ?? []).map((one) => ('event' in one ? eventWords(statement, one.event) : afterWords(statement, one))))}`;
    case 'before':
      return `${name} comes before ${listWords((pass.before ?? []).map((one) => ('event' in one ? eventWords(statement, one.event) : passWords(statement, one.pass))))}`;
    case 'together':
      return `${name} goes together with ${listWords((pass.together ?? []).map((other) => passWords(statement, other)))}`;
    case 'apart':
      return `${name} is kept apart from ${listWords((pass.apart ?? []).map((other) => passWords(statement, other)))}`;
    case 'uses':
      return `${name} uses ${listWords((pass.uses ?? []).map((use) => `${use.count ?? 1} of ${gearWords(statement, use.gear)}`))}`;
    case 'voice':
      return `${name} takes ${listWords(Object.entries(pass.voice ?? {}).map(([person, minutes]) => `${minutes} voice min of ${personWords(statement, person)}`))}`;
    case 'setup':
      return `${name} needs the set-up ${statement.setups.get(pass.setup!)?.name ?? pass.setup}`;
    case 'leftOut':
      return `${name} is left out by hand`;
    default:
      return `${name} is ${field}`;
  }
}

function afterWords(statement: Statement, one: { pass: string; kind?: string; lag?: number }): string {
  const heard = one.kind === 'approved' ? ' was listened to' : '';
  return `${passWords(statement, one.pass)}${heard}${one.lag ? ` and ${one.lag} min more` : ''}`;
}

function placeWords(statement: Statement, pass: Pass): string {
  const room = roomIdOf(statement, pass);
  const cast = [...castOf(statement, pass)].map((person) => personWords(statement, person));
  const where = room === undefined ? 'in no room' : `in ${roomWords(statement, room)}`;
  return `${likelyMinutes(pass)} min ${where}${cast.length > 0 ? ` with ${listWords(cast)}` : ''}`;
}

function likelyMinutes({ minutes }: Pass): Minutes {
  if (typeof minutes === 'number') return minutes;
  return minutes.length === 3 ? minutes[1] : minutes[0];
}

function pinWords({ pin }: Pass): string {
  return listWords([
    ...(pin?.at === undefined ? [] : [`at ${momentWords(pin.at)}`]),
    ...(pin?.day === undefined ? [] : [`on ${dayWords(pin.day)}`]),
    ...(pin?.notBefore === undefined ? [] : [`not before ${momentWords(pin.notBefore)}`]),
    ...(pin?.notAfter === undefined ? [] : [`to end by ${momentWords(pin.notAfter)}`]),
  ]);
}
