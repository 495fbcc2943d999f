/** 2^64 steps as a polynomial in one step, lowest power first, 32 bits a word. Source: D. Blackman, S. Vigna, as below. */
const JUMP = [0x8764000b, 0xf542d2d3, 0x6fa035c3, 0x77f2db5b] as const;
const WORD_BITS = 32;

/**
 * The generator xoshiro128++ 1.0: 128 bits of state, period 2^128 − 1, 32 random bits a step.
 * Streams of one seed start 2^64 steps apart, so that no two of them overlap.
 * Source: D. Blackman, S. Vigna, Scrambled linear pseudorandom number generators, ACM Trans. Math. Software 47 (2021) 36.
 */
export class Generator {
  /** The four words of state, signed. */
  readonly state = new Int32Array(4);

  /** @param state four words, not all 0 */
  constructor(state: ArrayLike<number>) {
    this.state.set(state);
  }

  /** The next 32 bits, as a signed whole number. */
  next(): number {
    const { state } = this;
    const s0 = state[0] as number;
    const s1 = state[1] as number;
    const s2 = (state[2] as number) ^ s0;
    const s3 = (state[3] as number) ^ s1;
    const sum = (s0 + (state[3] as number)) | 0;
    state[0] = s0 ^ s3;
    state[1] = s1 ^ s2;
    state[2] = s2 ^ (s1 << 9);
    state[3] = (s3 << 11) | (s3 >>> 21);
    return (((sum << 7) | (sum >>> 25)) + s0) | 0;
  }

  /** The next words, as many as there is room for: what `next` would give one by one, with the state kept out of memory. */
  fill(words: Int32Array): void {
    const { state } = this;
    let s0 = state[0] as number;
    let s1 = state[1] as number;
    let s2 = state[2] as number;
    let s3 = state[3] as number;
    for (let i = 0; i < words.length; i += 1) {
      const sum = (s0 + s3) | 0;
      words[i] = (((sum << 7) | (sum >>> 25)) + s0) | 0;
      const shifted = s1 << 9;
      s2 ^= s0;
      s3 ^= s1;
      s1 ^= s2;
      s0 ^= s3;
      s2 ^= shifted;
      s3 = (s3 << 11) | (s3 >>> 21);
    }
    state[0] = s0;
    state[1] = s1;
    state[2] = s2;
    state[3] = s3;
  }

  /** Uniform on the multiples of 2^−53 in [0, 1). */
  uniform(): number {
    const high = this.next();
    return place(high, this.next()) * 2 ** -53;
  }

  /** Goes on by 2^64 steps. */
  jump(): void {
    const jumped = new Int32Array(4);
    for (const word of JUMP) {
      for (let bit = 0; bit < WORD_BITS; bit += 1) {
        if ((word >>> bit) & 1) for (let i = 0; i < 4; i += 1) jumped[i] = (jumped[i] ?? 0) ^ (this.state[i] ?? 0);
        this.next();
      }
    }
    this.state.set(jumped);
  }
}

/** 53 of 64 random bits as a whole number below 2^53; the 11 low bits of `high` are left for other use. */
export function place(high: number, low: number): number {
  return (high >>> 11) * 2 ** 32 + (low >>> 0);
}

/**
 * The state that a seed stands for: four words of the output of splitmix64, as the generator's authors recommend.
 * Source: G. L. Steele, D. Lea, C. H. Flood, Fast splittable pseudorandom number generators, OOPSLA 2014, 453–472.
 * @param seed a whole number from 0 to 2^53 − 1
 */
export function seededState(seed: number): Int32Array {
  const words = new Int32Array(4);
  let counter = BigInt(seed);
  for (let i = 0; i < 4; i += 2) {
    counter = BigInt.asUintN(64, counter + 0x9e3779b97f4a7c15n);
    let mixed = counter;
    mixed = BigInt.asUintN(64, (mixed ^ (mixed >> 30n)) * 0xbf58476d1ce4e5b9n);
    mixed = BigInt.asUintN(64, (mixed ^ (mixed >> 27n)) * 0x94d049bb133111ebn);
    mixed ^= mixed >> 31n;
    words[i] = Number(BigInt.asIntN(32, mixed));
    words[i + 1] = Number(BigInt.asIntN(32, mixed >> 32n));
  }
  return words;
}
