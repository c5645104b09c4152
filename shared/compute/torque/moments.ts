import { transformReal, type Spectrum } from './fourier'

const TURN_RAD = 2 * Math.PI
const TOLERANCE = 1e-9

/**
 * Readings of one direction gathered on a grid of bins: for each bin, over its readings, the sums of δ^j and of y·δ^j, where δ is the distance of the
 * reading's angle from the middle of the bin, in bins.
 *
 * With these the sums Σ e^{−ikθ} and Σ y·e^{−ikθ} over all readings are the Taylor series of e^{−ikδh} about the bins' middles, each term an FFT. So
 * memory is bounded by the grid, yet every reading counts at its own angle: nothing is attenuated or shifted by binning, and the sinc(k/M) correction that a
 * plain bin average needs is contained. The series is cut where its next term is below 1e-9.
 */
export interface Moments {
  bins: number
  /** Powers of δ kept for counts and for values. */
  weightTerms: number
  valueTerms: number
  /** Bin after bin: weightTerms sums of δ^j, then valueTerms sums of y·δ^j. */
  sums: Float64Array
  count: number
}

/** Grid for moments: a power of two above 4K, so that sums of counts up to 2K are on it; a finer one costs more in transforms than it saves in terms. */
function gridFor(highestOrder: number): number {
  let bins = 64
  while (bins < 4 * highestOrder + 2) bins *= 2
  return bins
}

/** Terms of the Taylor series of e^{ix} up to the tolerance. */
function termsFor(x: number): number {
  let terms = 1
  for (let term = x; term > TOLERANCE; term *= x / terms) terms++
  return terms
}

/**
 * Empty moments.
 *
 * @param highestOrder - highest order K to be fitted; sums of counts are needed up to 2K
 */
export function emptyMoments(highestOrder: number): Moments {
  const bins = gridFor(highestOrder)
  const weightTerms = termsFor((2 * highestOrder * Math.PI) / bins)
  const valueTerms = termsFor((highestOrder * Math.PI) / bins)
  return { bins, weightTerms, valueTerms, sums: new Float64Array(bins * (weightTerms + valueTerms)), count: 0 }
}

/**
 * Adds the readings that carry a label to moments.
 *
 * @param moments - changed in place
 * @param angleRad - angle of each reading, wrapped or not
 * @param values - value of each reading
 * @param labels - label of each reading
 * @param label - the label to add
 */
export function addReadings(moments: Moments, angleRad: Float64Array, values: Float64Array, labels: Int8Array, label: number): void {
  const { bins, weightTerms, valueTerms, sums } = moments
  const perRadian = bins / TURN_RAD
  const stride = weightTerms + valueTerms
  let count = 0
  for (let row = 0; row < angleRad.length; row++) {
    if (labels[row] !== label) continue
    const place = angleRad[row]! * perRadian
    const middle = Math.floor(place + 0.5)
    const distance = place - middle
    const value = values[row]!
    let at = (middle & (bins - 1)) * stride
    let power = 1
    for (let term = 0; term < weightTerms; term++) {
      sums[at]! += power
      if (term < valueTerms) sums[at + weightTerms]! += power * value
      at++
      power *= distance
    }
    count++
  }
  moments.count += count
}

/**
 * Fourier sums of the counts or of the values: Σ e^{−ikθ} or Σ y·e^{−ikθ} over the readings.
 *
 * @param moments - gathered readings
 * @param of - which of the two
 * @param highest - orders 0…highest, up to 2K for counts and K for values
 * @returns the sums by order
 */
export function fourierSums(moments: Moments, of: 'counts' | 'values', highest: number): Spectrum {
  const { bins, weightTerms, valueTerms, sums } = moments
  const stride = weightTerms + valueTerms
  const first = of === 'counts' ? 0 : weightTerms
  const terms = of === 'counts' ? weightTerms : valueTerms
  const re = new Float64Array(highest + 1)
  const im = new Float64Array(highest + 1)
  const data = new Float64Array(bins)
  const factors = new Float64Array(highest + 1).fill(1)
  for (let term = 0; term < terms; term++) {
    for (let bin = 0, at = first + term; bin < bins; bin++, at += stride) data[bin] = sums[at]!
    const out = transformReal(data)
    // (−i)^term turns the pair by a quarter turn each time.
    const swap = term % 2 === 1
    const signRe = term % 4 === 0 || term % 4 === 1 ? 1 : -1
    const signIm = term % 4 === 0 || term % 4 === 3 ? 1 : -1
    for (let order = 0; order <= highest; order++) {
      const a = out[2 * order]!
      const b = out[2 * order + 1]!
      re[order]! += signRe * factors[order]! * (swap ? b : a)
      im[order]! += signIm * factors[order]! * (swap ? a : b)
      factors[order]! *= (order * TURN_RAD) / bins / (term + 1)
    }
  }
  return { re, im }
}
