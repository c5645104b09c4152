import { binCount, defaultHighestOrder } from '../motor/grid'
import { designOrder } from '../motor/design-order'
import type { AnalysisSettings, Direction, Fault, Warning } from '../terms/measurement'
import { runOf } from './directions'
import { faultAt, type Readings } from './readings'

const TURN_RAD = 2 * Math.PI
const LEAST_SAMPLES_A_PERIOD = 8
/** What fitting an order takes at the least, twice what Nyquist's theorem asks. Common practice, no source. */
const FITTED_SAMPLES_A_PERIOD = 4
const QUARTER = 0.25
/** A direction that covers less is a start or an end of the other one. */
const SMALLEST_SHARE = 0.5

/** How the readings of one direction lie round the turn. */
export interface Coverage {
  direction: Direction
  readings: number
  /** Angle run through, rad. */
  runRad: number
  /** Different angles a turn, as far as the grid tells them apart. */
  angles: number
  /** Widest gap between neighbouring angles, rad, and the row at its beginning. */
  gapRad: number
  gapRow: number
}

/** Which directions there are, and up to which order they can be fitted. */
export interface Extent {
  coverages: Coverage[]
  highestOrder: number
  bins: number
  warnings: Warning[]
}

/** Finds occupied bins and the widest gap between the angles of one label. */
export function coverageOf(readings: Readings, labels: Int8Array, direction: Direction, bins: number): Coverage {
  const lowest = new Float64Array(bins).fill(Infinity)
  const highest = new Float64Array(bins).fill(-Infinity)
  const rowAt = new Int32Array(bins)
  let count = 0
  for (let row = 0; row < readings.rows; row++) {
    if (labels[row] !== direction) continue
    const place = readings.angleRad[row]! * (bins / TURN_RAD)
    const middle = Math.floor(place + 0.5)
    const bin = middle & (bins - 1)
    const inside = place - middle
    if (inside < lowest[bin]!) lowest[bin] = inside
    if (inside > highest[bin]!) {
      highest[bin] = inside
      rowAt[bin] = row
    }
    count++
  }
  return { direction, readings: count, runRad: Math.abs(runOf(readings, labels, direction)), ...widestGap(lowest, highest, rowAt, bins) }
}

function widestGap(lowest: Float64Array, highest: Float64Array, rowAt: Int32Array, bins: number) {
  const first = lowest.findIndex((value) => value !== Infinity)
  let angles = 0
  let gap = 0
  let gapRow = 0
  let last = first
  for (let step = 1; step <= bins && first >= 0; step++) {
    const bin = (first + step) % bins
    if (lowest[bin] === Infinity) continue
    angles++
    const width = first + step - last + lowest[bin]! - highest[last % bins]!
    if (width > gap) {
      gap = width
      gapRow = rowAt[last % bins]!
    }
    last = first + step
  }
  return { angles, gapRad: (gap * TURN_RAD) / bins, gapRow }
}

const degrees = (rad: number) => `${((rad * 360) / TURN_RAD).toPrecision(3)}°`

/** Less than a turn, or a gap wider than a quarter of the shortest period that counts. */
function findGap(readings: Readings, coverage: Coverage, order: number): Fault | null {
  const allowed = (QUARTER * TURN_RAD) / order
  if (coverage.gapRad <= allowed * (1 + 1e-9)) return null
  const way = coverage.direction === 1 ? 'forward' : 'reverse'
  if (coverage.runRad < TURN_RAD - coverage.gapRad * 0.999) {
    return faultAt(readings, null, 'less-than-one-turn', `The ${way} direction covers only ${degrees(TURN_RAD - coverage.gapRad)} of the turn.`, 'Turn the shaft through one full turn or more, and measure again.')
  }
  return faultAt(readings, coverage.gapRow, 'gap-too-wide', `The ${way} direction has a gap of ${degrees(coverage.gapRad)} behind this line; order ${order} allows ${degrees(allowed)}.`,
    'Measure again without dropped rows, or with smaller steps.')
}

function findTooFew(readings: Readings, coverage: Coverage, order: number): Fault | null {
  const samples = coverage.angles / order
  if (samples >= LEAST_SAMPLES_A_PERIOD) return null
  return faultAt(readings, null, 'too-few-samples', `The file has ${samples.toFixed(1)} readings a period of order ${order}; ${LEAST_SAMPLES_A_PERIOD} are needed.`,
    `Measure at ${LEAST_SAMPLES_A_PERIOD * order} angles a turn or more.`)
}

function supportedOrder(coverages: Coverage[]): number {
  const byAngles = Math.min(...coverages.map((coverage) => coverage.angles / FITTED_SAMPLES_A_PERIOD))
  const byGap = Math.min(...coverages.map((coverage) => Math.PI / coverage.gapRad))
  return Math.floor(Math.min(byAngles, byGap) + 1e-9)
}

/** Leaves out a direction that is only a start or an end of the other. */
function dropFragment(coverages: Coverage[], warnings: Warning[]): Coverage[] {
  const whole = coverages.filter((coverage) => coverage.runRad >= SMALLEST_SHARE * TURN_RAD)
  if (whole.length === 0 || whole.length === coverages.length) return coverages
  const lost = coverages.find((coverage) => !whole.includes(coverage))!
  warnings.push({ code: 'direction-left-out', sentence: `The ${lost.direction === 1 ? 'forward' : 'reverse'} direction covers ${degrees(lost.runRad)} only and was left out.` })
  return whole
}

/**
 * Checks that the readings cover the turn densely enough, and settles the highest order to fit.
 *
 * The highest order is the sheet's, by default 3 × the design order and at least 64, never below an order that a limit names; it is lowered, with a
 * warning, to what four angles a period and gaps of half a period support. Refused are less than one turn, gaps wider than a quarter period, and
 * fewer than eight angles a period, of the design order or the highest order that a limit names.
 *
 * @param readings - all readings
 * @param labels - direction of each
 * @param settings - design, highest order, orders named
 * @returns the extent, or the fault
 */
export function findExtent(readings: Readings, labels: Int8Array, settings: AnalysisSettings): { ok: true; extent: Extent } | { ok: false; fault: Fault } {
  const needed = Math.max(designOrder(settings.design), ...settings.ordersNamed)
  const wanted = Math.max(settings.highestOrder ?? defaultHighestOrder(settings.design), ...settings.ordersNamed)
  const warnings: Warning[] = []
  const bins = binCount(Math.max(wanted, needed))
  const found = ([1, -1] as const).map((direction) => coverageOf(readings, labels, direction, bins)).filter((coverage) => coverage.readings > 1)
  const coverages = dropFragment(found, warnings)
  if (coverages.length === 0) return { ok: false, fault: faultAt(readings, null, 'less-than-one-turn', 'The angle does not move.', 'Check the angle sensor and its column, and measure again.') }
  for (const coverage of coverages) {
    const fault = findGap(readings, coverage, needed) ?? findTooFew(readings, coverage, needed)
    if (fault) return { ok: false, fault }
  }
  const supported = supportedOrder(coverages)
  const highestOrder = Math.min(wanted, supported)
  if (highestOrder < wanted) {
    warnings.push({ code: 'highest-order-lowered', sentence: `The readings support orders up to ${supported}; orders ${supported + 1} to ${wanted} were not fitted.` })
  }
  return { ok: true, extent: { coverages, highestOrder, bins, warnings } }
}
