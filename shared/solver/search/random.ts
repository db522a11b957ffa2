/**
 * Random numbers of a seed, the same on every engine: the 32-bit generator of George Marsaglia, "Xorshift RNGs", Journal of Statistical
 * Software 8 (14), 2003, shifts 13, 17, 5; the seed is spread by the finalizer of MurmurHash3 (Austin Appleby, public domain).
 */
export class Random {
  private state: number;

  constructor(seed: number) {
    let hash = (seed | 0) ^ 0x9e3779b9;
    hash = Math.imul(hash ^ (hash >>> 16), 0x85ebca6b);
    hash = Math.imul(hash ^ (hash >>> 13), 0xc2b2ae35);
    this.state = (hash ^ (hash >>> 16)) | 0 || 1;
  }

  /** A whole number from 0 to 2³² − 1. */
  next(): number {
    let state = this.state;
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    this.state = state;
    return state >>> 0;
  }

  /** A whole number from 0 to `count` − 1. */
  below(count: number): number {
    return Math.floor((this.next() * count) / 4294967296);
  }
}
