import type { RippleDefinition } from '../terms/measurement'

/** What the ripple ratios are computed from, N·m. */
export interface RippleInputs {
  /** Extremes about the mean. */
  highestNm: number
  lowestNm: number
  rmsNm: number
  meanNm: number
  ratedTorqueNm: number | null
}

/** A ratio in %, or why there is none. */
export type RippleRatio = { percent: number; perNm: number; of: 'peakToPeak' | 'halfPeakToPeak' | 'rms' } | { notStated: string }

export const RIPPLE_DEFINITIONS: readonly RippleDefinition[] = [
  'peakToPeakOverRated', 'halfPeakToPeakOverRated', 'rmsOverRated', 'peakToPeakOverMean', 'halfPeakToPeakOverMean', 'maxMinusMinOverMaxPlusMin',
  'largestDeviationOverMean', 'rmsOverMean',
]

/** A mean this many times the peak-to-peak torque, and this share of the rated torque, is a load. Common practice, no source. */
const LOADED_OVER_PEAK_TO_PEAK = 1
const LOADED_OVER_PEAK_TO_PEAK_UNRATED = 2
const LOADED_OVER_RATED = 0.1

/**
 * Whether a map was taken under load: its mean is above its peak-to-peak torque and above a tenth of the rated torque (twice the peak-to-peak torque where
 * none is rated), which neither a sensor's zero nor friction should reach.
 *
 * @param inputs - of the map
 */
export function isLoaded(inputs: RippleInputs): boolean {
  const mean = Math.abs(inputs.meanNm)
  const peakToPeak = inputs.highestNm - inputs.lowestNm
  if (inputs.ratedTorqueNm === null) return mean > LOADED_OVER_PEAK_TO_PEAK_UNRATED * peakToPeak && mean > 0
  return mean > LOADED_OVER_PEAK_TO_PEAK * peakToPeak && mean > LOADED_OVER_RATED * inputs.ratedTorqueNm
}

/**
 * Torque ripple ratio by one definition, %.
 *
 * @param definition - the sheet's definition
 * @param inputs - of the map, N·m
 * @returns the ratio with its denominator; or a sentence when the part states no rated torque, or the definition divides by the mean and the map carries no load
 */
export function rippleRatio(definition: RippleDefinition, inputs: RippleInputs): RippleRatio {
  const { highestNm, lowestNm, rmsNm, ratedTorqueNm } = inputs
  const mean = Math.abs(inputs.meanNm)
  const peakToPeak = highestNm - lowestNm
  const overRated = definition.endsWith('OverRated')
  if (overRated && !(ratedTorqueNm !== null && ratedTorqueNm > 0)) return { notStated: 'The part states no rated torque.' }
  if (!overRated && !isLoaded(inputs)) return { notStated: 'The map carries no load, so a ratio to its mean has no meaning.' }
  const divisor = overRated ? ratedTorqueNm! : mean
  const ratio = (value: number, by: number, of: 'peakToPeak' | 'halfPeakToPeak' | 'rms'): RippleRatio => ({ percent: (100 * value) / by, perNm: 100 / by, of })
  switch (definition) {
    case 'peakToPeakOverRated':
    case 'peakToPeakOverMean':
      return ratio(peakToPeak, divisor, 'peakToPeak')
    case 'halfPeakToPeakOverRated':
    case 'halfPeakToPeakOverMean':
      return ratio(peakToPeak / 2, divisor, 'halfPeakToPeak')
    case 'rmsOverRated':
    case 'rmsOverMean':
      return ratio(rmsNm, divisor, 'rms')
    case 'largestDeviationOverMean':
      return ratio(Math.max(highestNm, -lowestNm), divisor, 'halfPeakToPeak')
    case 'maxMinusMinOverMaxPlusMin': {
      const sum = Math.abs(2 * inputs.meanNm + highestNm + lowestNm)
      return ratio(peakToPeak, sum, 'halfPeakToPeak')
    }
  }
}
