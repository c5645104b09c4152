import type { Warning } from '../terms/measurement'
import type { Readings } from './readings'

const TURN_RAD = 2 * Math.PI
/** A retreat by more than this is a reversal, less is play of the coupling or noise of the encoder. Common practice, no source. */
const REVERSAL_RAD = TURN_RAD / 100
/** Shorter runs are run-up and backlash, no pass. Common practice, no source. */
const SHORTEST_PASS_RAD = TURN_RAD / 4

/** Direction of each reading: +1, −1, or 0 for a reading that belongs to no pass. */
export interface Directions {
  labels: Int8Array
  warnings: Warning[]
}

/**
 * Step from one angle to another by the shorter way.
 *
 * @param from - rad
 * @param to - rad
 * @returns −π…π rad
 */
export function shortestStep(from: number, to: number): number {
  const step = to - from
  return Math.abs(step) <= Math.PI ? step : step - TURN_RAD * Math.round(step / TURN_RAD)
}

/**
 * Angle run through by the readings of one label in their order, signed.
 *
 * @param readings - all readings
 * @param labels - label of each
 * @param label - the label meant
 * @returns rad; positive when the angle rises
 */
export function runOf(readings: Readings, labels: Int8Array, label: number): number {
  let run = 0
  for (let file = 0; file < readings.names.length; file++) {
    let last = NaN
    for (let row = readings.starts[file]!; row < readings.starts[file + 1]!; row++) {
      if (labels[row] !== label) continue
      const angle = readings.angleRad[row]!
      if (!Number.isNaN(last)) run += shortestStep(last, angle)
      last = angle
    }
  }
  return run
}

/** Where both directions are there the angle decides which is which, unless both are listed the same way round. */
function directionsByColumn(readings: Readings, column: Int8Array): Directions {
  const labels = column.slice()
  const forward = runOf(readings, labels, 1)
  const reverse = runOf(readings, labels, -1)
  const contradicts = forward * reverse < 0 ? forward < 0 : forward === 0 ? reverse > 0 : reverse === 0 && forward < 0
  if (!contradicts) return { labels, warnings: [] }
  for (let row = 0; row < labels.length; row++) labels[row] = -labels[row]!
  return {
    labels,
    warnings: [{ code: 'direction-turned', sentence: 'The direction column calls the falling angle forward; the angle was followed, forward being the rising one.' }],
  }
}

interface Pass {
  from: number
  to: number
  direction: 1 | -1 | 0
  spanRad: number
}

/** Cuts one file at its reversals. */
function passesOf(angleRad: Float64Array, from: number, to: number): Pass[] {
  const passes: Pass[] = []
  let start = { row: from, unwrapped: 0 }
  let extreme = { row: from, unwrapped: 0 }
  let direction: Pass['direction'] = 0
  let unwrapped = 0
  const close = () => passes.push({ from: start.row, to: extreme.row + 1, direction, spanRad: Math.abs(extreme.unwrapped - start.unwrapped) })
  for (let row = from + 1; row < to; row++) {
    unwrapped += shortestStep(angleRad[row - 1]!, angleRad[row]!)
    const ahead = (unwrapped - extreme.unwrapped) * direction
    if (direction === 0) {
      if (Math.abs(unwrapped) > REVERSAL_RAD) {
        direction = unwrapped > 0 ? 1 : -1
        extreme = { row, unwrapped }
      }
    }
    else if (ahead >= 0) {
      extreme.row = row
      extreme.unwrapped = unwrapped
    }
    else if (ahead < -REVERSAL_RAD) {
      close()
      start = { row: extreme.row + 1, unwrapped: extreme.unwrapped }
      direction = direction > 0 ? -1 : 1
      extreme = { row, unwrapped }
    }
  }
  close()
  return passes
}

function directionsByAngle(readings: Readings): Directions {
  const labels = new Int8Array(readings.rows)
  const passes = readings.names.flatMap((_, file) => passesOf(readings.angleRad, readings.starts[file]!, readings.starts[file + 1]!))
  const long = passes.filter((pass) => pass.spanRad >= SHORTEST_PASS_RAD)
  const kept = long.length > 0 ? long : passes
  let used = 0
  for (const pass of kept) {
    labels.fill(pass.direction, pass.from, pass.to)
    used += pass.to - pass.from
  }
  const dropped = readings.rows - used
  if (dropped <= readings.rows / 100) return { labels, warnings: [] }
  return { labels, warnings: [{ code: 'short-passes-left-out', sentence: `${dropped} rows of passes shorter than a quarter turn were left out.` }] }
}

/**
 * Tells the direction of each reading, by the direction column or by the run of the angle.
 *
 * @param readings - all readings
 * @returns +1 where the angle rises, −1 where it falls, 0 for rows of passes shorter than a quarter turn
 */
export function findDirections(readings: Readings): Directions {
  return readings.direction ? directionsByColumn(readings, readings.direction) : directionsByAngle(readings)
}
