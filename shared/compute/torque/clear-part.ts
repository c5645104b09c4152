import type { FourierSeries } from '../terms/measurement'
import { amplitudeOf } from './estimate'
import { significantAmplitude } from './significance'

/** The orders of a series that stand above its noise. */
export interface ClearPart {
  /** The series with all other orders zero. */
  series: FourierSeries
  /** Standard uncertainty of its value at one angle, N·m. */
  deviationNm: number
}

/**
 * Keeps the orders of a fitted series that are significant.
 *
 * The highest of a thousand noisy points is too high, so a peak-to-peak figure over all K orders grows with the noise; over the significant ones it does not. What is left
 * out may hold true torque: its power beyond that of noise goes into the uncertainty. s² = n·σ² + max(0, Σ_left (A² − 2σ²)/2), n the number of orders kept; with none kept, the
 * amplitude above which an order would have been.
 *
 * @param series - fitted orders 1…K, N·m
 * @param coefficientDeviationNm - standard deviation σ of one coefficient by noise, N·m
 */
export function clearPart(series: FourierSeries, coefficientDeviationNm: number): ClearPart {
  const orders = series.cosNm.length
  const threshold = significantAmplitude(coefficientDeviationNm, orders)
  const noisePower = 2 * coefficientDeviationNm ** 2
  const clear: FourierSeries = { meanNm: series.meanNm, cosNm: new Array<number>(orders).fill(0), sinNm: new Array<number>(orders).fill(0) }
  let kept = 0
  let left = 0
  for (let order = 1; order <= orders; order++) {
    const amplitude = amplitudeOf(series, order)
    if (amplitude > threshold) {
      clear.cosNm[order - 1] = series.cosNm[order - 1]!
      clear.sinNm[order - 1] = series.sinNm[order - 1]!
      kept++
    }
    else {
      left += (amplitude ** 2 - noisePower) / 2
    }
  }
  const deviationNm = kept === 0 ? threshold : Math.sqrt((kept * noisePower) / 2 + Math.max(0, left))
  return { series: clear, deviationNm }
}
