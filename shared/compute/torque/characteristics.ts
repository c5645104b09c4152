import { designOrder } from '../motor/design-order'
import type { AnalysisSettings, Characteristic, CharacteristicUnit, FourierSeries } from '../terms/measurement'
import type { Origin } from '../terms/motor'
import { compensatedPeakToPeak } from './compensation'
import { clearPart, type ClearPart } from './clear-part'
import { amplitudeOf, gridValues, rmsOf, type MapEstimate } from './estimate'
import { extremesOf, type Extremes } from './extremes'
import { groupRms, type OrderTable } from './orders'
import { RIPPLE_DEFINITIONS, rippleRatio, type RippleInputs } from './ripple'
import { angleSensorEccentricity } from './sidebands'
import { COVERAGE_FACTOR, expandedNm } from './uncertainty'

const ORIGINS: Origin[] = ['design', 'rotorSide', 'statorSide', 'turn', 'other']
const ONE_DIRECTION = 'The shaft was turned in one direction only, so friction is not separated.'
const ONE_TURN = 'Fewer than two turns of one direction were measured.'

/** What the characteristics of one map are computed from: its orders that stand above the noise. */
interface Subject {
  estimate: MapEstimate
  table: OrderTable
  settings: AnalysisSettings
  cogging: ClearPart
  coggingGrid: Float64Array
  friction: ClearPart | null
  frictionGrid: Float64Array
  extremes: Extremes
  rms: number
}

function stated(key: string, value: number, unit: CharacteristicUnit, expandedUncertainty: number | null): Characteristic {
  return { key, value, unit, expandedUncertainty }
}

function notStated(key: string, unit: CharacteristicUnit, reason: string): Characteristic {
  return { key, value: null, unit, expandedUncertainty: null, notStated: reason }
}

const torqueFigure = (subject: Subject, key: string, value: number, deviationNm: number) =>
  stated(key, value, 'N·m', expandedNm(value, deviationNm, subject.settings.rig))

/** Peak-to-peak is a difference of two angles; RMS moves by σ/√2, and by what is left out. */
const deviationOfPeakToPeak = (part: ClearPart) => Math.SQRT2 * part.deviationNm

function deviationOfRms({ estimate, cogging, rms }: Subject): number {
  if (rms === 0) return cogging.deviationNm
  return Math.hypot(estimate.coefficientDeviationNm / Math.SQRT2, Math.min(cogging.deviationNm ** 2 / (2 * rms), cogging.deviationNm))
}

function coggingFigures(subject: Subject): Characteristic[] {
  const { estimate, extremes, rms, cogging } = subject
  const raw = estimate.rawPeakToPeakNm
  return [
    torqueFigure(subject, 'cogging.peakToPeak', extremes.highest - extremes.lowest, deviationOfPeakToPeak(cogging)),
    torqueFigure(subject, 'cogging.rms', rms, deviationOfRms(subject)),
    raw === null
      ? notStated('cogging.peakToPeak.raw', 'N·m', 'The two directions have no bin in common.')
      : torqueFigure(subject, 'cogging.peakToPeak.raw', raw, deviationOfPeakToPeak(cogging)),
  ]
}

/** Largest one-sided torque with friction in it: of even + odd part forward, even − odd part in reverse. */
function detentPeak(cogging: FourierSeries, coggingGrid: Float64Array, friction: FourierSeries, frictionGrid: Float64Array): number {
  let peak = 0
  for (const sign of [1, -1]) {
    const grid = coggingGrid.map((value, index) => value + sign * frictionGrid[index]!)
    const series = {
      meanNm: sign * friction.meanNm,
      cosNm: cogging.cosNm.map((value, index) => value + sign * friction.cosNm[index]!),
      sinNm: cogging.sinNm.map((value, index) => value + sign * friction.sinNm[index]!),
    }
    const { highest, lowest } = extremesOf(series, grid)
    peak = Math.max(peak, highest, -lowest)
  }
  return peak
}

function frictionFigures(subject: Subject): Characteristic[] {
  const { estimate, cogging, coggingGrid, friction, frictionGrid } = subject
  if (!friction) return ['detent.peak', 'friction.mean', 'friction.peakToPeak'].map((key) => notStated(key, 'N·m', ONE_DIRECTION))
  const { highest, lowest } = extremesOf(friction.series, frictionGrid)
  const peak = detentPeak(cogging.series, coggingGrid, friction.series, frictionGrid)
  return [
    torqueFigure(subject, 'detent.peak', peak, Math.hypot(cogging.deviationNm, friction.deviationNm, estimate.frictionMeanDeviationNm)),
    torqueFigure(subject, 'friction.mean', friction.series.meanNm, estimate.frictionMeanDeviationNm),
    torqueFigure(subject, 'friction.peakToPeak', highest - lowest, deviationOfPeakToPeak(friction)),
  ]
}

function rippleFigures(subject: Subject): Characteristic[] {
  const { estimate, settings, extremes, rms } = subject
  const inputs: RippleInputs = { highestNm: extremes.highest, lowestNm: extremes.lowest, rmsNm: rms, meanNm: estimate.zeroNm, ratedTorqueNm: settings.ratedTorqueNm }
  const figures = RIPPLE_DEFINITIONS.map((definition) => {
    const key = `rippleRatio.${definition}`
    const ratio = rippleRatio(definition, inputs)
    if ('notStated' in ratio) return notStated(key, '%', ratio.notStated)
    const deviation = ratio.of === 'rms' ? deviationOfRms(subject) : deviationOfPeakToPeak(subject.cogging) / (ratio.of === 'halfPeakToPeak' ? 2 : 1)
    // A ratio to the map's own mean does not hang on the scale of the sensor.
    const rig = definition.endsWith('OverRated') || !settings.rig ? settings.rig : { ...settings.rig, torqueRelativeUncertainty: 0 }
    const expanded = expandedNm(ratio.percent / ratio.perNm, deviation, rig)
    return stated(key, ratio.percent, '%', expanded === null ? null : expanded * ratio.perNm)
  })
  const chosen = figures.find(({ key }) => key === `rippleRatio.${settings.rippleDefinition}`)!
  return [{ ...chosen, key: 'rippleRatio' }, ...figures]
}

function orderFigures(subject: Subject): Characteristic[] {
  const { estimate, table, settings } = subject
  const design = amplitudeOf(estimate.cogging, designOrder(settings.design))
  const designIsClear = design > table.thresholdNm
  return table.listed.flatMap(({ order, amplitudeNm }) => {
    const figure = torqueFigure(subject, `order.${order}`, amplitudeNm, estimate.coefficientDeviationNm)
    if (!settings.ordersNamed.includes(order)) return [figure]
    const share = (key: string, by: number | null, reason: string) =>
      by === null ? notStated(key, '%', reason) : stated(key, (100 * amplitudeNm) / by, '%', figure.expandedUncertainty === null ? null : (100 * figure.expandedUncertainty) / by)
    return [
      figure,
      share(`order.${order}.ofRated`, settings.ratedTorqueNm, 'The part states no rated torque.'),
      share(`order.${order}.ofDesign`, designIsClear ? design : null, 'The design order does not stand above the noise.'),
    ]
  })
}

function groupFigures(subject: Subject): Characteristic[] {
  const { estimate, table } = subject
  return ORIGINS.map((origin) => {
    const value = groupRms(table.significant, origin)
    // With no order above the noise, the group may hold one just below it.
    const deviation = value > 0 ? estimate.coefficientDeviationNm / Math.SQRT2 : table.thresholdNm / Math.SQRT2 / COVERAGE_FACTOR
    return torqueFigure(subject, `group.${origin}`, value, deviation)
  })
}

function harmonicContent({ estimate, table, settings }: Subject): Characteristic {
  const order = designOrder(settings.design)
  const design = amplitudeOf(estimate.cogging, order)
  if (order > estimate.highestOrder || design <= table.thresholdNm) return notStated('harmonicContent', '1', 'The design order does not stand above the noise.')
  const others = Math.sqrt(table.significant.filter((entry) => entry.order !== order).reduce((sum, { amplitudeNm }) => sum + amplitudeNm ** 2, 0))
  const value = others / design
  const deviation = Math.hypot(estimate.coefficientDeviationNm / design, (value * estimate.coefficientDeviationNm) / design)
  return stated('harmonicContent', value, '1', settings.rig ? COVERAGE_FACTOR * deviation : null)
}

function repeatability(subject: Subject): Characteristic {
  const { repeatabilityNm, repeatabilityFreedom } = subject.estimate
  if (repeatabilityNm === null) return notStated('repeatability', 'N·m', ONE_TURN)
  return torqueFigure(subject, 'repeatability', repeatabilityNm, repeatabilityNm / Math.sqrt(2 * repeatabilityFreedom))
}

function compensationFigures(subject: Subject): Characteristic[] {
  const { estimate, settings, extremes, cogging } = subject
  if (!settings.compensation) return []
  const before = extremes.highest - extremes.lowest
  const left = compensatedPeakToPeak(cogging.series, estimate.bins, settings.compensation) + (estimate.repeatabilityNm ?? 0)
  const after = torqueFigure(subject, 'afterCompensation.peakToPeak', left, deviationOfPeakToPeak(cogging))
  if (!(before > 0)) return [after, notStated('afterCompensation.reduction', '%', 'There is no torque to compensate.')]
  const expanded = after.expandedUncertainty === null ? null : (100 * after.expandedUncertainty) / before
  return [after, stated('afterCompensation.reduction', 100 * (1 - left / before), '%', expanded)]
}

function eccentricityFigure({ estimate, table, settings }: Subject): Characteristic {
  const found = angleSensorEccentricity(table.sidebands)
  if (!found) return notStated('angleSensorEccentricity', 'rad', 'No pair of sidebands shows it above the noise.')
  const deviation = (Math.SQRT2 * estimate.coefficientDeviationNm) / Math.sqrt(found.weight)
  return stated('angleSensorEccentricity', found.eccentricityRad, 'rad', settings.rig ? COVERAGE_FACTOR * deviation : null)
}

/**
 * All characteristics of a map (each: value, unit, expanded uncertainty k = 2). What cannot be computed has no value and says why.
 *
 * Peak-to-peak, RMS and what follows from them are of the fitted orders 1…K that stand above the noise (see `clearPart`), evaluated between grid points too.
 *
 * @param estimate - the map
 * @param table - its orders
 * @param settings - motor, limits, rig
 */
export function characteristicsOf(estimate: MapEstimate, table: OrderTable, settings: AnalysisSettings): Characteristic[] {
  const cogging = clearPart(estimate.cogging, estimate.coefficientDeviationNm)
  const friction = estimate.friction && clearPart(estimate.friction, estimate.frictionCoefficientDeviationNm)
  const [coggingGrid, frictionGrid] = gridValues(cogging.series, estimate.bins, friction?.series)
  const extremes = extremesOf(cogging.series, coggingGrid)
  const subject: Subject = { estimate, table, settings, cogging, coggingGrid, friction, frictionGrid, extremes, rms: rmsOf(cogging.series) }
  return [
    ...coggingFigures(subject), ...frictionFigures(subject), ...rippleFigures(subject), ...orderFigures(subject), ...groupFigures(subject),
    harmonicContent(subject), repeatability(subject), ...compensationFigures(subject), eccentricityFigure(subject),
  ]
}
