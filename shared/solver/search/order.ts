import type { Solution } from '../solution';

/** Takes a pass out of the order; its place at the end is free for `put`. */
export function take(solution: Solution, pass: number): void {
  const { order } = solution;
  const at = order.indexOf(pass);
  order.copyWithin(at, at + 1);
  order[order.length - 1] = -1;
}

/** Puts a pass into an order with `free` places free at its end, at a place or as near to it as the layers allow. */
export function put(solution: Solution, pass: number, day: number, at: number, free: number): void {
  const { order } = solution;
  const { low, high } = layerRange(solution, day, free);
  const place = Math.min(Math.max(at, low), high);
  order.copyWithin(place + 1, place, order.length - 1);
  order[place] = pass;
  solution.day[pass] = day;
}

/** The places in the order that belong to the layer of a room-day: a pass may stand at `low` … `high`. */
export function layerRange(solution: Solution, day: number, free: number): { low: number; high: number } {
  const { layer } = solution.problem.days[day]!;
  const { order } = solution;
  const end = order.length - free;
  let low = 0;
  while (low < end && solution.layerOf(order[low]!) < layer) low += 1;
  let high = low;
  while (high < end && solution.layerOf(order[high]!) === layer) high += 1;
  return { low, high };
}
