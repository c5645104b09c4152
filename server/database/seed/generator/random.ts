/** A seeded source of numbers: the same seed gives the same motors and files on every machine. */
export interface SeededRandom {
  /** Uniform in [0, 1). */
  uniform: () => number
  /** Normal, mean 0, standard deviation 1. */
  gaussian: () => number
  /** Whole number from 0 to n − 1. */
  integer: (n: number) => number
  bytes: (length: number) => Uint8Array
}

/**
 * sfc32 (Small Fast Counter, 32 bits), seeded by hashing the text (a number by its decimal digits) with FNV-1a; normal numbers by Box and Muller's polar method.
 *
 * Source: C. Doty-Humphrey, PractRand (sfc32, public domain); G. Marsaglia and T. A. Bray, SIAM Review 6(3), 1964 (polar method); from memory.
 */
export function makeRandom(seed: number | string): SeededRandom {
  let [a, b, c, d] = [fnv(`${seed}/a`), fnv(`${seed}/b`), fnv(`${seed}/c`), 1]
  let spare: number | null = null
  const word = (): number => {
    const sum = (a + b + d) | 0
    d = (d + 1) | 0
    a = b ^ (b >>> 9)
    b = (c + (c << 3)) | 0
    c = ((c << 21) | (c >>> 11)) + sum | 0
    return sum >>> 0
  }
  for (let i = 0; i < 15; i++) word()
  const uniform = (): number => word() / 4294967296
  const gaussian = (): number => {
    if (spare !== null) {
      const kept = spare
      spare = null
      return kept
    }
    for (;;) {
      const x = 2 * uniform() - 1
      const y = 2 * uniform() - 1
      const s = x * x + y * y
      if (s >= 1 || s === 0) continue
      const factor = Math.sqrt(-2 * Math.log(s) / s)
      spare = y * factor
      return x * factor
    }
  }
  return { uniform, gaussian, integer: n => Math.floor(uniform() * n), bytes: length => Uint8Array.from({ length }, () => word() & 255) }
}

function fnv(text: string): number {
  let hash = 0x811c9dc5
  for (let i = 0; i < text.length; i++) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193)
  return hash | 0
}
