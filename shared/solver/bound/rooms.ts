import type { Minutes } from '../../domain/flavours';
import { merged, within, type PassModel, type Problem, type RoomDay, type RoomModel } from '../model';
import { leastBins } from '../packing';
import { leastPauses, mostOfRoomDay } from '../pauses';
import { leastAlongChains, leastBuilding, leastRig } from './setups';
import { leastPlaces, type Choices } from './stab';

const sumOf = (numbers: readonly number[]): number => numbers.reduce((sum, number) => sum + number, 0);

/**
 * The least points of room-days, overtime and changeovers in one room for the passes that must be in it. Over how many room-days they are
 * spread is open: for each number the least is reckoned, and the smallest counts.
 * @param placed all passes that are surely placed, in any room, as positions in the problem
 */
export function leastOfRoom(problem: Problem, index: number, placed: readonly number[]): number {
  const passes = placed.map((pass) => problem.passes[pass]!).filter((pass) => pass.room === index);
  if (passes.length === 0) return 0;
  const room = problem.rooms[index]!;
  const { weights } = problem;
  const position = new Map(room.days.map((day, i) => [day, i]));
  const usable = [...new Set(passes.flatMap((pass) => pass.days))].map((day) => problem.days[day]!);
  const placesOf = (list: readonly PassModel[]) => list.map((pass) => pass.days.map((day) => position.get(day)!));
  const apart = leastPlaces(placesOf(passes), new Set());
  const onSetups = passes.filter((pass) => pass.setup >= 0);
  const built = Math.max(leastBuilt(problem, room, onSetups, placesOf), leastAlongChains(problem, index, placed));
  const played = Math.max(1, apart, leastPlayed(problem, room, usable, passes));
  let points = Infinity;
  for (let count = played; count <= Math.max(played, room.days.length); count++) {
    const spread = leastContent(problem, passes, built, { used: count, played, unheard: mostOnOneDate(usable) });
    const overtime = room.standard === null ? 0 : Math.max(0, spread - count * room.standard);
    points = Math.min(points, weights.day * count + weights.overtime * overtime);
  }
  return points + weights.changeover * built;
}

/** Rigs and changeovers; a room that is cleared every night is bare on each room-day on which it is played on a set-up. */
function leastBuilt(
  problem: Problem,
  room: RoomModel,
  passes: readonly PassModel[],
  placesOf: (passes: readonly PassModel[]) => Choices[],
): Minutes {
  const setups = [...new Set(passes.map((pass) => pass.setup))];
  if (setups.length === 0) return 0;
  const built = leastBuilding(problem, setups, room.standing);
  return room.standing ? built : Math.max(built, leastPlaces(placesOf(passes), new Set()) * leastRig(problem, setups));
}

function longestItem(problem: Problem, passes: readonly PassModel[], reserve: Minutes): Minutes {
  const { lengths, setups } = problem;
  const rigs = setups.map(({ rig }) => rig);
  return Math.max(lengths.wrap, lengths.listen, reserve, ...passes.map(({ minutes }) => minutes), ...rigs, ...problem.changeovers);
}

/** Reserve over so many room-days, each of which rounds its share down. */
function leastReserve(problem: Problem, minutes: Minutes, roomDays: number): Minutes {
  const { reserve, step } = problem.rules;
  return Math.max(0, Math.floor((reserve * minutes) / step) * step - (roomDays - 1) * step);
}

/** The least number of room-days whose hours, the longest first, hold passes and reserve beside wraps and pauses. */
function leastPlayed(problem: Problem, room: RoomModel, usable: readonly RoomDay[], passes: readonly PassModel[]): number {
  const minutes = sumOf(passes.map((pass) => pass.minutes));
  const longest = longestItem(problem, passes, leastReserve(problem, minutes, 1));
  const capacities = usable.map((day) => {
    const events = merged(room.events.map((event) => problem.events[event]!));
    const blocked = within(events, day.from, day.to);
    return Math.max(0, mostOfRoomDay(problem.rules, day.to - day.from, blocked, longest) - problem.lengths.wrap);
  });
  const sizes = passes.map((pass) => pass.minutes);
  const count = leastBins(sizes, capacities, leastReserve(problem, minutes, usable.length));
  return count === Infinity ? 0 : count;
}

/** Room-days of one date: only they can all be without a listen. */
function mostOnOneDate(days: readonly RoomDay[]): number {
  const counts = new Map<number, number>();
  for (const { dateIndex } of days) counts.set(dateIndex, (counts.get(dateIndex) ?? 0) + 1);
  return Math.max(0, ...counts.values());
}

/** How many room-days are used, how many of them at least hold a pass, and how many of those may be without a listen. */
interface Spread {
  used: number;
  played: number;
  unheard: number;
}

/** The least minutes, from first to last item, of so many room-days together. */
function leastContent(problem: Problem, passes: readonly PassModel[], built: Minutes, { used, played, unheard }: Spread): Minutes {
  const { lengths, rules } = problem;
  const minutes = sumOf(passes.map((pass) => pass.minutes));
  const listens = rules.listen > 0 ? Math.max(0, played - unheard) * lengths.listen : 0;
  const work = minutes + built + leastReserve(problem, minutes, used) + played * lengths.wrap + listens;
  const longest = longestItem(problem, passes, leastReserve(problem, minutes, 1));
  return work + leastPauses(rules, work, longest, used);
}
