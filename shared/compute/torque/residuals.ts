import { synthesise } from './fourier'
import type { SeriesFit } from './least-squares'
import type { Readings } from './readings'

const TURN_RAD = 2 * Math.PI
/** Median of |x| for a normal x of standard deviation 1. */
const NORMAL_MEDIAN = 0.6744897501960817
const ROBUST_SAMPLE = 1024
/** A reading this many robust standard deviations off the fit is a spike. Common practice, no source. */
const SPIKE_DEVIATIONS = 8
const SMALLEST_SPIKE_SHARE = 0.02

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

/** Values of a fit on the grid. */
export function gridOf(fit: SeriesFit, direction: 1 | -1, bins: number): FittedGrid {
  return { direction, values: synthesise(fit.spectrum, bins) }
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
 * Robust test: the residual is more than 8 robust standard deviations, and more than 2 % of the peak-to-peak torque, and more than two steps of the sensor.
 *
 * @param residuals - what the fit leaves
 * @param labels - direction of each reading
 * @param peakToPeakNm - of the fitted torque
 * @param stepNm - step of the sensor
 * @returns the rows
 */
export function findSpikes(residuals: Residuals, labels: Int8Array, peakToPeakNm: number, stepNm: number): number[] {
  const limit = Math.max(SPIKE_DEVIATIONS * residuals.robustNm, SMALLEST_SPIKE_SHARE * peakToPeakNm, 2 * stepNm)
  const rows: number[] = []
  for (let row = 0; row < labels.length; row++) {
    if (labels[row] !== 0 && Math.abs(residuals.values[row]!) > limit) rows.push(row)
  }
  return rows
}

/** Peak-to-peak of the middle of the fits, by the 2nd and 98th hundredth so that a spike does not raise it. */
export function typicalPeakToPeak(grids: FittedGrid[]): number {
  return Math.max(...grids.map(({ values }) => {
    const step = Math.max(1, Math.floor(values.length / ROBUST_SAMPLE))
    const sorted = values.filter((_, index) => index % step === 0).sort()
    return sorted[Math.floor(sorted.length * 0.98)]! - sorted[Math.floor(sorted.length * 0.02)]!
  }))
}
