/** A pass that must be on one of these places, by position in an ordered list. */
export type Choices = readonly number[];

/**
 * The least number of places that touch every list of choices, from below: lists whose stretches from first to last choice do not overlap
 * need a place each, and taking the stretch that ends first finds the most of those (Gavril's greedy rule for intervals).
 * @param taken places that are in use anyway; lists that hold one of them ask for nothing
 */
export function leastPlaces(lists: readonly Choices[], taken: ReadonlySet<number>): number {
  const open = lists.filter((list) => list.length > 0 && !list.some((place) => taken.has(place)));
  const stretches = open.map((list) => ({ first: Math.min(...list), last: Math.max(...list) })).sort((a, b) => a.last - b.last);
  let count = 0;
  let covered = -Infinity;
  for (const { first, last } of stretches) {
    if (first <= covered) continue;
    count += 1;
    covered = last;
  }
  return count;
}
