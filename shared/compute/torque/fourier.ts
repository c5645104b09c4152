import FFT from 'fft.js'

/** Fourier coefficients c_k of orders 0…K of a real function: f(θ) = Re c_0 + 2 Re Σ c_k e^{ikθ}. */
export interface Spectrum {
  re: Float64Array
  im: Float64Array
}

interface Plan {
  fft: FFT
  first: Float64Array
  second: Float64Array
}

const plans = new Map<number, Plan>()

function planOf(size: number): Plan {
  let plan = plans.get(size)
  if (!plan) {
    plan = { fft: new FFT(size), first: new Float64Array(2 * size), second: new Float64Array(2 * size) }
    plans.set(size, plan)
  }
  return plan
}

/**
 * Discrete Fourier sums Σ_m v_m e^{−2πikm/M} of real values.
 *
 * @param values - real values, their number M a power of two
 * @returns real and imaginary parts in turn, orders 0…M/2; a buffer that the next transform of this size overwrites
 */
export function transformReal(values: Float64Array): Float64Array {
  const plan = planOf(values.length)
  plan.fft.realTransform(plan.first, values)
  return plan.first
}

/**
 * Values on a full grid of the real function that has the given coefficients.
 *
 * @param spectrum - c_0…c_K
 * @param points - number of grid points, a power of two above 2K
 * @param scale - factor on every value
 * @returns the values at angles 2πm/points
 */
export function synthesise(spectrum: Spectrum, points: number, scale = 1): Float64Array {
  return synthesisePair(spectrum, null, points, scale)[0]
}

/**
 * Values on a full grid of two real functions at once: one is the real part, the other the imaginary part of one complex transform.
 *
 * @param first - c_0…c_K of the one
 * @param second - c_0…c_K of the other; null: zero
 * @param points - number of grid points, a power of two above 2K
 * @param scale - factor on every value
 * @returns the values of both at angles 2πm/points
 */
export function synthesisePair(first: Spectrum, second: Spectrum | null, points: number, scale = 1): [Float64Array, Float64Array] {
  const { fft, first: input, second: output } = planOf(points)
  input.fill(0)
  for (let order = 0; order < first.re.length; order++) {
    const a = first.re[order]!
    const b = first.im[order]!
    const c = second ? second.re[order]! : 0
    const d = second ? second.im[order]! : 0
    input[2 * order] = a - d
    input[2 * order + 1] = b + c
    if (order === 0) continue
    input[2 * (points - order)] = a + d
    input[2 * (points - order) + 1] = c - b
  }
  fft.inverseTransform(output, input)
  const one = new Float64Array(points)
  const other = new Float64Array(second ? points : 0)
  const factor = points * scale
  for (let index = 0; index < points; index++) {
    one[index] = output[2 * index]! * factor
    if (second) other[index] = output[2 * index + 1]! * factor
  }
  return [one, other]
}
