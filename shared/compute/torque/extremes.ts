import type { FourierSeries } from '../terms/measurement'
import { evaluateAt } from './evaluate'

const TURN_RAD = 2 * Math.PI
const NEWTON_STEPS = 4

/** Where a periodic function is highest and lowest. */
export interface Extremes {
  highest: number
  lowest: number
  highestAngleRad: number
  lowestAngleRad: number
}

/** The best of the local peaks by a parabola through three grid points. */
function bestPeak(grid: Float64Array, sign: 1 | -1): number {
  const size = grid.length
  let best = -Infinity
  let place = 0
  for (let index = 0; index < size; index++) {
    const here = sign * grid[index]!
    const before = sign * grid[(index + size - 1) % size]!
    const after = sign * grid[(index + 1) % size]!
    if (here < before || here < after) continue
    const bend = 2 * here - before - after
    const shift = bend > 0 ? (after - before) / (2 * bend) : 0
    const value = here + ((after - before) * shift) / 4
    if (value > best) {
      best = value
      place = index + shift
    }
  }
  return (place / size) * TURN_RAD
}

/** Newton's iteration on the slope from a point near a peak; kept only while it stays on the peak. */
function polish(series: FourierSeries, angleRad: number, gridStepRad: number, sign: 1 | -1): { angleRad: number; value: number } {
  let best = { angleRad, value: evaluateAt(series, angleRad).value }
  let angle = angleRad
  for (let step = 0; step < NEWTON_STEPS; step++) {
    const { slope, curvature } = evaluateAt(series, angle)
    if (sign * curvature >= 0) break
    angle -= slope / curvature
    if (Math.abs(angle - angleRad) > gridStepRad) break
    const { value } = evaluateAt(series, angle)
    if (sign * (value - best.value) > 0) best = { angleRad: angle, value }
    if (Math.abs(slope / curvature) < 1e-9) break
  }
  return best
}

/**
 * Highest and lowest value of a Fourier series, between grid points too.
 *
 * @param series - the series, N·m
 * @param grid - its values at equal steps round the turn, 16 a period of the highest order or more
 * @returns values in N·m and their angles in rad; exact to 1e-9 of the peak
 */
export function extremesOf(series: FourierSeries, grid: Float64Array): Extremes {
  const step = TURN_RAD / grid.length
  const top = polish(series, bestPeak(grid, 1), step, 1)
  const bottom = polish(series, bestPeak(grid, -1), step, -1)
  return { highest: top.value, lowest: bottom.value, highestAngleRad: top.angleRad, lowestAngleRad: bottom.angleRad }
}
