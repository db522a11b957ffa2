import type { MadePlan, PlanCall } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import { estimateOf } from '../../planner/derive';
import type { ZoneClock } from '../../time/wall';
import { DEFAULT_RULES } from '../defaults';
import type { WallTime } from '../flavours';
import { isOwn, windowEnd } from './marks';
import type { Names } from './names';
import { usedRoomDays } from './room-days';

export interface ReleaseRange {
  earliest: WallTime;
  likely: WallTime;
  latest: WallTime;
}

/**
 * When a person can go: the planned time, and a range around it from the low and high minutes of the passes of that room up to the
 * person's last one. The passes are taken as independent, so their spreads add up as squares (variances add: elementary statistics);
 * that low and high are about equally far out for every pass is common practice, no source. Rounded outwards to the plan's step,
 * never earlier than the start of the last item, never later than the room or the person's own window allows.
 */
export function releaseRange(file: ProductionFile, plan: MadePlan, call: PlanCall, names: Names, zone: ZoneClock): ReleaseRange {
  const planned: ReleaseRange = { earliest: call.release, likely: call.release, latest: call.release };
  const release = zone.minuteOf(call.release);
  const days = usedRoomDays(file, plan.items).filter((day) => day.date === call.date);
  const own = days.flatMap((day) =>
    day.items.filter((item) => isOwn(item, call.person, day.room.operators)).map((item) => ({ day, item })),
  );
  const last = own.reduce<(typeof own)[number] | null>((late, one) => (late === null || one.item.end > late.item.end ? one : late), null);
  if (last === null || release === 'gap') return planned;
  let under = 0;
  let over = 0;
  for (const item of last.day.items) {
    const pass = item.kind === 'pass' ? names.pass(item.id) : undefined;
    if (!pass || item.start > last.item.start) continue;
    const [low, likely, high] = estimateOf(pass.minutes);
    under += (likely - low) ** 2;
    over += (high - likely) ** 2;
  }
  const step = file.production.rules?.step ?? DEFAULT_RULES.step;
  const outwards = (squares: number) => Math.ceil(Math.sqrt(squares) / step) * step;
  const earliest = zone.wallOf(release - outwards(under));
  const latest = zone.wallOf(release + outwards(over));
  const end = windowEnd(names.person(call.person)?.windows, { from: call.arrive, to: call.release });
  const closing = end !== null && end < last.day.open.to ? end : last.day.open.to;
  return {
    earliest: earliest > last.item.start ? earliest : last.item.start,
    likely: call.release,
    latest: latest < closing ? latest : closing > call.release ? closing : call.release,
  };
}
