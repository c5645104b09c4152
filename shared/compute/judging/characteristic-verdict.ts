import type { CharacteristicVerdict, DecisionRule, Limit, Verdict } from '../terms/judgement'
import type { Characteristic } from '../terms/measurement'
import { normalCumulative } from '../statistics/normal'
import { describeCharacteristic, isCharacteristicKey } from './characteristics'
import { reasonFor } from './reasons'

/**
 * Probability that the true value lies within the limits, for a normal distribution about the measured value:
 * p = Φ((TU − y)/u) − Φ((TL − y)/u), u = U/2.
 *
 * @param value measured value y
 * @param expandedUncertainty U, coverage factor 2, same unit, ≥ 0; 0 gives 0 or 1
 * @param lower lower limit TL; null: none
 * @param upper upper limit TU; null: none
 * @returns probability, 0…1
 * @throws RangeError when the uncertainty is negative or a figure is not finite
 * Source: JCGM 106:2012, 7.2 to 7.4.
 */
export function probabilityOfConformity(
  value: number, expandedUncertainty: number, lower: number | null, upper: number | null,
): number {
  requireFigures('probabilityOfConformity', value, expandedUncertainty, lower, upper)
  if (expandedUncertainty === 0) return isWithin(value, lower, upper, 0) ? 1 : 0
  const standard = expandedUncertainty / 2
  const below = lower === null ? 0 : normalCumulative((lower - value) / standard)
  const above = upper === null ? 0 : normalCumulative((value - upper) / standard)
  return Math.max(0, 1 - below - above)
}

function requireFigures(name: string, value: number, expandedUncertainty: number | null, lower: number | null, upper: number | null): void {
  for (const figure of [value, lower, upper]) {
    if (figure !== null && !Number.isFinite(figure)) throw new RangeError(`${name}: value and limits must be finite, got ${figure}`)
  }
  if (expandedUncertainty !== null && !(expandedUncertainty >= 0 && expandedUncertainty < Infinity)) {
    throw new RangeError(`${name}: expandedUncertainty must be finite and ≥ 0, got ${expandedUncertainty}`)
  }
  if (lower !== null && upper !== null && lower > upper) throw new RangeError(`${name}: lower must not be above upper, got ${lower} > ${upper}`)
}

/** Comparison that forgives the last bits of a guarded limit (5.4 − 0.3 is not 5.1 in binary), and nothing without guard band. */
function isWithin(value: number, lower: number | null, upper: number | null, guardBand: number): boolean {
  const slack = (limit: number): number => guardBand === 0 ? 0 : 4 * Number.EPSILON * (Math.abs(limit) + Math.abs(guardBand))
  return (lower === null || value >= lower + guardBand - slack(lower)) && (upper === null || value <= upper - guardBand + slack(upper))
}

function verdictOf(value: number, limit: Limit, guardBand: number, rule: DecisionRule): Verdict {
  const { lower, upper } = limit
  const inside = isWithin(value, lower, upper, 0)
  if (rule.kind === 'simple') return inside ? 'pass' : 'fail'
  const guarded = isWithin(value, lower, upper, guardBand)
  if (rule.kind === 'guard-band') return guarded ? 'pass' : 'fail'
  if (inside) return guarded ? 'pass' : 'conditional-pass'
  return isWithin(value, lower, upper, -guardBand) ? 'conditional-fail' : 'fail'
}

function requireRule(limit: Limit, rule: DecisionRule): void {
  if (limit.lower === null && limit.upper === null) throw new RangeError(`judgeCharacteristic: limit on ${limit.key} must have a lower or an upper bound`)
  if (rule.kind !== 'simple' && !(rule.ratio >= 0 && rule.ratio < Infinity)) {
    throw new RangeError(`judgeCharacteristic: rule.ratio must be finite and ≥ 0, got ${rule.ratio}`)
  }
}

const notStatedReason = (limit: Limit, characteristic: Characteristic | undefined): string =>
  characteristic?.notStated
  ?? `${isCharacteristicKey(limit.key) ? describeCharacteristic(limit.key).label : limit.key} is not stated for this measurement.`

/**
 * Judges one characteristic against its limit by the agreed decision rule.
 *
 * Simple: inside the limits passes; exactly on a limit is inside. Guard band w = ratio × U: passes only when inside by at
 * least w, otherwise fails. Four-way: pass inside by at least w; conditional pass inside by less; conditional fail
 * outside by at most w; fail beyond. Without a stated uncertainty a guarded rule can only fail what is outside the limits.
 *
 * @param limit the limit, with at least one bound, lower ≤ upper
 * @param characteristic the figure, in the limit's unit; undefined or value null: not stated
 * @param rule decision rule, ratio ≥ 0
 * @returns verdict (null when it cannot be judged), probability of conformity and the reason for people
 * @throws RangeError when key or unit of limit and characteristic differ, a figure is not finite, the uncertainty is negative,
 *   the limit has no bound or its bounds are crossed, or the ratio is negative
 * Source: JCGM 106:2012, 8; ILAC-G8:09/2019; ISO 14253-1:2017 (from memory).
 */
export function judgeCharacteristic(limit: Limit, characteristic: Characteristic | undefined, rule: DecisionRule): CharacteristicVerdict {
  requireRule(limit, rule)
  if (characteristic && characteristic.key !== limit.key) {
    throw new RangeError(`judgeCharacteristic: characteristic must be ${limit.key} as the limit, got ${characteristic.key}`)
  }
  const value = characteristic?.value ?? null
  const expandedUncertainty = characteristic?.expandedUncertainty ?? null
  const { key, lower, upper, unit } = limit
  const base = { key, value, expandedUncertainty, lower, upper, unit, class: limit.class }
  if (!characteristic || value === null) {
    return { ...base, verdict: null, probabilityOfConformity: null, reason: notStatedReason(limit, characteristic) }
  }
  if (characteristic.unit !== unit) throw new RangeError(`judgeCharacteristic: ${key} must be in ${unit} as its limit, got ${characteristic.unit}`)
  requireFigures('judgeCharacteristic', value, expandedUncertainty, lower, upper)
  const ratio = rule.kind === 'simple' ? 0 : rule.ratio
  const needsUncertainty = ratio > 0 && expandedUncertainty === null
  const guardBand = ratio * (expandedUncertainty ?? 0)
  const judged = verdictOf(value, limit, guardBand, rule)
  const verdict = !needsUncertainty || !isWithin(value, lower, upper, 0) ? judged : null
  const probability = expandedUncertainty === null ? null : probabilityOfConformity(value, expandedUncertainty, lower, upper)
  const reason = reasonFor({ row: { value, expandedUncertainty, lower, upper, unit }, verdict, guardBand })
  return { ...base, verdict, probabilityOfConformity: probability, reason }
}
