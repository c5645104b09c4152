/** Name of the generator, stored with every draw and printed on papers. */
export const DRAW_GENERATOR = 'xoshiro128** 1.1, seeded by murmur3 mixing of the hexadecimal seed, partial Fisher-Yates draw (version 1)'

/** State of xoshiro128**: four 32-bit words, not all zero. */
export type GeneratorState = [number, number, number, number]

const rotateLeft = (x: number, bits: number): number => (x << bits) | (x >>> (32 - bits))

/**
 * Next 32-bit number of xoshiro128** (version 1.1); the state is changed in place.
 *
 * result = rotl(s₁·5, 7)·9, all modulo 2³².
 *
 * @param state four 32-bit words, not all zero
 * @returns whole number, 0…2³²−1
 * Source: D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", 2018 (public domain).
 */
export function nextWord(state: GeneratorState): number {
  const result = Math.imul(rotateLeft(Math.imul(state[1], 5), 7), 9) >>> 0
  const shifted = state[1] << 9
  state[2] ^= state[0]
  state[3] ^= state[1]
  state[1] ^= state[2]
  state[0] ^= state[3]
  state[2] ^= shifted
  state[3] = rotateLeft(state[3], 11)
  return result
}

/** The 32-bit finaliser of MurmurHash3 (public domain): one to one, so that no seed bit is lost. */
function mix(word: number): number {
  let x = word
  x = Math.imul(x ^ (x >>> 16), 0x85ebca6b)
  x = Math.imul(x ^ (x >>> 13), 0xc2b2ae35)
  return (x ^ (x >>> 16)) | 0
}

/**
 * State of the generator from a seed.
 *
 * The seed is cut into words of 8 hexadecimal digits (the last padded with zeros on the right). Beginning with
 * s = (0, 0, 0, 0), word number i = 0, 1, … replaces s[i mod 4] by mix((s[i mod 4] XOR word) + (i+1)·9E3779B9₁₆).
 *
 * @param seed 16 to 64 hexadecimal digits; case does not matter
 * @returns four 32-bit words, not all zero
 * @throws RangeError when the seed is not 16 to 64 hexadecimal digits
 */
export function seededState(seed: string): GeneratorState {
  if (!/^[0-9a-f]{16,64}$/i.test(seed)) {
    throw new RangeError(`drawSample: seed must be 16 to 64 hexadecimal digits, got ${JSON.stringify(seed)}`)
  }
  const state: GeneratorState = [0, 0, 0, 0]
  const words = seed.match(/.{1,8}/g)!.map(part => Number.parseInt(part.padEnd(8, '0'), 16))
  words.forEach((word, i) => {
    const at = (i % 4) as 0 | 1 | 2 | 3
    state[at] = mix(((state[at] ^ word) + Math.imul(i + 1, 0x9e3779b9)) | 0)
  })
  if (state.every(word => word === 0)) state[0] = 1
  return state
}

/** Whole number 0…bound−1 without bias: words at or above the largest multiple of the bound are thrown away. */
function below(state: GeneratorState, bound: number): number {
  const usable = 2 ** 32 - (2 ** 32 % bound)
  let word = nextWord(state)
  while (word >= usable) word = nextWord(state)
  return word % bound
}

/**
 * Draws a random sample without replacement, so that anyone with the seed can repeat it.
 *
 * List the positions 1…N. For i = 0 … n−1: take r = i + (a random whole number below N − i), exchange the entries
 * i and r (counted from 0), and entry i is the next one drawn. A random number below b is the next word modulo b;
 * words at or above the largest multiple of b below 2³² are skipped.
 *
 * @param request lotSize N, whole, 1…2³²−1; n, whole, 0…N; seed, 16 to 64 hexadecimal digits
 * @returns n different positions 1…N in the order drawn
 * @throws RangeError outside these domains
 * Source: R. Durstenfeld, Algorithm 235, Comm. ACM 7(7), 1964 (from memory).
 */
export function drawSample({ lotSize, n, seed }: { lotSize: number; n: number; seed: string }): number[] {
  if (!Number.isInteger(lotSize) || lotSize < 1 || lotSize >= 2 ** 32) {
    throw new RangeError(`drawSample: lotSize must be a whole number from 1 to 4294967295, got ${lotSize}`)
  }
  if (!Number.isInteger(n) || n < 0 || n > lotSize) {
    throw new RangeError(`drawSample: n must be a whole number from 0 to lotSize = ${lotSize}, got ${n}`)
  }
  const state = seededState(seed)
  // Only entries that were exchanged are kept, so that a small sample of a huge lot costs little.
  const moved = new Map<number, number>()
  const entry = (index: number): number => moved.get(index) ?? index + 1
  const drawn: number[] = []
  for (let i = 0; i < n; i++) {
    const r = i + below(state, lotSize - i)
    drawn.push(entry(r))
    moved.set(r, entry(i))
  }
  return drawn
}
