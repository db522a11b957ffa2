import type { PassId } from '../../../shared/domain/flavours';
import type { DayItem, PlanDay } from '../../../shared/planner/day';
import { length } from '../../../shared/time/words';

export type Step = 'up' | 'down' | 'left' | 'right' | 'first' | 'last';

export const passesOf = (day: PlanDay): DayItem[] => day.items.filter(({ kind, from, to }) => kind === 'pass' && from < to);

/** The pass that an arrow leads to: up and down in time within the day, left and right to the nearest time of another day. */
export function stepFrom(days: readonly PlanDay[], pass: PassId, step: Step): PassId | null {
  const at = days.findIndex((day) => passesOf(day).some(({ id }) => id === pass));
  const day = days[at];
  if (!day) return null;
  const own = passesOf(day);
  const index = own.findIndex(({ id }) => id === pass);
  const item = own[index]!;
  switch (step) {
    case 'up':
      return own[index - 1]?.id ?? null;
    case 'down':
      return own[index + 1]?.id ?? null;
    case 'first':
      return own[0]!.id;
    case 'last':
      return own.at(-1)!.id;
    case 'left':
      return nearest(days.slice(0, at).reverse(), item.from - day.from);
    case 'right':
      return nearest(days.slice(at + 1), item.from - day.from);
  }
}

function nearest(days: readonly PlanDay[], offset: number): PassId | null {
  const day = days.find((one) => passesOf(one).length > 0);
  if (!day) return null;
  const away = (item: DayItem): number => Math.abs(item.from - day.from - offset);
  return passesOf(day).reduce((best, item) => (away(item) < away(best) ? item : best)).id;
}

/** An item read aloud: `S1 Weir Song, 12:30 to 13:45, Room A, Mara, Tob; pinned`. */
export function itemInWords(item: DayItem, day: PlanDay): string {
  const names = new Map(day.threads.map(({ person, short }) => [person, short]));
  const room = day.rooms.find(({ id }) => id === item.room)?.name;
  const people = item.people.map((person) => names.get(person) ?? person);
  const parts = [item.code === null ? item.full : `${item.code} ${item.full}`, `${item.starts} to ${item.ends}`, room, ...people];
  return parts.filter((part) => part !== undefined).join(', ') + (item.pinned ? '; pinned' : '');
}

/** What the clock on the wall shows at a minute of a drawn day. */
export function clockAt(day: PlanDay, minute: number): string {
  const hour = day.hours.filter(({ at }) => at <= minute).at(-1);
  return hour ? `${hour.label.slice(0, 2)}:${String(Math.round(minute - hour.at)).padStart(2, '0')}` : '';
}

/** Threads read aloud: `Tob arrives 11:15, leaves 15:45, waits 30 min`. */
export function threadsInWords(day: PlanDay): string[] {
  return day.threads.flatMap(({ short, stays }) =>
    stays.map(({ arrive, release, marks }) => {
      const busy = marks.reduce((sum, { from, to }) => sum + to - from, 0);
      const waits = release - arrive - busy;
      const stay = `${short} arrives ${clockAt(day, arrive)}, leaves ${clockAt(day, release)}`;
      return waits > 0 ? `${stay}, waits ${length(waits)}` : stay;
    }),
  );
}

/** What stands under a day's name: its rooms with their hours, and what else holds that day. */
export function dayInWords(day: PlanDay): string {
  const used = day.rooms.filter((room) => room.used);
  const byHours = new Map<string, string[]>();
  for (const { name, open, loudUntil } of used.length > 0 ? used : day.rooms) {
    const hours = `${open}${loudUntil === null ? '' : `, loud until ${loudUntil}`}`;
    byHours.set(hours, [...(byHours.get(hours) ?? []), name]);
  }
  const rooms = [...byHours].map(([hours, names]) => `${names.join(' and ')} ${hours}`);
  return [...rooms, ...day.notes].join(' · ');
}
