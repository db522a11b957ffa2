import type { Minute, Minutes } from '../domain/flavours';
import type { GridStretch, Span } from '../solver/model';
import type { ZoneClock } from '../time/wall';

const DAY: Minutes = 1440;
/** Time zones never change twice within so short a time. */
const PROBE: Minutes = 360;

/** A stretch of elapsed minutes in which the zone keeps its offset from UTC. */
interface OffsetStretch extends Span {
  offset: Minutes;
}

/** The stretches of even offset from `from` to `to`. */
function offsetStretches(clock: ZoneClock, from: Minute, to: Minute): OffsetStretch[] {
  const stretches: OffsetStretch[] = [];
  let start = from;
  let offset = clock.offsetAt(from);
  for (let at = from; at < to;) {
    const next = Math.min(at + PROBE, to);
    if (clock.offsetAt(next) !== offset) {
      let kept = at;
      let changed = next;
      while (changed - kept > 1) {
        const middle = (kept + changed) >> 1;
        if (clock.offsetAt(middle) === offset) kept = middle;
        else changed = middle;
      }
      stretches.push({ from: start, to: changed, offset });
      start = changed;
      offset = clock.offsetAt(changed);
    }
    at = next;
  }
  stretches.push({ from: start, to: to + 1, offset });
  return stretches;
}

/** Stretches between `from` and `to` whose wall clock was shown before: the second run of the repeated time in autumn. */
export function hiddenStretches(clock: ZoneClock, from: Minute, to: Minute): Span[] {
  const stretches = offsetStretches(clock, from - DAY, to + DAY);
  return stretches.flatMap((stretch, i) => {
    const before = stretches[i - 1];
    return before && before.offset > stretch.offset ? [{ from: stretch.from, to: stretch.from + before.offset - stretch.offset }] : [];
  });
}

/**
 * Where items of a room-day may start and end: its minutes whose wall-clock minute of the day is a multiple of `step`, without those
 * that the wall clock shows a second time. Both ends of a stretch may be taken.
 */
export function gridOf(clock: ZoneClock, step: Minutes, window: Span, hidden: readonly Span[]): GridStretch[] {
  const grid: GridStretch[] = [];
  const add = (from: Minute, to: Minute, midnight: Minute) => {
    const first = from + ((((midnight - from) % step) + step) % step);
    const last = to - ((((to - midnight) % step) + step) % step);
    if (first > last) return;
    const before = grid.at(-1);
    if (before && first - before.to === step) before.to = last;
    else grid.push({ from: first, to: last, phase: first });
  };
  for (const { from, to, offset } of offsetStretches(clock, window.from, window.to)) {
    const repeated = hidden.find((span) => span.from <= from && from < span.to);
    const start = repeated ? repeated.to : from;
    if (DAY % step === 0) {
      add(start, to - 1, -offset);
      continue;
    }
    for (let at = start; at < to;) {
      const midnight = at - ((((at + offset) % DAY) + DAY) % DAY);
      const end = Math.min(midnight + DAY, to);
      add(at, end - 1, midnight);
      at = end;
    }
  }
  return grid;
}
