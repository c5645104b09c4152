import { synthesise, transformReal, type Spectrum } from './fourier'
import { fourierSums, type Moments } from './moments'

/** Least-squares Fourier series of the readings of one direction. */
export interface SeriesFit {
  spectrum: Spectrum
  /** Readings fitted. */
  count: number
  /** By how much uneven coverage raises the mean variance of a coefficient against even coverage; 1 or more. */
  inflation: number
}

const RELATIVE_RESIDUAL = 1e-13
const MOST_STEPS = 400
const EVEN_ENOUGH = 0.02

/** ⟨a, b⟩ of two real functions by their coefficients of orders 0…K. */
function inner(a: Spectrum, b: Spectrum): number {
  let sum = 0
  for (let order = 1; order < a.re.length; order++) sum += a.re[order]! * b.re[order]! + a.im[order]! * b.im[order]!
  return a.re[0]! * b.re[0]! + 2 * sum
}

function combine(target: Spectrum, factor: number, other: Spectrum, scale = 1): void {
  for (let order = 0; order < target.re.length; order++) {
    target.re[order] = scale * target.re[order]! + factor * other.re[order]!
    target.im[order] = scale * target.im[order]! + factor * other.im[order]!
  }
}

const zero = (length: number): Spectrum => ({ re: new Float64Array(length), im: new Float64Array(length) })
const copy = (of: Spectrum): Spectrum => ({ re: of.re.slice(), im: of.im.slice() })

/**
 * The normal equations of a Fourier fit: T c = r with T_{jk} = Σ e^{−i(j−k)θ} over the readings, a Hermitian Toeplitz matrix.
 * Multiplying by it is a pointwise product on a grid of 4K + 1 points or more.
 */
function toeplitz(counts: Spectrum, highest: number): (vector: Spectrum) => Spectrum {
  let points = 4
  while (points < 4 * highest + 2) points *= 2
  const weights = synthesise(counts, points, 1 / points)
  return (vector) => {
    const values = synthesise(vector, points)
    for (let index = 0; index < points; index++) values[index]! *= weights[index]!
    const out = transformReal(values)
    const product = zero(highest + 1)
    for (let order = 0; order <= highest; order++) {
      product.re[order] = out[2 * order]!
      product.im[order] = out[2 * order + 1]!
    }
    return product
  }
}

/** Conjugate gradients (Hestenes and Stiefel, 1952; from memory). On even full coverage T is a multiple of one and the first guess is the solution. */
function solve(multiply: (vector: Spectrum) => Spectrum, right: Spectrum, count: number): Spectrum {
  const solution = copy(right)
  combine(solution, 0, right, 1 / count)
  const residual = copy(right)
  combine(residual, -1, multiply(solution))
  const direction = copy(residual)
  let size = inner(residual, residual)
  const goal = RELATIVE_RESIDUAL ** 2 * inner(right, right)
  for (let step = 0; step < MOST_STEPS && size > goal; step++) {
    const image = multiply(direction)
    const along = inner(direction, image)
    if (!(along > 0)) break
    combine(solution, size / along, direction)
    combine(residual, -size / along, image)
    const next = inner(residual, residual)
    combine(direction, 1, residual, next / size)
    size = next
  }
  return solution
}

/** Mean of the diagonal of T⁻¹ times the count, from one probe of fixed signs (Hutchinson's estimate; from memory). */
function inflationOf(multiply: (vector: Spectrum) => Spectrum, counts: Spectrum, highest: number): number {
  const count = counts.re[0]!
  let unevenness = 0
  for (let order = 1; order < counts.re.length; order++) unevenness = Math.max(unevenness, Math.hypot(counts.re[order]!, counts.im[order]!) / count)
  if (unevenness < EVEN_ENOUGH) return 1
  const probe = zero(highest + 1)
  let state = 12345
  const sign = () => ((state = (Math.imul(state, 1664525) + 1013904223) >>> 0) >>> 31 ? Math.SQRT1_2 : -Math.SQRT1_2)
  for (let order = 0; order <= highest; order++) {
    probe.re[order] = order === 0 ? 1 : sign()
    probe.im[order] = order === 0 ? 0 : sign()
  }
  return Math.max(1, (inner(probe, solve(multiply, probe, count)) * count) / inner(probe, probe))
}

/**
 * Fits a Fourier series of orders 0…K to readings at any angles, by least squares.
 *
 * On a full uniform grid this is the FFT; with gaps, jitter, repeated end points or several turns it is the least-squares solution on the same basis.
 *
 * @param moments - readings gathered for this K
 * @param highest - highest order K
 * @returns the coefficients, the number of readings, and the inflation of variance by uneven coverage
 * @throws RangeError when there are fewer readings than coefficients
 */
export function fitSeries(moments: Moments, highest: number): SeriesFit {
  if (moments.count < 2 * highest + 1) {
    throw new RangeError(`fitSeries: ${moments.count} readings do not determine ${2 * highest + 1} coefficients`)
  }
  const counts = fourierSums(moments, 'counts', 2 * highest)
  const multiply = toeplitz(counts, highest)
  const spectrum = solve(multiply, fourierSums(moments, 'values', highest), moments.count)
  return { spectrum, count: moments.count, inflation: inflationOf(multiply, counts, highest) }
}
