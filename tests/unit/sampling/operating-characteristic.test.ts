import { describe, expect, it } from 'vitest'
import {
  operatingCharacteristic, probabilityOfAcceptance, probabilityOfAcceptanceOfLot, qualityAccepted, risksOf,
} from '#shared/compute/sampling/operating-characteristic'
import { makePlan } from '#shared/compute/sampling/plan'
import { AQL_VALUES, LARGEST_AQL_OF_NONCONFORMING_ITEMS } from '#shared/compute/sampling/tables'
// Each case in the file carries its source.
import reference from '../../reference/attributes-sampling.json'

const caseOf = (id: string) => reference.cases.find(each => each.id === id)!

describe('probabilityOfAcceptance', () => {
  it('gives the values of the published vignette for n = 20, Ac = 0 (J. Stat. Software 26(6), 2008)', () => {
    expect(probabilityOfAcceptance({ n: 20, re: 1 }, 0.05)).toBeCloseTo(0.358486, 6)
    expect(probabilityOfAcceptance({ n: 20, re: 1 }, 0.15)).toBeCloseTo(0.03876, 6)
  })

  it('meets both risks of the published plan n = 80, c = 7, and fails one when either number moves', () => {
    const meets = (n: number, c: number) =>
      probabilityOfAcceptance({ n, re: c + 1 }, 0.05) >= 0.95 && probabilityOfAcceptance({ n, re: c + 1 }, 0.15) <= 0.075
    expect([meets(80, 7), meets(79, 7), meets(80, 6)]).toEqual([true, false, false])
  })

  it('falls, or stays, as the fraction nonconforming rises, for every AQL of nonconforming items', () => {
    for (const aql of AQL_VALUES.filter(each => Number(each) <= LARGEST_AQL_OF_NONCONFORMING_ITEMS)) {
      const plan = makePlan({ lotSize: 5000, severity: 'normal', scheme: { kind: 'attributes', level: 'II', aql: { major: aql } } })
      const curve = operatingCharacteristic(plan.classes[0]!, Array.from({ length: 101 }, (_, i) => i / 100))
      expect(curve[0]!.probability).toBe(1)
      expect(curve.at(-1)!.probability).toBe(0)
      for (let i = 1; i < curve.length; i++) expect(curve[i]!.probability).toBeLessThanOrEqual(curve[i - 1]!.probability + 1e-14)
    }
  })

  it.each([[0, 1, 0.5], [5, 0, 0.5], [5, 1, -0.01], [5, 1, 1.01]])('refuses n = %s, re = %s, fraction %s', (n, re, fraction) => {
    expect(() => probabilityOfAcceptance({ n, re }, fraction)).toThrow(RangeError)
  })
})

describe('qualityAccepted', () => {
  // Source: MIL-STD-105E, Table X-J-1, row AQL 1.0 (from memory), recomputed with scipy.
  const { exact, expected_p_percent: printed } = caseOf('oc-J-1.0') as unknown as { exact: Record<string, number>; expected_p_percent: Record<string, number> }
  it.each(Object.entries(exact))('finds the quality accepted %s times in 100 by n = 80, Ac = 2: %d %%', (percent, quality) => {
    const found = 100 * qualityAccepted({ n: 80, re: 3 }, Number(percent) / 100)
    expect(found).toBeCloseTo(quality, 5)
    expect(Math.abs(found / printed[percent]! - 1)).toBeLessThan(0.005)
  })

  it.each([0, 1, -0.1, Number.NaN])('refuses a chance of %s', (probability) => {
    expect(() => qualityAccepted({ n: 80, re: 3 }, probability)).toThrow(RangeError)
  })

  it('refuses a plan that never rejects', () => {
    expect(() => qualityAccepted({ n: 2, re: 3 }, 0.5)).toThrow(/re must be from 1 to n/)
  })
})

describe('probabilityOfAcceptanceOfLot', () => {
  const cases = ['hypergeom-N50-n5-c1', 'hypergeom-N100-n13-c0', 'hypergeom-N40-n5-c0'].flatMap((id) => {
    const { inputs, expected_pa_by_D: byCount } = caseOf(id) as unknown as { inputs: { N: number; n: number; c: number }; expected_pa_by_D: Record<string, number> }
    return Object.entries(byCount).map(([marked, probability]) => ({ ...inputs, D: Number(marked), probability }))
  })
  it.each(cases)('gives $probability for N = $N, D = $D, n = $n, Ac = $c', ({ N, n, c, D, probability }) => {
    expect(probabilityOfAcceptanceOfLot({ n, re: c + 1 }, N, D)).toBeCloseTo(probability, 9)
  })
})

describe('risksOf', () => {
  it('gives both risks of a plan by AQL', () => {
    const row = makePlan({ lotSize: 1000, severity: 'normal', scheme: { kind: 'attributes', level: 'II', aql: { major: '1.0' } } }).classes[0]!
    const risks = risksOf(row)
    expect(risks.producerRiskAtAql).toBeCloseTo(1 - 0.9533, 3)
    expect(risks.limitingQuality).toBeCloseTo(0.06516, 5)
  })

  it('states no producer risk without AQL and no limiting quality where nothing is rejected', () => {
    expect(risksOf({ class: 'major', aql: null, n: 5, ac: 0, re: 1 }).producerRiskAtAql).toBeNull()
    expect(risksOf({ class: 'major', aql: '150', n: 2, ac: 5, re: 6 })).toEqual({ producerRiskAtAql: null, limitingQuality: null })
  })
})
