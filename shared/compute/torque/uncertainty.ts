import type { RigProperties } from '../terms/measurement'

/** Coverage factor of the expanded uncertainty; about 95 % for a normal distribution (JCGM 100:2008, 6.3). */
export const COVERAGE_FACTOR = 2

/**
 * Expanded uncertainty (k = 2) of a torque characteristic: U = 2·√((u_rel·value)² + u_abs² + s²).
 *
 * The calibration's relative part goes with the value, its absolute part does not; s holds noise, turn-to-turn scatter and the sensor's resolution (a reading's
 * resolution/√12 is the least noise that is reckoned with, so it is in s and not counted twice).
 *
 * @param valueNm - the characteristic, N·m
 * @param deviationNm - its standard uncertainty by noise, resolution and repeatability, N·m
 * @param rig - calibration; null: not known
 * @returns U in N·m; null without a rig
 */
export function expandedNm(valueNm: number, deviationNm: number, rig: RigProperties | null): number | null {
  if (!rig) return null
  return COVERAGE_FACTOR * Math.hypot(rig.torqueRelativeUncertainty * valueNm, rig.torqueAbsoluteUncertaintyNm, deviationNm)
}
