/** Whether so many capacities may hold all sizes, as far as their sum and, for each size, the number of pieces at least so large tell. */
function mayHold(sizes: readonly number[], capacities: readonly number[], sum: number): boolean {
  if (capacities.reduce((all, capacity) => all + capacity, 0) < sum) return false;
  // Sizes come largest first, so `at + 1` of them are at least as large as the one at hand.
  return sizes.every((size, at) => size <= 0 || capacities.reduce((held, capacity) => held + Math.floor(capacity / size), 0) > at);
}

/**
 * The least number of capacities, the largest first, that may hold all sizes, none of them split. A lower bound: more may be needed.
 * @param extra what must fit in beside the sizes and may be split
 * @returns Infinity where all capacities together cannot hold them
 */
export function leastBins(sizes: readonly number[], capacities: readonly number[], extra = 0): number {
  const large = [...sizes].sort((a, b) => b - a);
  const ample = [...capacities].sort((a, b) => b - a);
  const sum = large.reduce((all, size) => all + size, extra);
  if (sum <= 0) return 0;
  for (let count = 1; count <= ample.length; count++) if (mayHold(large, ample.slice(0, count), sum)) return count;
  return Infinity;
}
