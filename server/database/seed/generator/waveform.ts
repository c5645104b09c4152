import type { Harmonic } from './motor-model'

/** Points of a turn; a power of two for the transform. */
const POINTS = 16384

/**
 * One turn of Σ A·cos(kθ + φ) at 16 384 equal steps, by an inverse fast Fourier transform (Cooley and Tukey, Mathematics of Computation 19, 1965; from memory).
 *
 * @throws RangeError when an order is not a whole number from 0 to below half the points
 */
export function tabulate(harmonics: readonly Harmonic[]): Float64Array {
  const re = new Float64Array(POINTS)
  const im = new Float64Array(POINTS)
  for (const { order, amplitudeNm, phaseRad } of harmonics) {
    if (!Number.isInteger(order) || order < 0 || order >= POINTS / 2) throw new RangeError(`tabulate: order must be a whole number from 0 to ${POINTS / 2 - 1}, not ${order}`)
    re[reversed(order)]! += amplitudeNm * Math.cos(phaseRad)
    im[reversed(order)]! += amplitudeNm * Math.sin(phaseRad)
  }
  for (let half = 1; half < POINTS; half *= 2) mergeHalves(re, im, half)
  return re
}

let turn: { cosine: Float64Array; sine: Float64Array } | null = null

function turnTable(): { cosine: Float64Array; sine: Float64Array } {
  return turn ??= {
    cosine: Float64Array.from({ length: POINTS / 2 }, (_, index) => Math.cos(2 * Math.PI * index / POINTS)),
    sine: Float64Array.from({ length: POINTS / 2 }, (_, index) => Math.sin(2 * Math.PI * index / POINTS)),
  }
}

function mergeHalves(re: Float64Array, im: Float64Array, half: number): void {
  const { cosine, sine } = turnTable()
  const step = POINTS / (2 * half)
  for (let block = 0; block < POINTS; block += 2 * half) {
    for (let index = 0; index < half; index++) {
      const [low, high] = [block + index, block + index + half]
      const [c, s] = [cosine[index * step]!, sine[index * step]!]
      const x = re[high]! * c - im[high]! * s
      const y = re[high]! * s + im[high]! * c
      re[high] = re[low]! - x
      im[high] = im[low]! - y
      re[low]! += x
      im[low]! += y
    }
  }
}

/** Place of a coefficient after the bits of its number are reversed. */
function reversed(order: number): number {
  let place = 0
  for (let bit = 1; bit < POINTS; bit *= 2) place = 2 * place + (order & bit ? 1 : 0)
  return place
}

/**
 * Value between the points, by the cubic through the nearest four. The error is at most 9/384·(kh)⁴ of the amplitude of order k, h the step: 4e-5 at order 528,
 * 3e-6 at order 264, far under any noise used.
 */
export function interpolate(table: Float64Array, angleRad: number): number {
  const turns = angleRad / (2 * Math.PI)
  const place = (turns - Math.floor(turns)) * POINTS
  const at = Math.floor(place)
  const t = place - at
  const before = table[(at + POINTS - 1) % POINTS]!
  const here = table[at % POINTS]!
  const next = table[(at + 1) % POINTS]!
  const after = table[(at + 2) % POINTS]!
  return here * (1 + t) * (1 - t) * (2 - t) / 2 + next * t * (1 + t) * (2 - t) / 2 - before * t * (1 - t) * (2 - t) / 6 - after * t * (1 + t) * (1 - t) / 6
}
