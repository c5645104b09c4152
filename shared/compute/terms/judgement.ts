import type { CharacteristicUnit, CompensationSettings, RippleDefinition } from './measurement'

export type NonconformityClass = 'critical' | 'major' | 'minor'

/** One limited characteristic of a limit sheet. */
export interface Limit {
  /** Characteristic key. */
  key: string
  lower: number | null
  upper: number | null
  /** Unit of the limits; same as the characteristic's. */
  unit: CharacteristicUnit
  class: NonconformityClass
}

export type DecisionRule =
  | { kind: 'simple' }
  /** Accept only inside the limit less ratio × U. */
  | { kind: 'guard-band'; ratio: number }
  /** Pass, conditional pass, conditional fail, fail, with guard band ratio × U on both sides of the limit. */
  | { kind: 'four-way'; ratio: number }

export type Verdict = 'pass' | 'conditional-pass' | 'conditional-fail' | 'fail'

export interface CharacteristicVerdict {
  key: string
  value: number | null
  expandedUncertainty: number | null
  lower: number | null
  upper: number | null
  unit: CharacteristicUnit
  class: NonconformityClass
  /** null: cannot be judged (value not stated). */
  verdict: Verdict | null
  /** Probability that the true value conforms (JCGM 106, normal), 0…1; null when no uncertainty is stated. */
  probabilityOfConformity: number | null
  /** Why it came out so, for people. */
  reason: string
}

export interface MotorVerdict {
  /** null: at least one limit cannot be judged and none fails. */
  verdict: Verdict | null
  characteristics: CharacteristicVerdict[]
  /** Classes in which the motor is nonconforming. */
  nonconformingClasses: NonconformityClass[]
}

export type InspectionLevel = 'S-1' | 'S-2' | 'S-3' | 'S-4' | 'I' | 'II' | 'III'
export type Severity = 'normal' | 'tightened' | 'reduced'

export type SamplingScheme =
  /** AQL as printed in the table ("2.5"), per class; a class without AQL is not limited by count and any nonconforming motor rejects. */
  | { kind: 'attributes'; level: InspectionLevel; aql: Partial<Record<NonconformityClass, string>> }
  | { kind: 'zero-acceptance'; limitingQualityPercent: number; consumerRisk: number }
  | { kind: 'every' }
  | { kind: 'fixed'; n: number }

/** What is drawn and when the lot is accepted. */
export interface SamplingPlan {
  lotSize: number
  scheme: SamplingScheme
  severity: Severity
  codeLetter: string | null
  /** Motors drawn. */
  n: number
  /** One row a class; the class is judged over the first `n` motors of the draw. */
  classes: { class: NonconformityClass; aql: string | null; n: number; ac: number; re: number }[]
  /** The plan in one sentence. */
  sentence: string
}

/** What a limit sheet holds besides its number and people. */
export interface LimitSheetContent {
  rippleDefinition: RippleDefinition
  highestOrder: number | null
  limits: Limit[]
  decisionRule: DecisionRule
  sampling: SamplingScheme
  requires: { bothDirections: boolean; temperature: boolean }
  compensation: CompensationSettings | null
}

export interface LotVerdict {
  /** 'open' while the plan can still go either way. */
  outcome: 'open' | 'accept' | 'reject'
  /** All motors of the sample judged. */
  complete: boolean
  judged: number
  classes: { class: NonconformityClass; nonconforming: number; ac: number; re: number; outcome: 'open' | 'accept' | 'reject' }[]
  /** One or two sentences for people. */
  sentence: string
  /** Reduced inspection, count between Ac and Re: accepted, but the next lot is inspected normally. */
  returnToNormal: boolean
}
