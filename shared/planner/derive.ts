import type { Dependency, GearUse, Part, Pass, ProductionFile, Setup, Song } from '../contracts/resources';
import type { Priority, ThreePoint } from '../contracts/values';
import { basicsMinutes, overdubMinutes, type Estimate } from '../domain/durations';
import type { PassId, PersonId, RoomId, SetupId, SongId } from '../domain/flavours';

/** A pass as the planner sees it: what it leaves open is filled in from its set-up and its song. */
export type EffectivePass = Pass & { priority: Priority };

/** Low, likely and high of a number of minutes; a single number means all three. */
export function estimateOf(minutes: ThreePoint): Estimate {
  if (typeof minutes === 'number') return [minutes, minutes, minutes];
  return minutes.length === 1 ? [minutes[0], minutes[0], minutes[0]] : minutes;
}

/** The id of a song's derived pass for its live and guide parts. */
export const basicsId = (song: SongId): PassId => `${song}-basics`;
/** The id of the derived pass of an added part. */
export const partPassId = (song: SongId, part: string): PassId => `${song}-${part}`;

const isBasic = (part: Part) => part.mode === 'live' || part.mode === 'guide';
const isAdded = (part: Part) => part.mode !== undefined && !isBasic(part);

/**
 * The passes to plan: the written ones or, where the file has none, one for each song's live and guide parts together and one for each
 * added part, which comes after the basics. A part without a mode is not recorded.
 * Rooms and priorities are filled in; a room stays open only where the production has no room at all.
 */
export function effectivePasses(file: ProductionFile): EffectivePass[] {
  const setups = new Map(file.setups.map((setup) => [setup.id, setup]));
  const songs = new Map(file.songs.map((song) => [song.id, song]));
  const passes = file.passes ?? file.songs.flatMap((song) => derivedOf(song, file, setups));
  return passes.map((pass) => {
    const room = pass.room ?? (pass.setup === undefined ? undefined : setups.get(pass.setup)?.room);
    const priority = pass.priority ?? (pass.song === undefined ? undefined : songs.get(pass.song)?.priority) ?? 'must';
    return { ...pass, ...(room === undefined ? {} : { room }), priority };
  });
}

function derivedOf(song: Song, file: ProductionFile, setups: ReadonlyMap<SetupId, Setup>): Pass[] {
  const parts = song.parts ?? [];
  const basics = parts.filter(isBasic);
  const passes: Pass[] = [];
  if (basics.length > 0) {
    const minutes = longest(basics) ?? song.minutes ?? basicsMinutes(song.rehearsal, song.length);
    passes.push(derivedPass(basicsId(song.id), song, basics, minutes, file, setups));
  }
  for (const part of parts.filter(isAdded)) {
    const minutes = part.minutes ?? song.minutes ?? addedMinutes(part, song);
    const pass = derivedPass(partPassId(song.id, part.id), song, [part], minutes, file, setups);
    const after = pass.after ?? [];
    const waits = after.some((one) => 'pass' in one && one.pass === basicsId(song.id));
    if (basics.length > 0 && !waits) pass.after = [{ pass: basicsId(song.id), kind: 'captured' }, ...after];
    passes.push(pass);
  }
  return passes;
}

function addedMinutes(part: Part, song: Song): Estimate {
  const instrument = part.instrument ?? part.name ?? part.id.replaceAll('-', ' ');
  const mode = part.mode === 'double' || part.mode === 'stack' || part.mode === 'repair' ? part.mode : 'overdub';
  return overdubMinutes(mode, instrument, song.rehearsal);
}

/** Parts that are played together last as long as the longest of them. */
function longest(parts: Part[]): ThreePoint | undefined {
  const given = parts.flatMap(({ minutes }) => (minutes === undefined ? [] : [minutes]));
  const [first, ...others] = given;
  if (first === undefined || others.length === 0) return first;
  return others.map(estimateOf).reduce((a, b) => [Math.max(a[0], b[0]), Math.max(a[1], b[1]), Math.max(a[2], b[2])], estimateOf(first));
}

function derivedPass(
  id: PassId,
  song: Song,
  parts: Part[],
  minutes: ThreePoint,
  file: ProductionFile,
  setups: ReadonlyMap<SetupId, Setup>,
): Pass {
  const voice = mergedVoice(parts);
  const uses = mergedUses(parts);
  const after = mergedAfter(parts);
  return {
    id,
    song: song.id,
    parts: parts.map((part) => part.id),
    people: [...new Set(parts.flatMap((part) => part.players ?? []))],
    ...placeOf(song, parts, file, setups),
    minutes,
    priority: highestPriority(parts, song),
    ...(parts.some((part) => part.loud) ? { loud: true } : {}),
    ...(parts.some((part) => part.quiet) ? { quiet: true } : {}),
    ...(voice ? { voice } : {}),
    ...(uses ? { uses } : {}),
    ...(after.length > 0 ? { after } : {}),
  };
}

/**
 * Room and set-up: the parts' own, else the song's, else the first of the production. A set-up of another room is passed over, so that
 * an overdub in the small room does not ask for the drum kit of its song.
 */
function placeOf(song: Song, parts: Part[], file: ProductionFile, setups: ReadonlyMap<SetupId, Setup>): { room?: RoomId; setup?: SetupId } {
  const ownSetup = parts.find((part) => part.setup !== undefined)?.setup;
  const ownRoom = parts.find((part) => part.room !== undefined)?.room;
  const roomOf = (setup: SetupId | undefined) => (setup === undefined ? undefined : setups.get(setup)?.room);
  const room = ownRoom ?? roomOf(ownSetup) ?? song.room ?? roomOf(song.setup) ?? file.rooms[0]?.id;
  const fits = (setup: SetupId) => {
    const of = roomOf(setup);
    return of === undefined || of === room;
  };
  const setup =
    ownSetup ?? (song.setup !== undefined && fits(song.setup) ? song.setup : file.setups.find((candidate) => fits(candidate.id))?.id);
  return { ...(room === undefined ? {} : { room }), ...(setup === undefined ? {} : { setup }) };
}

/** A pass is as important as the most important of its parts. */
function highestPriority(parts: Part[], song: Song): Priority {
  const asked = parts.map((part) => part.priority ?? song.priority ?? 'must');
  if (asked.includes('must')) return 'must';
  return asked.includes('should') ? 'should' : 'nice';
}

/** Singing minutes of a person who has several parts add up. */
function mergedVoice(parts: Part[]): Record<PersonId, number> | undefined {
  const minutes = new Map<PersonId, number>();
  for (const part of parts)
    for (const [person, more] of Object.entries(part.voice ?? {})) minutes.set(person, (minutes.get(person) ?? 0) + more);
  return minutes.size > 0 ? Object.fromEntries(minutes) : undefined;
}

/** Parts that are played together need their gear at the same time, so counts add up. */
function mergedUses(parts: Part[]): GearUse[] | undefined {
  const counts = new Map<string, number>();
  for (const part of parts) for (const use of part.uses ?? []) counts.set(use.gear, (counts.get(use.gear) ?? 0) + (use.count ?? 1));
  return counts.size > 0 ? [...counts].map(([gear, count]) => ({ gear, count })) : undefined;
}

function mergedAfter(parts: Part[]): Dependency[] {
  const known = new Map<string, Dependency>();
  for (const part of parts) for (const one of part.after ?? []) known.set(JSON.stringify(one), one);
  return [...known.values()];
}
