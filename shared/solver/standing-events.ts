import { Attempt } from './attempt';
import { Board } from './board';
import { OF_A_PERSON } from './constraints/all';
import type { Problem } from './model';

/**
 * Whether the events of a production can stand as they are fixed, with nobody called for anything else: they do not overlap in a room
 * or in a person, and each person's stays, nights, limits and meals hold. Where not, there is no plan at all.
 */
export function eventsStand(problem: Problem): boolean {
  const overlapping = (indices: readonly number[]) =>
    indices.some((index, i) => i > 0 && problem.events[index]!.from < problem.events[indices[i - 1]!]!.to);
  if (problem.rooms.some((room) => overlapping(room.events))) return false;
  const board = new Board(problem);
  board.clear();
  return problem.people.every((person, q) => {
    if (overlapping(person.events)) return false;
    const day = new Attempt(problem);
    day.person = q;
    return [...new Set(person.events.map((index) => problem.events[index]!.dateIndex))].every((date) => {
      day.date = date;
      day.read(board);
      return OF_A_PERSON.every((constraint) => constraint.next(board, day) === day.start);
    });
  });
}
