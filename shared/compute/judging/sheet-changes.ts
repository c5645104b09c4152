import type { DecisionRule, Limit, LimitSheetContent, SamplingScheme } from '../terms/judgement'
import { describeCharacteristic } from './characteristics'
import { formatRow, joinQuantity } from './quantities'

/**
 * What changed between two limit sheets, one phrase a change: "Order 24: at most 0.900 → at most 0.600 mN·m".
 *
 * @param before earlier sheet, or null for the first one.
 * @param after later sheet.
 * @returns phrases in the order limits, rule, sampling, the rest; empty when nothing differs.
 */
export function describeSheetChanges(before: LimitSheetContent | null, after: LimitSheetContent): string[] {
  if (before === null) return ['First sheet of this part']
  return [
    ...limitChanges(before.limits, after.limits),
    ...phrase('Decision rule', ruleText(before.decisionRule), ruleText(after.decisionRule)),
    ...phrase('Sampling', schemeText(before.sampling), schemeText(after.sampling)),
    ...phrase('Ripple ratio', before.rippleDefinition, after.rippleDefinition),
    ...phrase('Highest order', String(before.highestOrder ?? 'by the part'), String(after.highestOrder ?? 'by the part')),
    ...phrase('Both directions', before.requires.bothDirections ? 'demanded' : 'not demanded', after.requires.bothDirections ? 'demanded' : 'not demanded'),
    ...phrase('Temperature', before.requires.temperature ? 'demanded' : 'not demanded', after.requires.temperature ? 'demanded' : 'not demanded'),
    ...phrase('Compensation', compensationText(before), compensationText(after)),
  ]
}

function phrase(what: string, before: string, after: string): string[] {
  return before === after ? [] : [`${what}: ${before} → ${after}`]
}

function limitChanges(before: readonly Limit[], after: readonly Limit[]): string[] {
  const earlier = new Map(before.map(limit => [limit.key, limit]))
  const later = new Set(after.map(limit => limit.key))
  const changed = after.flatMap((limit) => {
    const { label } = describeCharacteristic(limit.key)
    const old = earlier.get(limit.key)
    return old ? [...phrase(label, limitText(old), limitText(limit)), ...phrase(`${label}, class`, old.class, limit.class)] : [`${label}: new, ${limitText(limit)}, ${limit.class}`]
  })
  const removed = before.filter(limit => !later.has(limit.key)).map(limit => `${describeCharacteristic(limit.key).label}: no longer limited (was ${limitText(limit)})`)
  return [...changed, ...removed]
}

/** "at most 5.40 mN·m", "from 1.00 to 2.00 mN·m". */
export function limitText(limit: Pick<Limit, 'lower' | 'upper' | 'unit'>): string {
  const row = formatRow({ value: null, expandedUncertainty: null, lower: limit.lower, upper: limit.upper, unit: limit.unit })
  if (row.lower !== null && row.upper !== null) return `from ${row.lower} to ${joinQuantity(row.upper, row.unit)}`
  return row.upper === null ? `at least ${joinQuantity(row.lower!, row.unit)}` : `at most ${joinQuantity(row.upper, row.unit)}`
}

function ruleText(rule: DecisionRule): string {
  return rule.kind === 'simple' ? 'simple' : `${rule.kind === 'guard-band' ? 'guard band' : 'four-way'}, ${rule.ratio} × U`
}

function schemeText(scheme: SamplingScheme): string {
  switch (scheme.kind) {
    case 'attributes':
      return `by attributes, level ${scheme.level}, ${Object.entries(scheme.aql).map(([name, aql]) => `${name} AQL ${aql}`).join(', ')}`
    case 'zero-acceptance':
      return `zero acceptance number, limiting quality ${scheme.limitingQualityPercent} %, consumer’s risk ${scheme.consumerRisk}`
    case 'every':
      return 'every motor'
    case 'fixed':
      return `${scheme.n} motors`
  }
}

function compensationText(sheet: LimitSheetContent): string {
  return sheet.compensation ? `${sheet.compensation.entries} entries, step ${joinQuantity(String(Number((sheet.compensation.stepNm * 1e3).toPrecision(6))), 'mN·m')}` : 'none'
}
