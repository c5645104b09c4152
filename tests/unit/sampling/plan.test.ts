import { describe, expect, it } from 'vitest'
import { makePlan, zeroAcceptanceSampleSize } from '#shared/compute/sampling/plan'
import { AQL_VALUES, INSPECTION_LEVELS, LOT_SIZE_RANGE_ENDS } from '#shared/compute/sampling/tables'
import type { InspectionLevel, SamplingPlan, SamplingScheme, Severity } from '#shared/compute/terms/judgement'
import { hypergeometricCumulative } from '#shared/compute/statistics/discrete'
import { nextWord } from '#shared/compute/sampling/draw'
import type { GeneratorState } from '#shared/compute/sampling/draw'
import reference from '../../reference/attributes-sampling.json'

const SEVERITIES: Severity[] = ['normal', 'tightened', 'reduced']
const byAttributes = (level: InspectionLevel, aql: string): SamplingScheme => ({ kind: 'attributes', level, aql: { major: aql } })
const plain = (text: string): string => text.replaceAll('\u00A0', ' ')

function expectSound(plan: SamplingPlan): void {
  const where = `${plan.lotSize} ${plan.codeLetter} ${plan.severity} ${JSON.stringify(plan.scheme)}`
  if (!(plan.n >= 1 && plan.n <= plan.lotSize)) throw new Error(`n out of range: ${where}`)
  if (Math.max(...plan.classes.map(row => row.n)) !== plan.n) throw new Error(`no class uses the whole sample: ${where}`)
  for (const row of plan.classes) if (!(row.ac >= 0 && row.ac < row.re)) throw new Error(`Ac and Re: ${where}`)
}

describe('makePlan by attributes', () => {
  // Source: MIL-STD-105E tables; worked lookups in tests/reference/attributes-sampling.json.
  const lookups = reference.cases.find(each => each.id === 'lookups-open')!.cases!
  it.each(lookups)('gives the looked-up plan for lot $inputs.lot, level $inputs.level, AQL $inputs.aql, $inputs.severity', ({ inputs, expected }) => {
    const plan = makePlan({
      lotSize: inputs.lot, severity: inputs.severity as Severity, scheme: byAttributes(inputs.level as InspectionLevel, inputs.aql),
    })
    expect(plan.codeLetter).toBe(expected.letter)
    expect(plan.classes).toEqual([{ class: 'major', aql: inputs.aql, n: expected.n, ac: expected.ac, re: expected.re }])
    expect(plan.n).toBe(expected.n)
  })

  it('agrees with the worked examples of the textbooks (plan-L-1.5; Montgomery, ch. 15, from memory)', () => {
    const numbers = (lotSize: number, aql: string, severity: Severity) => {
      const row = makePlan({ lotSize, severity, scheme: byAttributes('II', aql) }).classes[0]!
      return [row.n, row.ac, row.re]
    }
    expect(numbers(5000, '1.5', 'normal')).toEqual([200, 7, 8])
    expect(numbers(5000, '1.5', 'tightened')).toEqual([200, 5, 6])
    expect(numbers(2000, '0.65', 'normal')).toEqual([125, 2, 3])
    expect(numbers(2000, '0.65', 'tightened')).toEqual([125, 1, 2])
    expect(numbers(2000, '0.65', 'reduced')).toEqual([50, 1, 3])
  })

  it('judges each class over its own first motors and draws the largest sample', () => {
    const plan = makePlan({
      lotSize: 1200, severity: 'normal', scheme: { kind: 'attributes', level: 'II', aql: { critical: '0.10', major: '1.0', minor: '4.0' } },
    })
    expect(plan.n).toBe(125)
    expect(plan.classes).toEqual([
      { class: 'critical', aql: '0.10', n: 125, ac: 0, re: 1 },
      { class: 'major', aql: '1.0', n: 80, ac: 2, re: 3 },
      { class: 'minor', aql: '4.0', n: 80, ac: 7, re: 8 },
    ])
  })

  it('accepts a limited class without AQL on 0 over the whole sample', () => {
    const plan = makePlan({ lotSize: 1200, severity: 'normal', scheme: byAttributes('II', '2.5'), limited: ['critical', 'major'] })
    expect(plan.classes[0]).toEqual({ class: 'critical', aql: null, n: 80, ac: 0, re: 1 })
    expect(plan.sentence).toContain('Any motor with a critical nonconformity rejects the lot.')
  })

  it('keeps n ≤ N and Ac < Re at every edge of the lot sizes with both neighbours, every level, AQL and severity', () => {
    const sizes = new Set([1, 2, 3])
    for (const last of LOT_SIZE_RANGE_ENDS) if (Number.isFinite(last)) for (const size of [last - 1, last, last + 1, last + 2]) sizes.add(size)
    let plans = 0
    for (const lotSize of sizes) {
      for (const level of INSPECTION_LEVELS) {
        for (const aql of AQL_VALUES) {
          for (const severity of SEVERITIES) {
            expectSound(makePlan({ lotSize, severity, scheme: byAttributes(level, aql) }))
            plans++
          }
        }
      }
    }
    expect(plans).toBe(sizes.size * 7 * 26 * 3)
  })

  it('keeps n ≤ N and Ac < Re for 3 000 random lots', () => {
    const state: GeneratorState = [1, 2, 3, 4]
    const pick = <T>(from: readonly T[]): T => from[nextWord(state) % from.length]!
    for (let i = 0; i < 3000; i++) {
      const lotSize = 1 + (nextWord(state) % 10 ** (1 + (nextWord(state) % 6)))
      const aql = { major: pick(AQL_VALUES), minor: pick(AQL_VALUES) }
      expectSound(makePlan({ lotSize, severity: pick(SEVERITIES), scheme: { kind: 'attributes', level: pick(INSPECTION_LEVELS), aql } }))
    }
    expect(state).not.toEqual([1, 2, 3, 4])
  })

  it('is never easier on tightened than on normal inspection: no larger Ac for the same n', () => {
    for (const aql of AQL_VALUES) {
      for (const lotSize of [50, 500, 5000, 50_000]) {
        const row = (severity: Severity) => makePlan({ lotSize, severity, scheme: byAttributes('II', aql) }).classes[0]!
        const [normal, tightened] = [row('normal'), row('tightened')]
        if (normal.n === tightened.n) expect(tightened.ac).toBeLessThanOrEqual(normal.ac)
        else expect(tightened.ac / tightened.n).toBeLessThanOrEqual(normal.ac / normal.n + 1e-12)
      }
    }
  })

  it.each([0, -3, 1.5, Number.NaN, Infinity])('refuses a lot size of %s', (lotSize) => {
    expect(() => makePlan({ lotSize, severity: 'normal', scheme: { kind: 'every' } })).toThrow(RangeError)
  })

  it('refuses a scheme without any AQL', () => {
    expect(() => makePlan({ lotSize: 100, severity: 'normal', scheme: { kind: 'attributes', level: 'II', aql: {} } })).toThrow(/at least one class/)
  })
})

describe('makePlan with the other schemes', () => {
  it.each([
    // Source: exact hypergeometric distribution (checked with scipy).
    [100, 5, 0.1, 37], [500, 5, 0.1, 43], [50, 4, 0.05, 39],
  ])('draws the smallest zero-acceptance sample: N %d, %d %%, risk %d → %d', (lotSize, limitingQualityPercent, consumerRisk, n) => {
    const plan = makePlan({ lotSize, severity: 'normal', scheme: { kind: 'zero-acceptance', limitingQualityPercent, consumerRisk } })
    expect(plan.n).toBe(n)
    expect(plan.classes.map(row => [row.ac, row.re])).toEqual([[0, 1], [0, 1], [0, 1]])
    const marked = (lotSize * limitingQualityPercent) / 100
    expect(hypergeometricCumulative(0, lotSize, marked, n)).toBeLessThanOrEqual(consumerRisk)
    expect(hypergeometricCumulative(0, lotSize, marked, n - 1)).toBeGreaterThan(consumerRisk)
  })

  it('counts 0.1 % of 3 000 as three motors, not four', () => {
    expect(zeroAcceptanceSampleSize(3000, 0.1, 0.1)).toBeGreaterThan(zeroAcceptanceSampleSize(3000, 0.12, 0.1))
  })

  it.each([[0, 0.1], [100.1, 0.1], [5, 0], [5, 1], [Number.NaN, 0.1]])('refuses limiting quality %s %% with risk %s', (quality, risk) => {
    expect(() => zeroAcceptanceSampleSize(100, quality, risk)).toThrow(RangeError)
  })

  it('measures the whole lot when the scheme is every motor', () => {
    const plan = makePlan({ lotSize: 7, severity: 'tightened', scheme: { kind: 'every' }, limited: ['major'] })
    expect([plan.n, plan.classes]).toEqual([7, [{ class: 'major', aql: null, n: 7, ac: 0, re: 1 }]])
  })

  it.each([[4, 4], [5, 5], [6, 5]])('draws a fixed sample of %d from five motors as %d', (n, drawn) => {
    expect(makePlan({ lotSize: 5, severity: 'normal', scheme: { kind: 'fixed', n } }).n).toBe(drawn)
  })

  it('refuses a fixed sample of 0', () => {
    expect(() => makePlan({ lotSize: 5, severity: 'normal', scheme: { kind: 'fixed', n: 0 } })).toThrow(/scheme.n/)
  })
})

describe('the sentence of a plan', () => {
  it('names draw, numbers, severity, level and AQL', () => {
    const plan = makePlan({ lotSize: 1200, severity: 'normal', scheme: byAttributes('I', '2.5') })
    expect(plain(plan.sentence)).toBe('Draw 32 of 1 200. Accept on 2, reject on 3. Normal inspection, level I, AQL 2.5.')
    expect(plan.sentence).toContain('1\u00A0200')
  })

  it('says so when the sample of the table is larger than the lot', () => {
    const plan = makePlan({ lotSize: 22, severity: 'reduced', scheme: byAttributes('II', '0.015') })
    expect(plan.sentence).toBe('Measure all 22: the plan\'s sample of 315 is larger than the lot. Accept on 0, reject on 1. Reduced inspection, level II, AQL 0.015.')
  })

  it('names each class when the AQLs differ', () => {
    const scheme: SamplingScheme = { kind: 'attributes', level: 'II', aql: { critical: '0.10', major: '1.0', minor: '4.0' } }
    expect(plain(makePlan({ lotSize: 1200, severity: 'tightened', scheme }).sentence)).toBe(
      'Draw 200 of 1 200. Critical (AQL 0.10): accept on 0, reject on 1. Major (AQL 1.0, first 80 drawn): accept on 1, reject on 2. '
      + 'Minor (AQL 4.0, first 80 drawn): accept on 5, reject on 6. Tightened inspection, level II.')
  })

  it.each<[SamplingScheme, string]>([
    [{ kind: 'zero-acceptance', limitingQualityPercent: 5, consumerRisk: 0.1 },
      'Draw 43 of 500. Accept on 0, reject on 1. Zero acceptance number: a lot with 5 % nonconforming passes at most 10 times in 100.'],
    [{ kind: 'every' }, 'Measure all 500. Accept on 0, reject on 1. Every motor is measured.'],
    [{ kind: 'fixed', n: 5 }, 'Draw 5 of 500. Accept on 0, reject on 1. Sample of fixed size.'],
  ])('says scheme %j in words', (scheme, sentence) => {
    expect(makePlan({ lotSize: 500, severity: 'normal', scheme }).sentence).toBe(sentence)
  })
})
