import type { SamplingPlan } from '../terms/judgement'
import { capitalise, formatCount, joinWords } from './wording'

type Plan = Omit<SamplingPlan, 'sentence'>
type ClassRow = SamplingPlan['classes'][number]

const numbers = (row: { ac: number; re: number }): string => `accept on ${row.ac}, reject on ${row.re}`

function drawing(plan: Plan, tableN: number): string {
  if (plan.n < plan.lotSize) return `Draw ${formatCount(plan.n)} of ${formatCount(plan.lotSize)}.`
  const all = plan.lotSize === 1 ? 'Measure the only motor of the lot' : `Measure all ${formatCount(plan.lotSize)}`
  return tableN > plan.lotSize ? `${all}: the plan's sample of ${formatCount(tableN)} is larger than the lot.` : `${all}.`
}

/** Classes of one plan share a part of the sentence; a part says over how many motors when these are fewer than drawn. */
function perClass(plan: Plan, rows: readonly ClassRow[]): string {
  const groups = new Map<string, ClassRow[]>()
  for (const row of rows) {
    const key = [row.aql, row.n, row.ac, row.re].join()
    groups.set(key, [...(groups.get(key) ?? []), row])
  }
  return [...groups.values()].map((group) => {
    const row = group[0]!
    const over = row.n < plan.n ? `, first ${formatCount(row.n)} drawn` : ''
    return `${capitalise(joinWords(group.map(each => each.class)))} (AQL ${row.aql}${over}): ${numbers(row)}.`
  }).join(' ')
}

function attributes(plan: Plan, level: string): string {
  const rows = plan.classes.filter(row => row.aql !== null)
  const first = rows[0]!
  const inspection = `${capitalise(plan.severity)} inspection, level ${level}`
  const uniform = rows.every(row => row.aql === first.aql)
  const middle = uniform ? `${capitalise(numbers(first))}.` : perClass(plan, rows)
  const end = uniform ? `${inspection}, AQL ${first.aql}.` : `${inspection}.`
  const others = plan.classes.filter(row => row.aql === null).map(row => row.class)
  const zero = others.length === 0 ? '' : ` Any motor with a ${joinWords(others).replace(' and ', ' or ')} nonconformity rejects the lot.`
  return `${middle} ${end}${zero}`
}

/**
 * A plan in words: "Draw 32 of 1 200. Accept on 2, reject on 3. Normal inspection, level II, AQL 2.5."
 *
 * @param plan plan without its sentence
 * @param tableN sample size before it was cut to the lot
 * @returns one to five short sentences; with several AQLs each class is named
 */
export function planSentence(plan: Plan, tableN: number): string {
  const start = drawing(plan, tableN)
  const { scheme } = plan
  switch (scheme.kind) {
    case 'attributes':
      return `${start} ${attributes(plan, scheme.level)}`
    case 'zero-acceptance':
      return `${start} Accept on 0, reject on 1. Zero acceptance number: a lot with ${scheme.limitingQualityPercent} % nonconforming `
        + `passes at most ${Number((scheme.consumerRisk * 100).toPrecision(6))} times in 100.`
    case 'every':
      return `${start} Accept on 0, reject on 1. Every motor is measured.`
    case 'fixed':
      return `${start} Accept on 0, reject on 1. Sample of fixed size.`
  }
}
