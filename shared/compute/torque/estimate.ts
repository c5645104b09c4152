import type { FourierSeries, Warning } from '../terms/measurement'
import { synthesisePair, type Spectrum } from './fourier'

/** A map as estimated from the readings, whichever way it was measured; all that the characteristics are computed from. */
export interface MapEstimate {
  rows: number
  turns: number
  directions: 'both' | 'forward' | 'reverse'
  highestOrder: number
  /** Mean of the even part, N·m. */
  zeroNm: number
  /** Even part less its mean. */
  cogging: FourierSeries
  /** Odd part; null with one direction only. */
  friction: FourierSeries | null
  /** Grid points a turn at which series are evaluated; 16 a period of the highest order or more. */
  bins: number
  /** Peak-to-peak of the binned points themselves, N·m. */
  rawPeakToPeakNm: number | null
  /** Standard uncertainty of one Fourier coefficient of the even part by noise, resolution and repeatability, N·m. */
  coefficientDeviationNm: number
  /** The same of the odd part. */
  frictionCoefficientDeviationNm: number
  /** The same of the mean of the odd part, N·m. */
  frictionMeanDeviationNm: number
  /** Turn-to-turn standard deviation, N·m; null with fewer than two turns of one direction. */
  repeatabilityNm: number | null
  repeatabilityFreedom: number
  warnings: Warning[]
}

/** Coefficients c_k as a series of cosines and sines: f = Re c_0 + Σ 2 Re c_k cos kθ − 2 Im c_k sin kθ. */
export function seriesOf(spectrum: Spectrum, keepMean: boolean): FourierSeries {
  const orders = spectrum.re.length - 1
  return {
    meanNm: keepMean ? spectrum.re[0]! : 0,
    cosNm: Array.from({ length: orders }, (_, index) => 2 * spectrum.re[index + 1]!),
    sinNm: Array.from({ length: orders }, (_, index) => -2 * spectrum.im[index + 1]!),
  }
}

function spectrumOf(series: FourierSeries): Spectrum {
  const length = series.cosNm.length + 1
  const spectrum: Spectrum = { re: new Float64Array(length), im: new Float64Array(length) }
  spectrum.re[0] = series.meanNm
  for (let order = 1; order < length; order++) {
    spectrum.re[order] = series.cosNm[order - 1]! / 2
    spectrum.im[order] = -series.sinNm[order - 1]! / 2
  }
  return spectrum
}

/** Values of one or two series on a grid of a power of two points. */
export function gridValues(series: FourierSeries, points: number, second: FourierSeries | null = null): [Float64Array, Float64Array] {
  return synthesisePair(spectrumOf(series), second && spectrumOf(second), points)
}

/** Half the sum (sign +1) or half the difference (sign −1) of two spectra. */
export function halfSum(a: Spectrum, b: Spectrum, sign: 1 | -1): Spectrum {
  return { re: a.re.map((value, order) => (value + sign * b.re[order]!) / 2), im: a.im.map((value, order) => (value + sign * b.im[order]!) / 2) }
}

/** Peak amplitude of an order, N·m. */
export function amplitudeOf(series: FourierSeries, order: number): number {
  return Math.hypot(series.cosNm[order - 1] ?? 0, series.sinNm[order - 1] ?? 0)
}

/** Phase φ of an order in A·cos(kθ + φ), degrees, −180 < φ ≤ 180. */
export function phaseOf(series: FourierSeries, order: number): number {
  const degrees = (Math.atan2(-series.sinNm[order - 1]!, series.cosNm[order - 1]!) * 180) / Math.PI
  return degrees <= -180 ? 180 : degrees
}

/** Root mean square of the orders 1…K, N·m. */
export function rmsOf(series: FourierSeries): number {
  let squares = 0
  for (let order = 1; order <= series.cosNm.length; order++) squares += amplitudeOf(series, order) ** 2
  return Math.sqrt(squares / 2)
}
