import type { Minute } from '../domain/flavours';
import { gridAtOrAfter, gridAtOrBefore } from '../solver/grid';
import { EVER, NEVER, merged, type Dependency, type PassModel, type Problem, type Span, type StartStretch } from '../solver/model';
import { estimateOf, type EffectivePass } from './derive';
import { indices, type Reader } from './reader';

/** The passes of a problem whose other lists are ready. */
export function passModels(reader: Reader, passes: readonly EffectivePass[], problem: Problem): PassModel[] {
  const position = new Map(passes.map(({ id }, i) => [id, i]));
  const models = passes.map((pass) => passModel(reader, pass, problem));
  passes.forEach((pass, i) => {
    for (const one of pass.after ?? []) {
      if (!('pass' in one)) continue;
      const other = position.get(one.pass);
      if (other !== undefined) addDependency(models[i]!.after, { pass: other, approved: one.kind === 'approved', lag: one.lag ?? 0 });
    }
    for (const one of pass.before ?? []) {
      const other = 'pass' in one ? position.get(one.pass) : undefined;
      if (other !== undefined) addDependency(models[other]!.after, { pass: i, approved: false, lag: 0 });
    }
  });
  models.forEach((model, i) => {
    for (const { pass } of model.after) if (!models[pass]!.followers.includes(i)) models[pass]!.followers.push(i);
  });
  joinTogether(passes, models, position);
  keepApart(passes, models, position, problem);
  models.forEach((model) => {
    model.starts = possibleStarts(model, problem);
    model.days = [...new Set(model.starts.map(({ day }) => day))];
  });
  return models;
}

function passModel(reader: Reader, pass: EffectivePass, problem: Problem): PassModel {
  const room = reader.room(pass.room);
  const operators = room >= 0 ? problem.rooms[room]!.operators : [];
  const people = [...new Set([...indices(pass.people, reader.person), ...operators])].sort((a, b) => a - b);
  const mask = new Uint32Array(Math.max(1, Math.ceil(problem.people.length / 32)));
  for (const person of people) mask[person >> 5]! |= 1 << (person & 31);
  const { weights } = problem;
  const { notBefore, notAfter } = bounds(reader, pass, problem);
  const estimate = estimateOf(pass.minutes);
  const leftOut = pass.leftOut === true;
  return {
    id: pass.id,
    song: reader.song(pass.song),
    room,
    setup: reader.setup(pass.setup),
    minutes: reader.rounded(estimate[1]),
    estimate,
    priority: pass.priority,
    unplaced: pass.priority === 'must' ? 0 : weights[pass.priority],
    leftOut,
    people,
    mask,
    heads: people.reduce((sum, person) => sum + problem.people[person]!.size, 0),
    loud: pass.loud === true,
    quiet: pass.quiet === true,
    voice: Object.entries(pass.voice ?? {})
      .map(([id, minutes]) => ({ person: reader.person(id), minutes }))
      .filter(({ person, minutes }) => minutes > 0 && people.includes(person)),
    uses: usesOf(reader, pass),
    after: [],
    followers: [],
    together: [],
    apart: [],
    notBefore,
    notAfter,
    at: pass.pin?.at === undefined ? null : reader.minute(pass.pin.at),
    date: pass.pin?.day ?? null,
    starts: [],
    days: [],
  };
}

function usesOf(reader: Reader, pass: EffectivePass): PassModel['uses'] {
  const counts = new Map<number, number>();
  for (const use of pass.uses ?? []) {
    const gear = reader.gear(use.gear);
    if (gear >= 0) counts.set(gear, (counts.get(gear) ?? 0) + (use.count ?? 1));
  }
  return [...counts].map(([gear, count]) => ({ gear, count }));
}

function bounds(reader: Reader, pass: EffectivePass, problem: Problem): { notBefore: Minute; notAfter: Minute } {
  let notBefore = pass.pin?.notBefore === undefined ? NEVER : reader.minute(pass.pin.notBefore);
  let notAfter = pass.pin?.notAfter === undefined ? EVER : reader.minute(pass.pin.notAfter);
  for (const one of pass.after ?? []) {
    const event = 'event' in one ? problem.events[reader.event(one.event)] : undefined;
    if (event) notBefore = Math.max(notBefore, event.to + (one.lag ?? 0));
  }
  for (const one of pass.before ?? []) {
    const event = 'event' in one ? problem.events[reader.event(one.event)] : undefined;
    if (event) notAfter = Math.min(notAfter, event.from);
  }
  return { notBefore, notAfter };
}

/** Several entries for one pass are one: approved where one of them says so, with the longest lag. */
function addDependency(list: Dependency[], dependency: Dependency): void {
  const known = list.find(({ pass }) => pass === dependency.pass);
  if (!known) list.push(dependency);
  else {
    known.approved ||= dependency.approved;
    known.lag = Math.max(known.lag, dependency.lag);
  }
}

/** Passes that name each other, or a third one, as together share one group. */
function joinTogether(passes: readonly EffectivePass[], models: PassModel[], position: ReadonlyMap<string, number>): void {
  const group = models.map((_, i) => i);
  const find = (i: number): number => (group[i] === i ? i : (group[i] = find(group[i]!)));
  passes.forEach((pass, i) => {
    for (const id of pass.together ?? []) {
      const other = position.get(id);
      if (other !== undefined) group[find(i)] = find(other);
    }
  });
  models.forEach((model, i) => {
    const members = models.flatMap((_, other) => (find(other) === find(i) ? [other] : []));
    if (members.length > 1) model.together = members;
  });
}

function keepApart(passes: readonly EffectivePass[], models: PassModel[], position: ReadonlyMap<string, number>, problem: Problem): void {
  const link = (i: number, other: number) => {
    if (!models[i]!.apart.includes(other)) models[i]!.apart.push(other);
    if (!models[other]!.apart.includes(i)) models[other]!.apart.push(i);
  };
  passes.forEach((pass, i) => {
    for (const id of pass.apart ?? []) {
      const other = position.get(id);
      if (other !== undefined && other !== i) link(i, other);
    }
  });
  for (let i = 0; i < models.length; i++)
    for (let other = i + 1; other < models.length; other++) if (clash(models[i]!, models[other]!, problem)) link(i, other);
}

/** One song in two rooms, or loud beside quiet. */
function clash(one: PassModel, other: PassModel, problem: Problem): boolean {
  if (one.room < 0 || other.room < 0 || one.room === other.room) return false;
  if (problem.rules.oneRoomPerSong && one.song >= 0 && one.song === other.song) return true;
  const heard = problem.rooms[one.room]!.hears.includes(other.room);
  return heard && ((one.loud && other.quiet) || (one.quiet && other.loud));
}

function possibleStarts(pass: PassModel, problem: Problem): StartStretch[] {
  const { rules, people, gear, events } = problem;
  const room = problem.rooms[pass.room];
  if (!room || (room.people !== null && pass.heads > room.people)) return [];
  if (rules.meal > 0 && pass.minutes > rules.mealAfter) return [];
  if (pass.people.some((person) => beyond(pass.minutes, people[person]!.day))) return [];
  if (pass.voice.some(({ person, minutes }) => beyond(minutes, people[person]!.voice))) return [];
  if (pass.uses.some((use) => use.count > gear[use.gear]!.count)) return [];

  const windows = [
    ...pass.people.map((person) => people[person]!.windows),
    ...pass.uses.map((use) => gear[use.gear]!.windows),
    pass.loud ? room.loud : null,
  ].filter((list) => list !== null);
  const busy = merged([...room.events, ...pass.people.flatMap((person) => people[person]!.events)].map((event) => events[event]!));

  return room.days.flatMap((index) => {
    const day = problem.days[index]!;
    if (pass.date !== null && pass.date !== day.date) return [];
    const from = Math.max(day.from, pass.notBefore);
    const to = Math.min(day.to - problem.lengths.wrap, pass.notAfter);
    const free = windows.reduce(common, without({ from, to }, busy));
    return free.flatMap((span) => {
      let first = gridAtOrAfter(day.grid, rules.step, span.from);
      let last = gridAtOrBefore(day.grid, rules.step, span.to - pass.minutes);
      if (pass.at !== null) {
        if (pass.at < first || pass.at > last || gridAtOrAfter(day.grid, rules.step, pass.at) !== pass.at) return [];
        first = last = pass.at;
      }
      return first <= last ? [{ day: index, from: first, to: last }] : [];
    });
  });
}

const beyond = (minutes: number, limit: number | null) => limit !== null && minutes > limit;

/** What two lists of windows share. */
function common(one: readonly Span[], other: readonly Span[]): Span[] {
  return one.flatMap((a) =>
    other
      .map((b) => ({ from: Math.max(a.from, b.from), to: Math.min(a.to, b.to) }))
      .filter(({ from, to }) => from < to)
      .sort((a, b) => a.from - b.from),
  );
}

function without(span: Span, busy: readonly Span[]): Span[] {
  const free: Span[] = [];
  let at = span.from;
  for (const { from, to } of busy) {
    if (from > at && at < span.to) free.push({ from: at, to: Math.min(from, span.to) });
    at = Math.max(at, to);
  }
  if (at < span.to) free.push({ from: at, to: span.to });
  return free;
}
