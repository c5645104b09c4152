import type { FourierSeries } from '../terms/measurement'
import { amplitudeOf } from './estimate'

/** Chance that a map of noise alone shows any significant order. */
const FALSE_ALARM = 0.01
/** Share of the orders taken to be noise at the least. */
const NOISE_SHARE = 0.3

/**
 * Standard deviation of a Fourier coefficient as the small orders show it.
 *
 * For noise, A²/σ² of an order is distributed as χ² with two degrees of freedom, so that its quantile q is −2 ln(1 − q). The lower 30 % of the orders are taken to be
 * noise: σ² = A²₍₀.₃₎ / (−2 ln 0.7).
 *
 * @param series - fitted orders 1…K
 * @returns σ, N·m
 */
export function coefficientFloor(series: FourierSeries): number {
  const amplitudes = Float64Array.from(series.cosNm, (_, index) => amplitudeOf(series, index + 1)).sort()
  if (amplitudes.length === 0) return 0
  return amplitudes[Math.floor(NOISE_SHARE * amplitudes.length)]! / Math.sqrt(-2 * Math.log(1 - NOISE_SHARE))
}

/**
 * Amplitude above which an order is significant.
 *
 * Test: against noise of standard deviation σ in each of its two coefficients the amplitude of one order exceeds a with probability exp(−a²/2σ²). With
 * Bonferroni's correction for K orders and a chance of 1 % that a map of noise shows any significant order, a = σ √(2 ln(K / 0.01)).
 * (The periodogram's exponential distribution; Fisher 1929 uses the same; from memory.)
 *
 * @param coefficientDeviationNm - σ of one coefficient, N·m
 * @param orders - number of orders tested, K
 * @returns N·m
 */
export function significantAmplitude(coefficientDeviationNm: number, orders: number): number {
  return coefficientDeviationNm * Math.sqrt(2 * Math.log(Math.max(orders, 1) / FALSE_ALARM))
}
