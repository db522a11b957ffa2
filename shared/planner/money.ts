import type { PlanCall, PlanItem } from '../contracts/plan';
import type { ProductionFile } from '../contracts/resources';
import { DEFAULT_CURRENCY } from '../domain/defaults';
import { zoneClock } from '../time/wall';
import { planDays } from './day';
import { effectivePasses } from './derive';

/** What a plan costs in money, in units of `currency`. Prices are the production's own; what has none costs nothing here. */
export interface PlanMoney {
  currency: string;
  /** Price of every used room-day. */
  rooms: number;
  /** Hours beyond the `standard` of a room-day, from its first to its last item, at the room's price. */
  overtime: number;
  /** Per call, and per hour from arrival to release without time off. */
  fees: number;
  /** Gear with a price that a placed pass uses, once each. */
  hire: number;
  total: number;
}

const MINUTES_PER_HOUR = 60;

/**
 * Money of a plan: price of the used room-days + overtime + fees of the calls + hire of the gear it uses.
 * A room-day is one open window of a room and is used when it holds any item but an event.
 */
export function planMoney(file: ProductionFile, plan: { items: readonly PlanItem[]; calls: readonly PlanCall[] }): PlanMoney {
  const { rooms, overtime } = roomMoney(file, plan.items);
  const fees = feeMoney(file, plan);
  const hire = hireMoney(file, plan.items);
  return { currency: file.production.currency ?? DEFAULT_CURRENCY, rooms, overtime, fees, hire, total: rooms + overtime + fees + hire };
}

/** Whether the production names any price at all; without one there is nothing to say about money. */
export function hasPrices(file: ProductionFile): boolean {
  return (
    file.rooms.some(({ price }) => price?.day || price?.overtimeHour) ||
    file.people.some(({ fee }) => fee?.call || fee?.perHour) ||
    file.gear.some(({ price }) => price)
  );
}

function roomMoney(file: ProductionFile, items: readonly PlanItem[]): { rooms: number; overtime: number } {
  const zone = zoneClock(file.production.timezone);
  const minute = (wall: string): number => {
    const at = zone.minuteOf(wall);
    return at === 'gap' ? Number.NaN : at;
  };
  let rooms = 0;
  let overtime = 0;
  for (const room of file.rooms) {
    const own = items.filter((item) => item.room === room.id && item.kind !== 'event');
    for (const open of room.open) {
      const within = own.filter((item) => minute(open.from) <= minute(item.start) && minute(item.end) <= minute(open.to));
      if (within.length === 0) continue;
      rooms += room.price?.day ?? 0;
      const length = Math.max(...within.map(({ end }) => minute(end))) - Math.min(...within.map(({ start }) => minute(start)));
      const beyond = room.standard ? Math.max(0, length - room.standard) : 0;
      overtime += (beyond / MINUTES_PER_HOUR) * (room.price?.overtimeHour ?? 0);
    }
  }
  return { rooms, overtime };
}

function feeMoney(file: ProductionFile, plan: { items: readonly PlanItem[]; calls: readonly PlanCall[] }): number {
  const fees = new Map(file.people.map((person) => [person.id, person.fee]));
  const perCall = plan.calls.reduce((sum, { person }) => sum + (fees.get(person)?.call ?? 0), 0);
  const perHour = planDays(file, plan)
    .flatMap(({ threads }) => threads)
    .reduce((sum, { person, stays }) => {
      const minutes = stays.reduce((all, { arrive, release }) => all + release - arrive, 0);
      return sum + (minutes / MINUTES_PER_HOUR) * (fees.get(person)?.perHour ?? 0);
    }, 0);
  return perCall + perHour;
}

function hireMoney(file: ProductionFile, items: readonly PlanItem[]): number {
  const placed = new Set(items.filter(({ kind }) => kind === 'pass').map(({ id }) => id));
  const uses = effectivePasses(file)
    .filter(({ id }) => placed.has(id))
    .flatMap((pass) => pass.uses ?? []);
  const used = new Set(uses.map(({ gear }) => gear));
  return file.gear.reduce((sum, { id, price }) => sum + (used.has(id) ? (price ?? 0) : 0), 0);
}
