import { fail } from '../intake/fault'
import { designOrder } from '../motor/design-order'
import type { AnalysisSettings, Fault, Warning } from '../terms/measurement'
import { findDirections } from './directions'
import { findDrift, type Drift } from './drift'
import { findExtent, type Extent } from './coverage'
import { halfSum, rmsOf, seriesOf, type MapEstimate } from './estimate'
import { fitSeries, type SeriesFit } from './least-squares'
import { addReadings, emptyMoments } from './moments'
import { faultAt, type Readings } from './readings'
import { findSpikes, gridsOf, residualsOf, type FittedGrid, type Residuals } from './residuals'
import { findBadSensor, repeatedValues, torqueRuns } from './sensor-checks'
import { coefficientFloor } from './significance'
import { turnScatter, type TurnScatter } from './turns'

const MOST_SPIKES = 0.005
const SPIKE_ROUNDS = 12
const TURN_RAD = 2 * Math.PI
const BANDWIDTH_RATIO = 10

export type EstimateOutcome = { ok: true; estimate: MapEstimate } | { ok: false; fault: Fault }

/** Fits of all directions and what they leave. */
interface Fitted {
  fits: { direction: 1 | -1; fit: SeriesFit }[]
  torqueNm: Float64Array
  grids: FittedGrid[]
  residuals: Residuals
}

function fitAll(readings: Readings, torqueNm: Float64Array, labels: Int8Array, extent: Extent): Fitted {
  const fits = extent.coverages.map(({ direction }) => {
    const moments = emptyMoments(extent.highestOrder)
    addReadings(moments, readings.angleRad, torqueNm, labels, direction)
    return { direction, fit: fitSeries(moments, extent.highestOrder) }
  })
  const grids = gridsOf(fits, extent.bins)
  return { fits, torqueNm, grids, residuals: residualsOf(readings, torqueNm, labels, grids) }
}

/** Fits, leaves out isolated spikes, and fits again until none is left. Labels of spikes become 0. */
function fitWithoutSpikes(readings: Readings, torqueNm: Float64Array, labels: Int8Array, extent: Extent, stepNm: number): { fitted: Fitted; spikes: number[] } | { fault: Fault } {
  const spikes: number[] = []
  let fitted = fitAll(readings, torqueNm, labels, extent)
  for (let round = 0; round < SPIKE_ROUNDS; round++) {
    const rows = findSpikes(fitted.residuals, labels, fitted.grids, stepNm)
    if (rows.length === 0) break
    spikes.push(...rows)
    if (spikes.length > MOST_SPIKES * readings.rows) {
      const fault = faultAt(readings, Math.min(...spikes), 'too-many-spikes', `${spikes.length} of ${readings.rows} readings stand far off their neighbours, the first in this line; ${(100 * MOST_SPIKES).toFixed(1)} % are tolerated.`,
        'Look for a loose cable or interference on the rig, and measure again.')
      return { fault }
    }
    for (const row of rows) labels[row] = 0
    fitted = fitAll(readings, torqueNm, labels, extent)
  }
  return { fitted, spikes }
}

/** Fits with the linear drift taken out, when there is one. */
function fitWithoutDrift(readings: Readings, labels: Int8Array, extent: Extent, fitted: Fitted): { fitted: Fitted; drift: Drift | null } {
  const drift = findDrift(readings, fitted.residuals, labels, extent)
  if (!drift) return { fitted, drift }
  const steady = readings.torqueNm.map((torque, row) => torque - drift.slope * drift.clock[row]!)
  return { fitted: fitAll(readings, steady, labels, extent), drift }
}

const milli = (torqueNm: number) => `${(torqueNm * 1e3).toPrecision(3)} mN·m`

function spikeWarning(spikes: number[]): Warning[] {
  if (spikes.length === 0) return []
  return [{ code: 'spikes-left-out', sentence: `${spikes.length} isolated ${spikes.length === 1 ? 'spike was' : 'spikes were'} left out.` }]
}

function driftWarning(drift: Drift | null): Warning[] {
  if (!drift) return []
  return [{ code: 'drift', sentence: `The torque drifted by ${milli(drift.slope)} from the first row to the last; the linear part was removed.` }]
}

function directionWarning(extent: Extent): Warning[] {
  if (extent.coverages.length === 2) return []
  const way = extent.coverages[0]!.direction === 1 ? 'rising' : 'falling'
  return [{ code: 'one-direction-only', sentence: `The shaft was turned with ${way} angle only, so friction is not separated.` }]
}

/** Order × speed near the torque channel's bandwidth: a first-order filter keeps 1/(1 + x²) of the even part, x = frequency ÷ bandwidth. */
function bandwidthWarning(readings: Readings, extent: Extent, settings: AnalysisSettings): Warning[] {
  const bandwidth = settings.rig?.bandwidthHz
  if (!bandwidth || !readings.timeS) return []
  let seconds = 0
  for (let file = 0; file < readings.names.length; file++) seconds += readings.timeS[readings.starts[file + 1]! - 1]! - readings.timeS[readings.starts[file]!]!
  const turnsPerSecond = extent.coverages.reduce((sum, coverage) => sum + coverage.runRad, 0) / TURN_RAD / seconds
  const order = Math.max(designOrder(settings.design), ...settings.ordersNamed)
  const x = (order * turnsPerSecond) / bandwidth
  if (!(x * BANDWIDTH_RATIO > 1) || !Number.isFinite(x)) return []
  const low = 100 * (1 - 1 / (1 + x * x))
  return [{
    code: 'bandwidth',
    sentence: `Order ${order} passed at ${(order * turnsPerSecond).toPrecision(3)} Hz; the rig's bandwidth of ${bandwidth} Hz should be ten times that, and the order may read ${low.toPrecision(2)} % low.`,
  }]
}

/** Peak-to-peak of the bins' means, both directions averaged where both have readings. */
function rawPeakToPeak(readings: Readings, torqueNm: Float64Array, labels: Int8Array, extent: Extent): number | null {
  const { bins } = extent
  const sums = [new Float64Array(bins), new Float64Array(bins)] as const
  const counts = [new Uint32Array(bins), new Uint32Array(bins)] as const
  for (let row = 0; row < readings.rows; row++) {
    const label = labels[row]!
    if (label === 0) continue
    const bin = Math.floor((readings.angleRad[row]! * bins) / TURN_RAD + 0.5) & (bins - 1)
    const side = label > 0 ? 0 : 1
    sums[side][bin]! += torqueNm[row]!
    counts[side][bin]!++
  }
  return spanOfMeans(sums, counts, extent.coverages.length === 2 ? null : extent.coverages[0]!.direction > 0 ? 0 : 1)
}

/** Highest less lowest of the means, of one side or, where `side` is null, of both averaged. */
function spanOfMeans(sums: readonly [Float64Array, Float64Array], counts: readonly [Uint32Array, Uint32Array], side: 0 | 1 | null): number | null {
  const first = side ?? 0
  const second = side ?? 1
  let highest = -Infinity
  let lowest = Infinity
  for (let bin = 0; bin < sums[0].length; bin++) {
    if (counts[first][bin] === 0 || counts[second][bin] === 0) continue
    const value = (sums[first][bin]! / counts[first][bin]! + sums[second][bin]! / counts[second][bin]!) / 2
    if (value > highest) highest = value
    if (value < lowest) lowest = value
  }
  return highest >= lowest ? highest - lowest : null
}

/** Standard deviations by noise and by turn-to-turn scatter, the larger of the two for each direction. */
function deviationsOf(fitted: Fitted, scatters: TurnScatter[], highestOrder: number, resolutionNm: number, repeats: number) {
  const parameters = 2 * highestOrder + 1
  const { squares, count } = fitted.residuals
  const freedom = Math.max(1, count - fitted.fits.length * parameters)
  // Readings that repeat each other count once.
  const noise = Math.max(squares / freedom, resolutionNm ** 2 / 12) * repeats
  let map = 0
  let mean = 0
  fitted.fits.forEach(({ fit }, index) => {
    const { turns, deviationNm } = scatters[index]!
    const byTurns = deviationNm === null ? 0 : deviationNm ** 2 / Math.max(1, turns)
    map += Math.max((noise * fit.inflation * parameters) / fit.count, byTurns)
    mean += (noise * fit.inflation) / fit.count
  })
  const share = fitted.fits.length ** 2
  return { mapDeviationNm: Math.sqrt(map / share), meanDeviationNm: Math.sqrt(mean / share) }
}

function pooledRepeatability(scatters: TurnScatter[]) {
  const known = scatters.filter((scatter) => scatter.deviationNm !== null && scatter.turns >= 2)
  const freedom = known.reduce((sum, scatter) => sum + scatter.degreesOfFreedom, 0)
  if (freedom === 0) return { repeatabilityNm: null, repeatabilityFreedom: 0 }
  const squares = known.reduce((sum, scatter) => sum + scatter.degreesOfFreedom * scatter.deviationNm! ** 2, 0)
  return { repeatabilityNm: Math.sqrt(squares / freedom), repeatabilityFreedom: freedom }
}

/** Even and odd part of the fits. */
function partsOf(fitted: Fitted) {
  const forward = fitted.fits.find(({ direction }) => direction === 1)?.fit.spectrum
  const reverse = fitted.fits.find(({ direction }) => direction === -1)?.fit.spectrum
  const even = forward && reverse ? halfSum(forward, reverse, 1) : (forward ?? reverse)!
  const friction = forward && reverse ? seriesOf(halfSum(forward, reverse, -1), true) : null
  const cogging = seriesOf(even, false)
  return {
    directions: forward && reverse ? 'both' as const : forward ? 'forward' as const : 'reverse' as const,
    zeroNm: even.re[0]!, cogging, friction,
  }
}

function estimateOf(readings: Readings, labels: Int8Array, extent: Extent, fitted: Fitted, drift: Drift | null, settings: AnalysisSettings, repeats: number): MapEstimate {
  const scatters = extent.coverages.map(({ direction }) => turnScatter(readings, fitted.residuals.values, labels, direction, extent.highestOrder))
  const deviations = deviationsOf(fitted, scatters, extent.highestOrder, settings.rig?.torqueResolutionNm ?? 0, repeats)
  const parts = partsOf(fitted)
  const byNoise = deviations.mapDeviationNm * Math.sqrt(2 / (2 * extent.highestOrder + 1))
  return {
    rows: readings.rows,
    turns: scatters.reduce((sum, { turns }) => sum + turns, 0),
    highestOrder: extent.highestOrder,
    ...parts,
    bins: extent.bins,
    rawPeakToPeakNm: rawPeakToPeak(readings, fitted.torqueNm, labels, extent),
    coefficientDeviationNm: Math.max(byNoise, coefficientFloor(parts.cogging)),
    frictionCoefficientDeviationNm: Math.max(byNoise, parts.friction ? coefficientFloor(parts.friction) : 0),
    frictionMeanDeviationNm: Math.hypot(deviations.meanDeviationNm, drift ? drift.slopeUncertainty / 2 : 0),
    ...pooledRepeatability(scatters),
    warnings: [],
  }
}

function frictionWarning(estimate: MapEstimate): Warning[] {
  const mean = estimate.friction?.meanNm ?? 0
  if (mean >= -3 * estimate.frictionMeanDeviationNm || -mean < 0.01 * rmsOf(estimate.cogging)) return []
  return [{ code: 'friction-negative', sentence: 'The friction came out negative: the sign of the torque or of the angle is the wrong way round.' }]
}

/**
 * Estimates a map from torque-sensor readings: directions, coverage, sensor faults, least-squares fit with spikes and drift removed, even and odd part.
 *
 * @param readings - checked readings
 * @param settings - motor, orders and rig
 * @returns the estimate with its warnings, or the fault
 */
export function estimateFromTorqueSensor(readings: Readings, settings: AnalysisSettings): EstimateOutcome {
  const { labels, warnings } = findDirections(readings)
  const found = findExtent(readings, labels, settings)
  if (!found.ok) return found
  const { extent } = found
  if (extent.coverages.length === 1) {
    const kept = extent.coverages[0]!.direction
    for (let row = 0; row < labels.length; row++) if (labels[row] !== kept) labels[row] = 0
  }
  const runs = torqueRuns(readings, labels)
  const fault = findBadSensor(readings, runs, designOrder(settings.design))
  if (fault) return { ok: false, fault }
  const first = fitWithoutSpikes(readings, readings.torqueNm, labels, extent, runs.stepNm)
  if ('fault' in first) return { ok: false, fault: first.fault }
  const { fitted, drift } = fitWithoutDrift(readings, labels, extent, first.fitted)
  const estimate = estimateOf(readings, labels, extent, fitted, drift, settings, runs.meanLength)
  if (!Number.isFinite(rmsOf(estimate.cogging) + estimate.coefficientDeviationNm)) {
    return fail('not-computable', null, 'No map could be computed from the readings.', 'Check the columns and their units, and measure again.')
  }
  estimate.warnings = [...warnings, ...extent.warnings, ...directionWarning(extent), ...spikeWarning(first.spikes), ...driftWarning(drift), ...repeatedValues(runs),
    ...bandwidthWarning(readings, extent, settings), ...frictionWarning(estimate)]
  return { ok: true, estimate }
}
