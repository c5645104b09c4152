import type { NonconformityClass, SamplingPlan, SamplingScheme, Severity } from '../terms/judgement'
import { hypergeometricCumulative } from '../statistics/discrete'
import { planSentence } from './plan-sentence'
import { codeLetter, tablePlan } from './tables'
import { NONCONFORMITY_CLASSES } from './wording'

type ClassRow = SamplingPlan['classes'][number]

/** What a plan is made from. */
export interface PlanRequest {
  /** Motors in the lot, whole, ≥ 1. */
  lotSize: number
  scheme: SamplingScheme
  severity: Severity
  /**
   * Classes that the sheet's limits use. A class without AQL among them gets acceptance number 0 over the whole
   * sample. Left out: the classes that have an AQL, or all three for the schemes without AQL.
   */
  limited?: readonly NonconformityClass[]
}

/**
 * The sampling plan of a lot: how many motors are drawn, and each class's acceptance and rejection number.
 *
 * By attributes, each class has the plan of its own AQL and is judged over the first `n` motors in draw order; the
 * whole sample is the largest of them. A sample as large as the lot, or larger, becomes 100 % inspection with the
 * table's numbers. The other schemes accept on 0 and do not depend on the severity.
 *
 * @param request lot size, scheme, severity and the classes limited
 * @returns the plan with its sentence; n ≤ lotSize and ac < re in every class
 * @throws RangeError for a lot size that is not a whole number ≥ 1, an AQL not in the tables, a scheme by attributes
 *   without any AQL, a limiting quality outside 0…100 %, a consumer's risk outside 0…1 or a fixed n below 1
 * Source: MIL-STD-105E, 4.9 and Tables I, II-A, II-B, II-C; ISO 2859-1.
 */
export function makePlan(request: PlanRequest): SamplingPlan {
  const { lotSize, scheme, severity } = request
  if (!Number.isSafeInteger(lotSize) || lotSize < 1) {
    throw new RangeError(`makePlan: lotSize must be a whole number ≥ 1, got ${lotSize}`)
  }
  const letter = scheme.kind === 'attributes' ? codeLetter(lotSize, scheme.level) : null
  const tableRows = letter === null || scheme.kind !== 'attributes' ? [] : attributeRows(scheme.aql, severity, letter)
  const tableN = scheme.kind === 'attributes' ? Math.max(...tableRows.map(row => row.n)) : sampleSize(lotSize, scheme)
  const n = Math.min(tableN, lotSize)
  const known = new Map(tableRows.map(row => [row.class, row]))
  const limited = request.limited ?? (scheme.kind === 'attributes' ? [] : NONCONFORMITY_CLASSES)
  const classes: ClassRow[] = []
  for (const name of NONCONFORMITY_CLASSES) {
    const row = known.get(name)
    if (row) classes.push({ ...row, n: Math.min(row.n, lotSize) })
    else if (limited.includes(name)) classes.push({ class: name, aql: null, n, ac: 0, re: 1 })
  }
  const plan = { lotSize, scheme, severity, codeLetter: letter, n, classes }
  return { ...plan, sentence: planSentence(plan, tableN) }
}

function attributeRows(
  aqls: Partial<Record<NonconformityClass, string>>, severity: Severity, letter: string,
): ClassRow[] {
  const rows: ClassRow[] = []
  for (const name of NONCONFORMITY_CLASSES) {
    const aql = aqls[name]
    if (aql === undefined) continue
    const { n, ac, re } = tablePlan(severity, letter, aql)
    rows.push({ class: name, aql, n, ac, re })
  }
  if (rows.length === 0) throw new RangeError('makePlan: scheme.aql must name an AQL for at least one class')
  return rows
}

function sampleSize(lotSize: number, scheme: Exclude<SamplingScheme, { kind: 'attributes' }>): number {
  if (scheme.kind === 'every') return lotSize
  if (scheme.kind === 'fixed') {
    if (!Number.isSafeInteger(scheme.n) || scheme.n < 1) {
      throw new RangeError(`makePlan: scheme.n must be a whole number ≥ 1, got ${scheme.n}`)
    }
    return scheme.n
  }
  return zeroAcceptanceSampleSize(lotSize, scheme.limitingQualityPercent, scheme.consumerRisk)
}

/**
 * Smallest sample that, accepted on 0, lets a lot at the limiting quality or worse pass with at most the stated risk:
 * smallest n with C(N−D, n)/C(N, n) ≤ β, where D is the smallest whole number with D/N ≥ the limiting quality.
 *
 * @param lotSize N, whole, ≥ 1
 * @param limitingQualityPercent percent nonconforming, above 0 up to 100
 * @param consumerRisk β, strictly between 0 and 1
 * @returns sample size, 1…N
 * @throws RangeError outside these domains
 * Source: exact hypergeometric distribution.
 */
export function zeroAcceptanceSampleSize(lotSize: number, limitingQualityPercent: number, consumerRisk: number): number {
  if (!Number.isSafeInteger(lotSize) || lotSize < 1) {
    throw new RangeError(`zeroAcceptanceSampleSize: lotSize must be a whole number ≥ 1, got ${lotSize}`)
  }
  if (!(limitingQualityPercent > 0 && limitingQualityPercent <= 100)) {
    throw new RangeError(`zeroAcceptanceSampleSize: limitingQualityPercent must be above 0 and at most 100, got ${limitingQualityPercent}`)
  }
  if (!(consumerRisk > 0 && consumerRisk < 1)) {
    throw new RangeError(`zeroAcceptanceSampleSize: consumerRisk must lie between 0 and 1, got ${consumerRisk}`)
  }
  // 0.1 % of 3 000 must be 3, not the 3.0000000000000004 of binary fractions.
  const marked = Math.max(1, Math.ceil((lotSize * limitingQualityPercent) / 100 - 1e-9))
  let low = 1
  let high = lotSize
  while (low < high) {
    const middle = Math.floor((low + high) / 2)
    if (hypergeometricCumulative(0, lotSize, marked, middle) <= consumerRisk) high = middle
    else low = middle + 1
  }
  return low
}
