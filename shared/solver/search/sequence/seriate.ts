import type { Sequence } from './model';

const ROUNDS = 1500;

/**
 * An order that puts passes with the same people near each other: sorted by the second eigenvector of the Laplacian of what they share
 * (Atkins, Boman and Hendrickson, "A spectral algorithm for seriation and the consecutive ones problem", SIAM Journal on Computing 28,
 * 1998), found by the power method. Where nobody need wait at all, it finds that order.
 */
export function seriate(sequence: Sequence): Int32Array {
  const count = sequence.passes.length;
  const { castAt, cast, rate } = sequence;
  const shared = new Float64Array(count * count);
  const degree = new Float64Array(count);
  const plays: number[][] = Array.from({ length: sequence.people }, () => []);
  for (let pass = 0; pass < count; pass++) for (let k = castAt[pass]!; k < castAt[pass + 1]!; k++) plays[cast[k]!]!.push(pass);
  plays.forEach((list, person) => {
    for (const a of list)
      for (const b of list) {
        if (a === b) continue;
        shared[a * count + b]! += rate[person]!;
        degree[a]! += rate[person]!;
      }
  });
  const shift = 2 * degree.reduce((most, value) => Math.max(most, value), 1);
  let vector = Float64Array.from({ length: count }, (_, i) => i - (count - 1) / 2);
  for (let round = 0; round < ROUNDS; round++) {
    const next = new Float64Array(count);
    let mean = 0;
    for (let a = 0; a < count; a++) {
      let sum = (shift - degree[a]!) * vector[a]!;
      for (let b = 0; b < count; b++) sum += shared[a * count + b]! * vector[b]!;
      next[a] = sum;
      mean += sum / count;
    }
    let most = 1e-300;
    for (let a = 0; a < count; a++) {
      next[a]! -= mean;
      most = Math.max(most, Math.abs(next[a]!));
    }
    for (let a = 0; a < count; a++) next[a]! /= most;
    vector = next;
  }
  const order = Int32Array.from({ length: count }, (_, i) => i);
  return order.sort((a, b) => vector[a]! - vector[b]! || a - b);
}
