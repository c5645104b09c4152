import { fail } from '../intake/fault'
import { designOrder } from '../motor/design-order'
import type { AnalysisOutcome, AnalysisSettings, ColumnRecipe, Fault, Warning } from '../terms/measurement'
import { characteristicsOf } from './characteristics'
import { ENGINE_VERSION } from './engine-version'
import type { MapEstimate } from './estimate'
import { tabulateOrders, type OrderTable } from './orders'
import { readFiles, type MeasurementFile } from './readings'
import { angleSensorEccentricity } from './sidebands'
import { estimateFromTorqueSensor } from './torque-sensor'

const MOST_ORDER = 65_536

function checkOrder(name: string, order: number): void {
  if (!Number.isInteger(order) || order < 1 || order > MOST_ORDER) throw new RangeError(`analyse: ${name} must be a whole number from 1 to ${MOST_ORDER}, not ${order}`)
}

function checkSettings(files: MeasurementFile[], settings: AnalysisSettings): void {
  if (files.length === 0) throw new RangeError('analyse: files must hold one file or more')
  designOrder(settings.design)
  if (settings.highestOrder !== null) checkOrder('settings.highestOrder', settings.highestOrder)
  for (const order of settings.ordersNamed) checkOrder('settings.ordersNamed', order)
  const { ratedTorqueNm, rig } = settings
  if (ratedTorqueNm !== null && !(ratedTorqueNm > 0 && Number.isFinite(ratedTorqueNm))) throw new RangeError(`analyse: settings.ratedTorqueNm must be above 0 N·m or null, not ${ratedTorqueNm}`)
  if (!rig) return
  const sizes = { torqueResolutionNm: rig.torqueResolutionNm, torqueRelativeUncertainty: rig.torqueRelativeUncertainty, torqueAbsoluteUncertaintyNm: rig.torqueAbsoluteUncertaintyNm }
  for (const [name, size] of Object.entries(sizes)) {
    if (!(size >= 0 && Number.isFinite(size))) throw new RangeError(`analyse: settings.rig.${name} must be a number from 0, not ${size}`)
  }
}

type MethodOutcome = { ok: true; estimate: MapEstimate; recipe: ColumnRecipe } | { ok: false; fault: Fault; recipe?: ColumnRecipe }

/** The reader and estimator of each method; all give the same kind of estimate. */
function estimateMap(files: MeasurementFile[], settings: AnalysisSettings): MethodOutcome {
  switch (settings.method) {
    case 'torque-sensor': {
      const read = readFiles(files, settings)
      return read.ok ? { ...estimateFromTorqueSensor(read.readings, settings), recipe: read.recipe } : read
    }
    case 'hold':
    case 'spin':
      return fail('method-not-supported', null, `Files of the method "${settings.method}" cannot be judged yet.`, 'Measure the motor with a torque sensor.')
  }
}

function rigWarnings(table: OrderTable): Warning[] {
  const found = angleSensorEccentricity(table.sidebands)
  if (!found) return []
  const milliradians = (found.eccentricityRad * 1e3).toPrecision(3)
  return [{ code: 'angle-sensor-eccentricity', sentence: `The rig's angle sensor runs out of centre by ${milliradians} mrad; orders one above and one below the strong ones come from it, not from the motor.` }]
}

function compensationWarnings(estimate: MapEstimate, settings: AnalysisSettings): Warning[] {
  if (!settings.compensation || estimate.repeatabilityNm !== null) return []
  return [{ code: 'repeatability-not-measured', sentence: 'Fewer than two turns of one direction were measured, so the torque left after compensation leaves repeatability out.' }]
}

/**
 * Analyses the files of one motor: rows → map → orders → characteristics with their uncertainty.
 *
 * Several files (one a direction, say) are joined. The map is the least-squares Fourier series of orders 1…K of each direction; its even part less the mean is the cogging
 * torque, its odd part friction and hysteresis.
 *
 * @param files - one file or more, delimited text, all of one recipe
 * @param settings - method, motor, rated torque (N·m), orders, compensation, column recipe (null: guessed), rig
 * @returns the figures and warnings; or the fault with its line, and the recipe guessed so far
 * @throws RangeError when the settings are outside their domains
 */
export function analyse(files: MeasurementFile[], settings: AnalysisSettings): AnalysisOutcome {
  checkSettings(files, settings)
  const estimated = estimateMap(files, settings)
  if (!estimated.ok) return estimated
  const { estimate, recipe } = estimated
  const table = tabulateOrders(estimate, settings)
  return {
    ok: true,
    result: {
      engineVersion: ENGINE_VERSION,
      method: settings.method,
      rows: estimate.rows,
      turns: estimate.turns,
      directions: estimate.directions,
      highestOrder: estimate.highestOrder,
      zeroNm: estimate.zeroNm,
      cogging: estimate.cogging,
      friction: estimate.friction,
      orders: table.listed,
      characteristics: characteristicsOf(estimate, table, settings),
      warnings: [...estimate.warnings, ...rigWarnings(table), ...compensationWarnings(estimate, settings)],
      recipe,
    },
  }
}
