import { describeCharacteristic } from '#shared/compute/judging/characteristics'
import type { DecisionRule, InspectionLevel, LimitSheetContent, NonconformityClass, SamplingScheme } from '#shared/compute/terms/judgement'
import type { RippleDefinition } from '#shared/compute/terms/measurement'

/** A limit as typed: in the unit shown (mN·m, %, °, or a plain number). */
export interface LimitRow { key: string; lower: number | null; upper: number | null; class: NonconformityClass }

/** A limit sheet as its form holds it. */
export interface SheetForm {
  rows: LimitRow[]
  rippleDefinition: RippleDefinition
  highestOrder: number | null
  rule: DecisionRule['kind']
  ratio: number
  scheme: SamplingScheme['kind']
  level: InspectionLevel
  aql: Record<NonconformityClass, string>
  limitingQualityPercent: number
  consumerRisk: number
  n: number
  bothDirections: boolean
  temperature: boolean
  compensated: boolean
  entries: number
  stepMilli: number
}

/** Stored unit × factor = unit of the form. */
function factorOf(key: string): number {
  return { 'mN·m': 1e3, '%': 1, '': 1, '°': 180 / Math.PI }[describeCharacteristic(key).displayUnit]
}

const clean = (value: number) => Number(value.toPrecision(12))
const shown = (value: number | null, key: string) => value === null ? null : clean(value * factorOf(key))
const stored = (value: unknown, key: string) => typeof value === 'number' && Number.isFinite(value) ? clean(value / factorOf(key)) : null

/** The form of a sheet's content. */
export function toForm(content: LimitSheetContent): SheetForm {
  const { sampling, decisionRule, compensation } = content
  return {
    rows: content.limits.map(limit => ({ key: limit.key, lower: shown(limit.lower, limit.key), upper: shown(limit.upper, limit.key), class: limit.class })),
    rippleDefinition: content.rippleDefinition, highestOrder: content.highestOrder, rule: decisionRule.kind, ratio: decisionRule.kind === 'simple' ? 1 : decisionRule.ratio, scheme: sampling.kind,
    level: sampling.kind === 'attributes' ? sampling.level : 'II',
    aql: { critical: '', major: '', minor: '', ...(sampling.kind === 'attributes' ? sampling.aql : {}) },
    limitingQualityPercent: sampling.kind === 'zero-acceptance' ? sampling.limitingQualityPercent : 10, consumerRisk: sampling.kind === 'zero-acceptance' ? sampling.consumerRisk : 0.1, n: sampling.kind === 'fixed' ? sampling.n : 5,
    bothDirections: content.requires.bothDirections, temperature: content.requires.temperature,
    compensated: compensation !== null, entries: compensation?.entries ?? 1024, stepMilli: clean((compensation?.stepNm ?? 5e-5) * 1e3),
  }
}

/** The content that a form stands for; what is impossible in it is left to the contract to say. */
export function fromForm(form: SheetForm): LimitSheetContent {
  return {
    rippleDefinition: form.rippleDefinition,
    highestOrder: typeof form.highestOrder === 'number' ? form.highestOrder : null,
    limits: form.rows.map(row => ({ key: row.key, lower: stored(row.lower, row.key), upper: stored(row.upper, row.key), unit: describeCharacteristic(row.key).unit, class: row.class })),
    decisionRule: form.rule === 'simple' ? { kind: 'simple' } : { kind: form.rule, ratio: form.ratio },
    sampling: schemeOf(form),
    requires: { bothDirections: form.bothDirections, temperature: form.temperature },
    compensation: form.compensated ? { entries: form.entries, stepNm: clean(form.stepMilli / 1e3) } : null,
  }
}

function schemeOf(form: SheetForm): SamplingScheme {
  switch (form.scheme) {
    case 'attributes': return { kind: 'attributes', level: form.level, aql: Object.fromEntries(Object.entries(form.aql).filter(([, aql]) => aql !== '')) }
    case 'zero-acceptance': return { kind: 'zero-acceptance', limitingQualityPercent: form.limitingQualityPercent, consumerRisk: form.consumerRisk }
    case 'fixed': return { kind: 'fixed', n: form.n }
    case 'every': return { kind: 'every' }
  }
}

export const RIPPLE_WORDS: Record<RippleDefinition, string> = {
  peakToPeakOverRated: 'peak to peak ÷ rated torque', halfPeakToPeakOverRated: 'half of peak to peak ÷ rated torque', rmsOverRated: 'RMS ÷ rated torque', peakToPeakOverMean: 'under load: peak to peak ÷ mean',
  halfPeakToPeakOverMean: 'under load: half of peak to peak ÷ mean', maxMinusMinOverMaxPlusMin: 'under load: (max − min) ÷ (max + min)', largestDeviationOverMean: 'under load: largest deviation ÷ mean', rmsOverMean: 'under load: RMS ÷ mean',
}
