import type { SamplingPlan } from '../terms/judgement'
import { binomialCumulative, hypergeometricCumulative } from '../statistics/discrete'

/** The part of a plan on which its chances depend; acceptance means fewer than `re` nonconforming. */
export interface CountPlan {
  n: number
  re: number
}

/**
 * Chance that lots from a process with a given fraction nonconforming are accepted (type B):
 * P = Σ_{x<Re} C(n,x) pˣ (1−p)ⁿ⁻ˣ. It holds for finite lots too when these are themselves random from the process.
 * Between Ac and Re of a reduced plan the lot is accepted, hence Re.
 *
 * @param plan sample size n ≥ 1 and rejection number re ≥ 1
 * @param fraction fraction nonconforming of the process, 0…1
 * @returns probability, 0…1
 * @throws RangeError outside these domains
 * Source: MIL-STD-105E, Table X (binomial for AQL ≤ 10); ISO 2859-1.
 */
export function probabilityOfAcceptance(plan: CountPlan, fraction: number): number {
  requirePlan('probabilityOfAcceptance', plan)
  return binomialCumulative(plan.re - 1, plan.n, fraction)
}

/**
 * Chance that one lot with a known number of nonconforming items is accepted (type A):
 * P = Σ_{x<Re} C(D,x) C(N−D,n−x) / C(N,n).
 *
 * @param plan sample size n, 1…lotSize, and rejection number re ≥ 1
 * @param lotSize N, whole, ≥ 1
 * @param nonconforming D, whole, 0…N
 * @returns probability, 0…1
 * @throws RangeError outside these domains
 */
export function probabilityOfAcceptanceOfLot(plan: CountPlan, lotSize: number, nonconforming: number): number {
  requirePlan('probabilityOfAcceptanceOfLot', plan)
  return hypergeometricCumulative(plan.re - 1, lotSize, nonconforming, plan.n)
}

/**
 * The fraction nonconforming that is accepted with a given chance: the inverse of `probabilityOfAcceptance`.
 *
 * @param plan sample size n ≥ 1 and rejection number re, 1…n (above n nothing is ever rejected)
 * @param probability chance of acceptance, strictly between 0 and 1
 * @returns fraction nonconforming, 0…1, to 1e-12
 * @throws RangeError outside these domains
 */
export function qualityAccepted(plan: CountPlan, probability: number): number {
  requirePlan('qualityAccepted', plan)
  if (plan.re > plan.n) throw new RangeError(`qualityAccepted: re must be from 1 to n = ${plan.n}, got ${plan.re}`)
  if (!(probability > 0 && probability < 1)) {
    throw new RangeError(`qualityAccepted: probability must lie between 0 and 1, got ${probability}`)
  }
  let low = 0
  let high = 1
  while (high - low > 1e-12) {
    const middle = (low + high) / 2
    if (probabilityOfAcceptance(plan, middle) > probability) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/** One point of an operating characteristic curve, both 0…1. */
export interface OperatingPoint {
  fraction: number
  probability: number
}

/**
 * Operating characteristic curve of a plan: chance of acceptance at each fraction nonconforming. With several
 * classes this is the curve of one class alone, the others being perfect.
 *
 * @param plan sample size and rejection number
 * @param fractions fractions nonconforming, each 0…1
 * @returns one point a fraction, in the same order
 * @throws RangeError outside these domains
 */
export function operatingCharacteristic(plan: CountPlan, fractions: readonly number[]): OperatingPoint[] {
  return fractions.map(fraction => ({ fraction, probability: probabilityOfAcceptance(plan, fraction) }))
}

/** Risks of one class of a plan, 0…1. */
export interface Risks {
  /** Chance that a supplier exactly at the AQL is rejected; null without AQL. */
  producerRiskAtAql: number | null
  /** Fraction nonconforming that is still accepted in one lot of ten; null when nothing is ever rejected. */
  limitingQuality: number | null
}

/**
 * Producer's and consumer's risk of one class row of a plan.
 *
 * @param row row of `SamplingPlan.classes`
 * @returns risks; the limiting quality is that of 10 % acceptance
 * @throws RangeError when the row is not a plan
 */
export function risksOf(row: SamplingPlan['classes'][number]): Risks {
  const aql = row.aql === null ? null : Number(row.aql)
  return {
    producerRiskAtAql: aql === null || aql > 100 ? null : 1 - probabilityOfAcceptance(row, aql / 100),
    limitingQuality: row.re > row.n ? null : qualityAccepted(row, 0.1),
  }
}

function requirePlan(name: string, plan: CountPlan): void {
  if (!Number.isInteger(plan.n) || plan.n < 1) throw new RangeError(`${name}: n must be a whole number ≥ 1, got ${plan.n}`)
  if (!Number.isInteger(plan.re) || plan.re < 1) throw new RangeError(`${name}: re must be a whole number ≥ 1, got ${plan.re}`)
}
