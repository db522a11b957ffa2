import type { MadePlan, PlanItem } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import { clock } from '../../time/words';
import type { Names } from './names';
import { passWords, taskOf } from './pass-words';
import type { RoomDay } from './room-days';
import type { Meanwhile } from './sheet';

function passInShort(file: ProductionFile, item: PlanItem, names: Names): string {
  const words = passWords(file, item, names);
  const task = taskOf(words);
  return [words.code, task === '' ? words.title : task].filter((text) => text !== '').join(' ');
}

/**
 * What goes on elsewhere while a room is open: the passes of the other rooms of that date, and events that have no row here.
 * @param sameDate all room-days of that date.
 */
export function meanwhileOf(
  day: RoomDay,
  sameDate: readonly RoomDay[],
  { file, plan, names }: { file: ProductionFile; plan: MadePlan; names: Names },
): Meanwhile[] {
  const passes = sameDate
    .filter((other) => other.room.id !== day.room.id)
    .flatMap((other) => other.items.filter((item) => item.kind === 'pass'));
  const events = plan.items.filter((item) => item.kind === 'event' && item.room !== day.room.id);
  return [...passes, ...events]
    .filter((item) => item.start < day.open.to && item.end > day.open.from)
    .sort((a, b) => (a.start < b.start ? -1 : a.start > b.start ? 1 : 0))
    .map((item) => {
      const room = file.rooms.find(({ id }) => id === item.room);
      const people = item.people.filter((person) => !(room?.operators ?? []).includes(person)).map((person) => names.short(person));
      const what = item.kind === 'event' ? names.event(item.id) : passInShort(file, item, names);
      return {
        room: room ? (room.name ?? room.id) : '',
        from: clock(item.start),
        to: clock(item.end),
        says: people.length > 0 ? `${what} (${people.join(', ')})` : what,
      };
    });
}
