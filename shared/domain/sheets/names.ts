import type { Part, Pass, Person, ProductionFile, Song } from '../../contracts/resources';
import { type EffectivePass, effectivePasses } from '../../planner/derive';
import type { EventId, PassId, PersonId, SetupId, SongId } from '../flavours';

/** Looks names up in one production, so that a sheet shows no id where a name is given. */
export interface Names {
  /** What a person is called on a stand: the short name, else the first word of the name. */
  short(person: PersonId): string;
  setup(setup: SetupId | undefined): string;
  /** Who has to get ready while a set-up is built. */
  readyFor(setup: SetupId | undefined): PersonId[];
  event(event: EventId | undefined): string;
  song(song: SongId | undefined): Song | undefined;
  pass(pass: PassId | undefined): EffectivePass | undefined;
  person(person: PersonId): Person | undefined;
}

export function namesOf(file: ProductionFile): Names {
  const people = new Map(file.people.map((person) => [person.id, person]));
  const setups = new Map(file.setups.map((setup) => [setup.id, setup]));
  const songs = new Map(file.songs.map((song) => [song.id, song]));
  const events = new Map(file.events.map((event) => [event.id, event]));
  const passes = new Map(effectivePasses(file).map((pass) => [pass.id, pass]));
  return {
    short(id) {
      const person = people.get(id);
      return person?.short ?? person?.name?.trim().split(/\s+/)[0] ?? id;
    },
    setup: (id) => (id === undefined ? '' : (setups.get(id)?.name ?? id)),
    readyFor: (id) => Object.keys((id === undefined ? undefined : setups.get(id)?.ready) ?? {}),
    event: (id) => (id === undefined ? '' : (events.get(id)?.name ?? id)),
    song: (id) => (id === undefined ? undefined : songs.get(id)),
    pass: (id) => (id === undefined ? undefined : passes.get(id)),
    person: (id) => people.get(id),
  };
}

/** `S1`, the code by which everybody calls a song, and its title. */
export function songWords(song: Song): { code: string; title: string } {
  return { code: song.code ?? (song.title === undefined ? song.id : ''), title: song.title ?? '' };
}

export function partName(part: Part): string {
  return part.name ?? part.id.replaceAll('-', ' ');
}

/** The parts of a pass, as far as its song has them. */
export function partsOf(pass: Pass, song: Song | undefined): Part[] {
  const wanted = new Set(pass.parts ?? []);
  return (song?.parts ?? []).filter((part) => wanted.has(part.id));
}
