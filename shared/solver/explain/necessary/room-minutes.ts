import type { Pass } from '../../../contracts/resources';
import type { Minutes, RoomId, SetupId } from '../../../domain/flavours';
import { buildFromBare, leastEntry, mostWork, reserveFor } from '../days';
import { leastBins } from '../../packing';
import { placesOf } from '../places';
import type { OpenWindow, RoomFacts } from '../statement';
import type { NecessaryCondition } from '../condition';
import { fieldOf, minutesOf, neededPasses, roomIdOf, roundUp, ruleOf, type View } from '../view';
import { roomWords } from '../words';
import { dayWords, length } from '../../../time/words';

/**
 * The passes that can only be in some windows of a room, one after another, fit into them together with their rigs and changeovers, the
 * reserve, the wraps, the listens and the pauses. Asked of every run of neighbouring windows, short runs first.
 */
export const roomMinutes: NecessaryCondition = {
  name: 'room minutes',
  subjects({ statement }) {
    const runs = [...statement.rooms.values()].flatMap(({ room, windows }) =>
      windows.flatMap((_, first) => windows.slice(first).map((__, more) => ({ room: room.id, first, last: first + more }))),
    );
    runs.sort((one, other) => one.last - one.first - (other.last - other.first));
    return runs.map(({ room, first, last }) => `${room} ${first} ${last}`);
  },
  fails(view, subject) {
    const [room = '', first, last] = subject.split(' ');
    const facts = view.statement.rooms.get(room)!;
    if (!view.has(`rooms.${room}.open`)) return null;
    const windows = facts.windows.slice(Number(first), Number(last) + 1);
    const passes = neededPasses(view).filter((pass) => {
      if (roomIdOf(view.statement, pass) !== room) return false;
      const places = placesOf(view, pass);
      return places.length > 0 && places.every((place) => windows.some((window) => window === place.window));
    });
    if (passes.length < 2) return null;
    const wanted = wantedMinutes(view, facts, windows, passes);
    const most = mostMinutes(view, room, windows, passes);
    const when =
      windows.length === 1 ? `on ${dayWords(windows[0]!.date)}` : `from ${dayWords(windows[0]!.date)} to ${dayWords(windows.at(-1)!.date)}`;
    if (wanted <= most) {
      const sizes = passes.map((pass) => minutesOf(view, pass));
      const capacities = windows.map((window) => mostInWindow(view, room, window, passes));
      if (leastBins(sizes, capacities) < Infinity) return null;
      return `The passes in ${roomWords(view.statement, room)} are too long to be shared out ${when}`;
    }
    return `${roomWords(view.statement, room)} would need ${length(wanted)} of work ${when} and has ${length(most)} at most`;
  },
};

/** Passes, rigs and changeovers, and reserve. */
function wantedMinutes(view: View, { room, windows: all }: RoomFacts, windows: readonly OpenWindow[], passes: readonly Pass[]): Minutes {
  const sum = passes.reduce((minutes, pass) => minutes + minutesOf(view, pass), 0);
  // Each further room-day may round its reserve down once more.
  const reserve = Math.max(0, reserveFor(view, sum) - (windows.length - 1) * ruleOf(view, 'step'));
  const setups = new Set<SetupId>();
  for (const pass of passes) {
    const setup = fieldOf(view, pass, 'setup');
    if (setup !== undefined) setups.add(setup);
  }
  const entries = [...setups].map((setup) => leastEntry(view, setup));
  const built = entries.reduce((minutes, entry) => minutes + entry, 0);
  if (entries.length === 0 || room.standing === false) return sum + reserve + built;
  // What stands from before need not be built again; in a bare room the first one is rigged.
  const before = windows[0] !== all[0];
  const saved = before
    ? -Math.max(...entries)
    : Math.min(...[...setups].map((setup) => buildFromBare(view, setup) - leastEntry(view, setup)));
  return sum + reserve + built + saved;
}

/** The most minutes that the windows leave for that: without wraps, pauses and the listens of all dates but one, the first in use. */
function mostMinutes(view: View, room: RoomId, windows: readonly OpenWindow[], passes: readonly Pass[]): Minutes {
  const listen = roundUp(view, ruleOf(view, 'listen'));
  let most = 0;
  const gain = new Map<string, Minutes>();
  for (const window of windows) {
    const work = mostInWindow(view, room, window, passes);
    const heard = Math.max(0, work - listen);
    most += heard;
    gain.set(window.date, (gain.get(window.date) ?? 0) + work - heard);
  }
  return most + Math.max(0, ...gain.values());
}

/** The most minutes of work beside the wrap that one window holds. */
function mostInWindow(view: View, room: RoomId, window: OpenWindow, passes: readonly Pass[]): Minutes {
  const wrap = roundUp(view, ruleOf(view, 'wrap'));
  const lengths = passes.map((pass) => minutesOf(view, pass));
  const sum = lengths.reduce((minutes, length) => minutes + length, 0);
  const rigs = [...view.statement.setups.values()].map(({ rig }) => roundUp(view, rig ?? 0));
  const changes = view.statement.file.changeovers.map(({ minutes }) => roundUp(view, minutes));
  const others = [wrap, roundUp(view, ruleOf(view, 'listen')), reserveFor(view, sum), roundUp(view, ruleOf(view, 'changeover'))];
  return Math.max(0, mostWork(view, room, window, Math.max(...others, ...rigs, ...changes, ...lengths)) - wrap);
}
