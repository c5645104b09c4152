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
  const { fft, first, second } = planOf(points)
  first.fill(0)
  const { re, im } = spectrum
  first[0] = re[0]!
  for (let order = 1; order < re.length; order++) {
    first[2 * order] = first[2 * (points - order)] = re[order]!
    first[2 * order + 1] = im[order]!
    first[2 * (points - order) + 1] = -im[order]!
  }
  fft.inverseTransform(second, first)
  const values = new Float64Array(points)
  const factor = points * scale
  for (let index = 0; index < points; index++) values[index] = second[2 * index]! * factor
  return values
}
