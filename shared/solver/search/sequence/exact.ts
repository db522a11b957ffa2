import type { Sequence } from './model';

/** Most passes whose sets are gone through: two to this power, and times the last pass where changeovers matter. */
const MOST = 20;
const MOST_WITH_CHANGES = 15;
/** Sets between two questions whether to stop. */
const PACE = 1024;

/**
 * The best order by dynamic programming over the sets of passes done (Held and Karp, "A dynamic programming approach to sequencing
 * problems", SIAM Journal 10, 1962): what a next pass adds to the cost depends on the set done before it and, through the changeover,
 * on its last pass. Null where there are too many passes, or bounds that make the clock itself matter.
 */
export function exactOrder(sequence: Sequence, stop: () => boolean): Int32Array | null {
  const { passes, bounded, changes, provable } = sequence;
  if (bounded || !provable || passes.length > (changes ? MOST_WITH_CHANGES : MOST)) return null;
  return changes ? bySetAndLast(sequence, stop) : bySet(sequence, stop);
}

/** Per pass: the passes that must be in the set before it. */
function needs(sequence: Sequence): Int32Array {
  const count = sequence.passes.length;
  const needed = new Int32Array(count);
  for (let a = 0; a < count; a++) for (let b = 0; b < count; b++) if (sequence.before[a * count + b] === 1) needed[b]! |= 1 << a;
  return needed;
}

/** Per person the passes, as a set. */
function castSets(sequence: Sequence): Int32Array {
  const sets = new Int32Array(sequence.people);
  for (let pass = 0; pass < sequence.passes.length; pass++)
    for (let k = sequence.castAt[pass]!; k < sequence.castAt[pass + 1]!; k++) sets[sequence.cast[k]!]! |= 1 << pass;
  return sets;
}

/** What a minute costs in waiting after the set is done, with nobody at work; `active` tells who then waits. */
function waitingRate(sequence: Sequence, casts: Int32Array, done: number, active: Uint8Array): number {
  let rate = 0;
  for (let person = 0; person < casts.length; person++) {
    const set = casts[person]!;
    const waits = (set & done) !== 0 && (set & ~done) !== 0;
    active[person] = waits ? 1 : 0;
    if (waits) rate += sequence.rate[person]!;
  }
  return rate;
}

/** That rate while a pass runs, whose people do not wait. */
function rateDuring(sequence: Sequence, rate: number, active: Uint8Array, pass: number): number {
  let less = 0;
  for (let k = sequence.castAt[pass]!; k < sequence.castAt[pass + 1]!; k++)
    if (active[sequence.cast[k]!] === 1) less += sequence.rate[sequence.cast[k]!]!;
  return rate - less;
}

function bySet(sequence: Sequence, stop: () => boolean): Int32Array | null {
  const { minutes, change } = sequence;
  const count = minutes.length;
  const full = 2 ** count - 1;
  const needed = needs(sequence);
  const casts = castSets(sequence);
  const active = new Uint8Array(casts.length);
  // Where every changeover is alike, people who are waiting wait through it, too.
  const pause = count > 1 ? change[1]! : 0;
  const cost = new Float64Array(full + 1).fill(Infinity);
  const chosen = new Int8Array(full + 1);
  cost[0] = 0;
  for (let done = 0; done < full; done++) {
    if (done % PACE === 0 && stop()) return null;
    if (cost[done] === Infinity) continue;
    const rate = waitingRate(sequence, casts, done, active);
    const between = pause * rate;
    for (let pass = 0; pass < count; pass++) {
      const bit = 1 << pass;
      if ((done & bit) !== 0 || (needed[pass]! & ~done) !== 0) continue;
      const value = cost[done]! + between + minutes[pass]! * rateDuring(sequence, rate, active, pass);
      if (value >= cost[done | bit]!) continue;
      cost[done | bit] = value;
      chosen[done | bit] = pass;
    }
  }
  const order = new Int32Array(count);
  for (let set = full, i = count - 1; i >= 0; i--) {
    order[i] = chosen[set]!;
    set &= ~(1 << order[i]!);
  }
  return order;
}

function bySetAndLast(sequence: Sequence, stop: () => boolean): Int32Array | null {
  const { minutes, change, rig, changeWeight } = sequence;
  const count = minutes.length;
  const full = 2 ** count - 1;
  const needed = needs(sequence);
  const casts = castSets(sequence);
  const active = new Uint8Array(casts.length);
  const cost = new Float64Array((full + 1) * count).fill(Infinity);
  const chosen = new Int8Array((full + 1) * count);
  for (let pass = 0; pass < count; pass++) if (needed[pass] === 0) cost[(1 << pass) * count + pass] = changeWeight * rig[pass]!;
  for (let done = 1; done < full; done++) {
    if (done % PACE === 0 && stop()) return null;
    const between = waitingRate(sequence, casts, done, active);
    for (let pass = 0; pass < count; pass++) {
      const bit = 1 << pass;
      if ((done & bit) !== 0 || (needed[pass]! & ~done) !== 0) continue;
      const during = minutes[pass]! * rateDuring(sequence, between, active, pass);
      const at = (done | bit) * count + pass;
      for (let last = 0; last < count; last++) {
        const known = cost[done * count + last]!;
        if (known === Infinity) continue;
        const minutesOfChange = change[last * count + pass]!;
        const value = known + during + minutesOfChange * (changeWeight + between);
        if (value >= cost[at]!) continue;
        cost[at] = value;
        chosen[at] = last;
      }
    }
  }
  let last = 0;
  for (let pass = 1; pass < count; pass++) if (cost[full * count + pass]! < cost[full * count + last]!) last = pass;
  const order = new Int32Array(count);
  for (let set = full, i = count - 1; i >= 0; i--) {
    order[i] = last;
    const before = chosen[set * count + last]!;
    set &= ~(1 << last);
    last = before;
  }
  return order;
}
