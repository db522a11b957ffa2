import type { ProductionFile } from '../../shared/contracts/resources';
import { Random } from '../../shared/solver/search/random';

/** A production of one room and one day without pauses, in which only the order of the passes matters. */
export function orderProduction(seed: number, count: number, withSetups: boolean): ProductionFile {
  const random = new Random(seed);
  const people = Array.from({ length: 4 }, (_, i) => ({ id: `p${i}`, fee: { waiting: 1 + random.below(3) } }));
  const setups = withSetups ? Array.from({ length: count }, (_, i) => ({ id: `u${i}`, rig: random.below(30) })) : [];
  return {
    production: {
      code: 'ORDER',
      title: 'Order',
      timezone: 'Etc/UTC',
      rules: { step: 1, meal: 0, breakAfter: 0, wrap: 0, listen: 0, reserve: 0 },
    },
    rooms: [{ id: 'a', open: [{ from: '2027-03-08T00:00', to: '2027-03-10T00:00' }] }],
    people,
    gear: [],
    setups,
    changeovers: setups.flatMap((from) => setups.map((to) => ({ from: from.id, to: to.id, minutes: random.below(40) }))),
    songs: [],
    passes: Array.from({ length: count }, (_, i) => ({
      id: `x${i}`,
      room: 'a',
      minutes: 5 + random.below(40),
      people: people.filter(() => random.below(2) === 0).map(({ id }) => id),
      ...(withSetups && { setup: `u${i}` }),
      ...(i > 0 && random.below(4) === 0 && { after: [{ pass: `x${random.below(i)}` }] }),
    })),
    events: [],
  };
}

/** Every order of the numbers from 0 to `count` − 1. */
export function permutations(count: number): number[][] {
  if (count === 0) return [[]];
  return permutations(count - 1).flatMap((order) =>
    Array.from({ length: count }, (_, at) => [...order.slice(0, at), count - 1, ...order.slice(at)]),
  );
}
