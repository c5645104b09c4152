import { fail, type Outcome } from '../intake/fault'
import type { MeasurementTable } from '../intake/read-table'
import type { AnalysisSettings, ColumnRecipe, MethodConstants, RigProperties, Warning } from '../terms/measurement'

const known = (value: number | null | undefined): value is number => value !== null && value !== undefined

function noConstant(what: string, remedy: string) {
  return fail('no-constant', null, `The file cannot be turned into torque: ${what} is not known.`, remedy)
}

/** Dead time takes a fixed voltage against the sign of the current, so it follows the sign of the torque, not the approach: averaging both approaches leaves it in. */
function withoutDeadTime(volt: number, deadTimeVoltage: number): number {
  return Math.sign(volt) * Math.max(0, Math.abs(volt) - deadTimeVoltage)
}

/** A voltage map whose dead time is not stated reads high. */
export function holdWarnings(recipe: ColumnRecipe, settings: AnalysisSettings): Warning[] {
  if (settings.method !== 'hold' || recipe.columns.some(({ role }) => role === 'current') || known(settings.constants?.deadTimeVoltage)) return []
  return [{ code: 'dead-time-not-stated', sentence: 'The voltage that the inverter\'s dead time takes is not stated, so it is left in the torque, which may read high.' }]
}

/**
 * Torque of each row of a hold-position file: Kt·I, Kt·V/R or Kt·(duty ÷ full scale)·V_bus/R, by what the file has, in this order.
 *
 * V is the voltage less what the inverter's dead time takes. Stiction is in the torque with the sign of the approach; the mean of both approach directions removes it.
 *
 * @param table - columns in SI units: current (A), voltage (V) or duty (share of full scale), bus (V) if there is one
 * @param constants - torque constant (N·m/A), phase resistance (Ω), bus voltage (V) for files without its column
 * @returns torque, N·m; or the fault `no-constant`
 */
export function torqueOfHold(table: MeasurementTable, constants: MethodConstants = {}): Outcome<Float64Array> {
  const { current, voltage, duty, bus } = table.columns
  const { torqueConstantNmPerA: torqueConstant, phaseResistanceOhm: resistance, busVoltage } = constants
  if (!known(torqueConstant)) return noConstant('the torque constant', 'State the motor\'s torque constant in N·m/A.')
  if (current) return { ok: true, value: current.map((ampere) => torqueConstant * ampere) }
  if (!known(resistance)) return noConstant('the phase resistance', 'State the motor\'s phase resistance in Ω.')
  const perVolt = torqueConstant / resistance
  const torque = (volt: number) => perVolt * withoutDeadTime(volt, constants.deadTimeVoltage ?? 0)
  if (voltage) return { ok: true, value: voltage.map(torque) }
  if (bus) return { ok: true, value: duty!.map((share, row) => torque(share * bus[row]!)) }
  if (!known(busVoltage)) return noConstant('the bus voltage', 'State the bus voltage in V, or add its column to the file.')
  return { ok: true, value: duty!.map((share) => torque(share * busVoltage)) }
}

/**
 * Checks the constants.
 *
 * @throws RangeError when one is not above zero, or the relative uncertainty not 0 or more
 */
export function checkConstants(constants: MethodConstants = {}): void {
  const { relativeUncertainty, ...sizes } = constants
  for (const [name, size] of Object.entries(sizes)) {
    const least = name === 'deadTimeVoltage' ? 0 : Number.MIN_VALUE
    if (known(size) && !(size >= least && Number.isFinite(size))) throw new RangeError(`analyse: settings.constants.${name} must be above 0 (dead time: from 0) or null, not ${size}`)
  }
  if (known(relativeUncertainty) && !(relativeUncertainty >= 0 && Number.isFinite(relativeUncertainty))) {
    throw new RangeError(`analyse: settings.constants.relativeUncertainty must be a number from 0, not ${relativeUncertainty}`)
  }
}

/** The rig as it counts for a map without a torque sensor: the scale's uncertainty is that of the constants, the sensor's own figures play no part. Null when the constants' uncertainty is not stated. */
export function rigOfConstants(settings: AnalysisSettings): RigProperties | null {
  const relative = settings.constants?.relativeUncertainty
  if (!known(relative)) return null
  return {
    rangeNm: settings.rig?.rangeNm ?? null, angleResolutionRad: settings.rig?.angleResolutionRad ?? 0, bandwidthHz: null,
    torqueResolutionNm: 0, torqueAbsoluteUncertaintyNm: 0, torqueRelativeUncertainty: relative,
  }
}
