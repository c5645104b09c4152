import type { Fault, Warning } from '../terms/measurement'
import { shortestStep } from './directions'
import { faultAt, type Readings } from './readings'

const TURN_RAD = 2 * Math.PI
/* Limits of this file are common practice, no source. */
const STUCK_READINGS = 20
const STUCK_PERIODS = 2
const CLIPPED_READINGS = 5
const CLIPPED_RUNS = 4
const SHOULDER = 0.25
const REPEATED_READINGS = 2.5

/** Runs of equal torque in the order of the rows. */
export interface TorqueRuns {
  /** Mean number of readings a run; 1 when no two neighbours are equal. */
  meanLength: number
  /** Smallest difference between unequal neighbours, N·m; 0 when all are equal. */
  stepNm: number
  /** The run over the widest angle. */
  widest: { row: number; length: number; angleRad: number }
  /** Longest run at the highest and at the lowest torque. */
  extremes: { row: number; length: number; torqueNm: number }[]
}

function angleBetween(angleRad: Float64Array, from: number, to: number): number {
  let angle = 0
  for (let row = from + 1; row <= to; row++) angle += shortestStep(angleRad[row - 1]!, angleRad[row]!)
  return angle
}

/** Row behind the run of equal torque that begins at a row. */
function endOfRun(torqueNm: Float64Array, labels: Int8Array, start: number): number {
  const value = torqueNm[start]!
  let row = start + 1
  while (row < torqueNm.length && torqueNm[row] === value && labels[row] !== 0) row++
  return row
}

/** Finds the runs of equal torque among the readings that belong to a pass. */
export function torqueRuns(readings: Readings, labels: Int8Array): TorqueRuns {
  const { torqueNm, angleRad } = readings
  const extremes = [{ row: 0, length: 0, torqueNm: -Infinity }, { row: 0, length: 0, torqueNm: Infinity }] as const
  const widest = { row: 0, length: 0, angleRad: 0 }
  const [highest, lowest] = extremes
  let runs = 0
  let used = 0
  let step = Infinity
  for (let row = 0; row < torqueNm.length;) {
    if (labels[row] === 0) {
      row++
      continue
    }
    const value = torqueNm[row]!
    const end = endOfRun(torqueNm, labels, row)
    const length = end - row
    runs++
    used += length
    if (end < torqueNm.length && labels[end] !== 0) step = Math.min(step, Math.abs(torqueNm[end]! - value))
    const angle = length > 2 ? Math.abs(angleBetween(angleRad, row, end - 1)) : 0
    if (angle > widest.angleRad) Object.assign(widest, { row, length, angleRad: angle })
    if (value > highest.torqueNm || (value === highest.torqueNm && length > highest.length)) Object.assign(highest, { row, length, torqueNm: value })
    if (value < lowest.torqueNm || (value === lowest.torqueNm && length > lowest.length)) Object.assign(lowest, { row, length, torqueNm: value })
    row = end
  }
  return { meanLength: runs > 0 ? used / runs : 1, stepNm: Number.isFinite(step) ? step : 0, widest, extremes: [...extremes] }
}

/** Readings next to a run that lie within one step of it: a rounded peak has shoulders, a clipped one has none. */
function shoulderLength(readings: Readings, run: { row: number; length: number; torqueNm: number }, stepNm: number): number {
  const near = (row: number) => row >= 0 && row < readings.rows && Math.abs(readings.torqueNm[row]! - run.torqueNm) <= stepNm * 1.01
  let length = 0
  for (let row = run.row - 1; near(row) && length < run.length; row--) length++
  for (let row = run.row + run.length; near(row) && length < 2 * run.length; row++) length++
  return length
}

/**
 * Refuses a stuck sensor and clipped torque.
 *
 * Stuck: one value over 20 readings or more and over two periods of the design order. Clipped: at the highest or lowest torque a run of 5 equal readings or
 * more, four times the mean run, without the shoulders that a peak rounded to the sensor's step has.
 *
 * @param readings - all readings
 * @param runs - its runs of equal torque
 * @param designOrder - L
 * @returns the fault `stuck-sensor` or `clipped`, or null
 */
export function findBadSensor(readings: Readings, runs: TorqueRuns, designOrder: number): Fault | null {
  const { widest } = runs
  if (runs.stepNm === 0 || (widest.length >= STUCK_READINGS && widest.angleRad >= (STUCK_PERIODS * TURN_RAD) / designOrder)) {
    return faultAt(readings, widest.row, 'stuck-sensor', `From this line the torque keeps the same value over ${Math.max(widest.length, 1)} rows and ${((widest.angleRad * 360) / TURN_RAD).toPrecision(3)}°.`,
      'Check the torque sensor and its cable; if it is sound, its resolution is too coarse for this motor.')
  }
  for (const run of runs.extremes) {
    if (run.length < Math.max(CLIPPED_READINGS, CLIPPED_RUNS * runs.meanLength)) continue
    if (shoulderLength(readings, run, runs.stepNm) >= SHOULDER * run.length) continue
    return faultAt(readings, run.row, 'clipped', `From this line the torque stays at its extreme, ${(run.torqueNm * 1e3).toPrecision(4)} mN·m, for ${run.length} rows: it is clipped.`,
      'Use a wider range of the torque sensor or its amplifier, and measure again.')
  }
  return null
}

/** Warns when the torque is repeated from row to row: the sensor is slower or coarser than the logger. */
export function repeatedValues(runs: TorqueRuns): Warning[] {
  if (runs.meanLength < REPEATED_READINGS) return []
  return [{ code: 'repeated-values', sentence: `Each torque value stands in ${runs.meanLength.toFixed(1)} rows on average: the sensor is slower or coarser than the logger.` }]
}
