import { synthesisePair } from './fourier'
import type { SeriesFit } from './least-squares'
import type { Readings } from './readings'

const TURN_RAD = 2 * Math.PI
/** Median of |x| for a normal x of standard deviation 1. */
const NORMAL_MEDIAN = 0.6744897501960817
const ROBUST_SAMPLE = 1024
/** A reading this many robust standard deviations off the fit is a spike. Common practice, no source. */
const SPIKE_DEVIATIONS = 8
const SMALLEST_SPIKE_SHARE = 0.02
/** The largest go first: a gross spike bends the fit, so that sound readings stand off it too. */
const GROSS_SHARE = 0.5

/** What the fit leaves of each reading, N·m. */
export interface Residuals {
  values: Float64Array
  /** Robust standard deviation: median of the magnitude ÷ 0.6745. */
  robustNm: number
  /** Sum of squares over the readings with a label. */
  squares: number
  count: number
}

/** The fitted torque of one direction on a full grid. */
export interface FittedGrid {
  direction: 1 | -1
  values: Float64Array
}

/** Values of the fits of one or two directions on the grid. */
export function gridsOf(fits: { direction: 1 | -1; fit: SeriesFit }[], bins: number): FittedGrid[] {
  const [first, second] = fits
  const [one, other] = synthesisePair(first!.fit.spectrum, second?.fit.spectrum ?? null, bins)
  return second ? [{ direction: first!.direction, values: one }, { direction: second.direction, values: other }] : [{ direction: first!.direction, values: one }]
}

/** Four-point Lagrange interpolation on a periodic grid; on 16 points a period good to 5e-4 of that order, on 50 to 6e-6. */
function interpolate(grid: Float64Array, place: number): number {
  const mask = grid.length - 1
  const middle = Math.floor(place)
  const t = place - middle
  const a = grid[(middle - 1) & mask]!
  const b = grid[middle & mask]!
  const c = grid[(middle + 1) & mask]!
  const d = grid[(middle + 2) & mask]!
  return ((1 - t) * (2 - t) * (3 * (1 + t) * b - t * a)) / 6 + (t * (1 + t) * (3 * (2 - t) * c - (1 - t) * d)) / 6
}

/** Median of the magnitudes of a regular subsample, as a normal standard deviation. */
function robustDeviation(values: Float64Array, labels: Int8Array): number {
  const step = Math.max(1, Math.floor(values.length / ROBUST_SAMPLE))
  const sample: number[] = []
  for (let row = 0; row < values.length; row += step) if (labels[row] !== 0) sample.push(Math.abs(values[row]!))
  const sorted = Float64Array.from(sample).sort()
  return sorted.length > 0 ? sorted[sorted.length >> 1]! / NORMAL_MEDIAN : 0
}

/**
 * Readings less the fit of their direction.
 *
 * @param readings - angles
 * @param torqueNm - torque of each reading, as fitted
 * @param labels - direction of each; 0 is left out
 * @param grids - the fits on the grid
 */
export function residualsOf(readings: Readings, torqueNm: Float64Array, labels: Int8Array, grids: FittedGrid[]): Residuals {
  const values = new Float64Array(readings.rows)
  const forward = grids.find((grid) => grid.direction === 1)?.values ?? grids[0]!.values
  const reverse = grids.find((grid) => grid.direction === -1)?.values ?? grids[0]!.values
  const perRadian = forward.length / TURN_RAD
  let squares = 0
  let count = 0
  for (let row = 0; row < readings.rows; row++) {
    const label = labels[row]!
    if (label === 0) continue
    const residual = torqueNm[row]! - interpolate(label > 0 ? forward : reverse, readings.angleRad[row]! * perRadian)
    values[row] = residual
    squares += residual * residual
    count++
  }
  return { values, robustNm: robustDeviation(values, labels), squares, count }
}

/**
 * Rows whose reading stands far off the fit.
 *
 * Robust test, to be repeated after a new fit until it finds none: the residual is more than half of the largest, more than 8 robust standard deviations, and more than 2 % of the peak-to-peak torque, and more than two steps of the sensor.
 *
 * @param residuals - what the fit leaves
 * @param labels - direction of each reading
 * @param grids - the fitted torque
 * @param stepNm - step of the sensor
 * @returns the rows
 */
export function findSpikes(residuals: Residuals, labels: Int8Array, grids: FittedGrid[], stepNm: number): number[] {
  const least = Math.max(SPIKE_DEVIATIONS * residuals.robustNm, 2 * stepNm)
  const rows: number[] = []
  for (let row = 0; row < labels.length; row++) {
    if (labels[row] !== 0 && Math.abs(residuals.values[row]!) > least) rows.push(row)
  }
  if (rows.length === 0) return rows
  const largest = rows.reduce((most, row) => Math.max(most, Math.abs(residuals.values[row]!)), 0)
  const limit = Math.max(SMALLEST_SPIKE_SHARE * typicalPeakToPeak(grids), GROSS_SHARE * largest)
  return rows.filter((row) => Math.abs(residuals.values[row]!) > limit)
}

/** Peak-to-peak of the middle of the fits, by the 2nd and 98th hundredth so that a spike does not raise it. */
function typicalPeakToPeak(grids: FittedGrid[]): number {
  return Math.max(...grids.map(({ values }) => {
    const step = Math.max(1, Math.floor(values.length / ROBUST_SAMPLE))
    const sorted = values.filter((_, index) => index % step === 0).sort()
    return sorted[Math.floor(sorted.length * 0.98)]! - sorted[Math.floor(sorted.length * 0.02)]!
  }))
}
