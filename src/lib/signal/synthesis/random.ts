/** Seeded source of random numbers: the same seed gives the same sequence on every machine. */
export interface Random {
  /** Uniform in [0, 1). */
  readonly uniform: () => number;
  /** Uniform in [low, high). */
  readonly between: (low: number, high: number) => number;
  /** Standard normal: mean 0, variance 1. */
  readonly normal: () => number;
}

const UINT32_RANGE = 2 ** 32;

/**
 * A small fast generator, good enough for sound and for sampling tests, not for secrets.
 *
 * @param seed any integer; taken modulo 2³²
 * @example createRandom(1).uniform() === createRandom(1).uniform() // true
 * References: D. Blackman & S. Vigna (2021), Scrambled linear pseudorandom number generators (xoshiro128**),
 * seeded by splitmix32; normals by Box & Muller (1958).
 */
export function createRandom(seed: number): Random {
  const state = seedState(seed);
  const uniform = () => nextUint32(state) / UINT32_RANGE;
  return {
    uniform,
    between: (low, high) => low + (high - low) * uniform(),
    normal: () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform()),
  };
}

function seedState(seed: number): Uint32Array {
  const state = new Uint32Array(4);
  let mixed = seed >>> 0;
  for (let word = 0; word < state.length; word++) {
    mixed = (mixed + 0x9e3779b9) >>> 0;
    let scrambled = mixed;
    scrambled = Math.imul(scrambled ^ (scrambled >>> 16), 0x21f0aaad);
    scrambled = Math.imul(scrambled ^ (scrambled >>> 15), 0x735a2d97);
    state[word] = scrambled ^ (scrambled >>> 15);
  }
  return state;
}

function nextUint32(state: Uint32Array): number {
  const [s0 = 0, s1 = 0, s2 = 0, s3 = 0] = state;
  const result = Math.imul(rotateLeft(Math.imul(s1, 5), 7), 9) >>> 0;
  const mixed2 = s2 ^ s0;
  const mixed3 = s3 ^ s1;
  state[1] = s1 ^ mixed2;
  state[0] = s0 ^ mixed3;
  state[2] = mixed2 ^ (s1 << 9);
  state[3] = rotateLeft(mixed3, 11);
  return result;
}

function rotateLeft(value: number, bits: number): number {
  return (value << bits) | (value >>> (32 - bits));
}
