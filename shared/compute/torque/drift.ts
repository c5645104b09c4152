import { emptyMoments, addReadings } from './moments'
import { fitSeries } from './least-squares'
import { gridsOf, residualsOf, type Residuals } from './residuals'
import type { Extent } from './coverage'
import type { Readings } from './readings'

/** How many standard uncertainties make a drift real. Common practice, no source. */
const SIGNIFICANT = 5
/** One turn each way leaves about 1/40 of the clock unexplained; a smaller sum than four times its noise cannot be significant. */
const LEAST_SHARE = 0.1

/** Drift that is linear in time (in rows where no time is given). */
export interface Drift {
  /** N·m per unit of `clock`. */
  slope: number
  /** Standard uncertainty of the slope. */
  slopeUncertainty: number
  /** Time or row of each reading less the mean of its file, in units of the longest file: its span is 1. */
  clock: Float64Array
}

function clockOf(readings: Readings): Float64Array {
  const clock = new Float64Array(readings.rows)
  let longest = 0
  for (let file = 0; file < readings.names.length; file++) {
    const from = readings.starts[file]!
    const to = readings.starts[file + 1]!
    const value = (row: number) => (readings.timeS ? readings.timeS[row]! : row)
    const middle = (value(from) + value(to - 1)) / 2
    for (let row = from; row < to; row++) clock[row] = value(row) - middle
    longest = Math.max(longest, value(to - 1) - value(from))
  }
  if (longest > 0) for (let row = 0; row < clock.length; row++) clock[row]! /= longest
  return clock
}

/** Part of the clock that no function of angle and direction can explain. */
function unexplained(readings: Readings, labels: Int8Array, extent: Extent, clock: Float64Array): Residuals {
  const fits = extent.coverages.map(({ direction }) => {
    const moments = emptyMoments(extent.highestOrder)
    addReadings(moments, readings.angleRad, clock, labels, direction)
    return { direction, fit: fitSeries(moments, extent.highestOrder) }
  })
  return residualsOf(readings, clock, labels, gridsOf(fits, extent.bins))
}

/** Square sum that the clock keeps at the most, by turns and highest order: enough to see that a drift cannot be real. */
function mayDrift(readings: Readings, residuals: Residuals, labels: Int8Array, clock: Float64Array): boolean {
  let together = 0
  let squares = 0
  for (let row = 0; row < readings.rows; row++) {
    if (labels[row] === 0) continue
    together += residuals.values[row]! * clock[row]!
    squares += clock[row]! * clock[row]!
  }
  // The residual is orthogonal to all that the fit explains, so this sum is that with the unexplained part of the clock, whose squares are fewer.
  const noise = Math.sqrt(residuals.squares / Math.max(1, residuals.count))
  return together !== 0 && squares > 0 && Math.abs(together) > noise * Math.sqrt(squares) * LEAST_SHARE
}

/**
 * Estimates a linear drift of the torque by partial regression on time (Frisch, Waugh and Lovell; from memory): slope = Σ r·t⊥ / Σ t⊥², where r is what the
 * fit leaves and t⊥ is what a fit of the same kind leaves of time.
 *
 * @param readings - all readings
 * @param residuals - what the fit leaves of the torque
 * @param labels - direction of each reading
 * @param extent - orders and directions
 * @returns the drift when it is five times its standard uncertainty or more; else null
 */
export function findDrift(readings: Readings, residuals: Residuals, labels: Int8Array, extent: Extent): Drift | null {
  const clock = clockOf(readings)
  if (!mayDrift(readings, residuals, labels, clock)) return null
  const left = unexplained(readings, labels, extent, clock)
  let together = 0
  for (let row = 0; row < readings.rows; row++) if (labels[row] !== 0) together += residuals.values[row]! * left.values[row]!
  if (!(left.squares > 0)) return null
  const slope = together / left.squares
  const remaining = Math.max(0, residuals.squares - slope * together)
  const freedom = Math.max(1, residuals.count - extent.coverages.length * (2 * extent.highestOrder + 1) - 1)
  const slopeUncertainty = Math.sqrt(remaining / freedom / left.squares)
  return Math.abs(slope) >= SIGNIFICANT * slopeUncertainty && slope !== 0 ? { slope, slopeUncertainty, clock } : null
}
