import { describe, expect, it } from 'vitest'
import { judgeCharacteristic, probabilityOfConformity } from '#shared/compute/judging/characteristic-verdict'
import type { DecisionRule, Limit, Verdict } from '#shared/compute/terms/judgement'
import type { Characteristic } from '#shared/compute/terms/measurement'
// Each case in the file carries its source.
import reference from '../../reference/conformity.json'

const SIMPLE: DecisionRule = { kind: 'simple' }
const GUARDED: DecisionRule = { kind: 'guard-band', ratio: 1 }
const FOUR_WAY: DecisionRule = { kind: 'four-way', ratio: 1 }
const limit = (lower: number | null, upper: number | null): Limit => ({ key: 'cogging.peakToPeak', lower, upper, unit: 'N·m', class: 'major' })
const figure = (value: number | null, expandedUncertainty: number | null = null): Characteristic =>
  ({ key: 'cogging.peakToPeak', value, unit: 'N·m', expandedUncertainty })
const verdict = (bounds: Limit, value: number, rule: DecisionRule, uncertainty: number | null = null) =>
  judgeCharacteristic(bounds, figure(value, uncertainty), rule).verdict
const reason = (bounds: Limit, value: number, rule: DecisionRule, uncertainty: number | null = null) =>
  judgeCharacteristic(bounds, figure(value, uncertainty), rule).reason
/** Neighbouring double. */
const next = (value: number, direction: 1 | -1): number => value * (1 + direction * Number.EPSILON)

describe('judgeCharacteristic by the simple rule', () => {
  it.each<[string, number, Verdict]>([
    ['one bit below the upper limit', next(0.0054, -1), 'pass'], ['on the upper limit', 0.0054, 'pass'], ['one bit above', next(0.0054, 1), 'fail'],
  ])('judges a value %s', (_, value, expected) => {
    expect(verdict(limit(null, 0.0054), value, SIMPLE)).toBe(expected)
  })

  it.each<[string, number, Verdict]>([
    ['one bit below the lower limit', next(0.004, -1), 'fail'], ['on the lower limit', 0.004, 'pass'], ['one bit above', next(0.004, 1), 'pass'],
  ])('judges a value %s', (_, value, expected) => {
    expect(verdict(limit(0.004, 0.006), value, SIMPLE)).toBe(expected)
  })

  it('keeps figures, limits and class with the verdict', () => {
    expect(judgeCharacteristic(limit(null, 0.0054), figure(0.00683, 0.00031), SIMPLE)).toMatchObject({
      key: 'cogging.peakToPeak', value: 0.00683, expandedUncertainty: 0.00031, lower: null, upper: 0.0054, unit: 'N·m', class: 'major', verdict: 'fail',
    })
  })
})

describe('judgeCharacteristic with a guard band', () => {
  it.each<[number, Verdict]>([[0.00509, 'pass'], [0.0051, 'pass'], [0.00511, 'fail'], [0.0054, 'fail'], [0.0055, 'fail']])(
    'judges %d N·m against 5.4 mN·m with U = 0.3 mN·m', (value, expected) => {
      expect(verdict(limit(null, 0.0054), value, GUARDED, 0.0003)).toBe(expected)
    })

  // Source: ISO 14253-1:2017, default 95 %, guard band 1.65 u (from memory): U = 2u, ratio 0.825.
  it.each<[number, Verdict]>([[9.9197, 'fail'], [9.9198, 'pass'], [10.0802, 'pass'], [10.0803, 'fail']])(
    'accepts 9.9198 to 10.0802 between 9.9 and 10.1 with u = 0.012 and 1.65 u: %d', (value, expected) => {
      expect(verdict(limit(9.9, 10.1), value, { kind: 'guard-band', ratio: 0.825 }, 0.024)).toBe(expected)
    })

  it('is the simple rule at ratio 0, without needing an uncertainty', () => {
    expect(verdict(limit(null, 0.0054), 0.0054, { kind: 'guard-band', ratio: 0 })).toBe('pass')
  })

  it('cannot judge a value inside the limits whose uncertainty is not stated, but fails one outside', () => {
    expect(verdict(limit(null, 0.0054), 0.005, GUARDED)).toBeNull()
    expect(reason(limit(null, 0.0054), 0.005, GUARDED)).toBe('5.00 mN·m is within the limit 5.40 mN·m, but no uncertainty is stated, which the guard band needs.')
    expect(verdict(limit(null, 0.0054), 0.006, GUARDED)).toBe('fail')
  })
})

describe('judgeCharacteristic by the four-way rule', () => {
  it.each<[number, Verdict]>([
    [0.0051, 'pass'], [0.00511, 'conditional-pass'], [0.0054, 'conditional-pass'], [0.00541, 'conditional-fail'], [0.0057, 'conditional-fail'], [0.00571, 'fail'],
  ])('judges %d N·m against 5.4 mN·m with U = 0.3 mN·m', (value, expected) => {
    expect(verdict(limit(null, 0.0054), value, FOUR_WAY, 0.0003)).toBe(expected)
  })

  // Source: ISO 14253-1:2017 (from memory): nonconformity is proved below 9.8802 and above 10.1198.
  it.each<[number, Verdict]>([[9.8801, 'fail'], [9.8802, 'conditional-fail'], [10.1198, 'conditional-fail'], [10.1199, 'fail']])(
    'proves nonconformity beyond the outer limits only: %d', (value, expected) => {
      expect(verdict(limit(9.9, 10.1), value, { kind: 'four-way', ratio: 0.825 }, 0.024)).toBe(expected)
    })
})

describe('probabilityOfConformity', () => {
  const cases = reference.cases.filter(each => each.expected && 'p_c' in each.expected) as unknown as
    { id: string; inputs: { y: number; u: number; TL?: number | null; TU?: number | null }; expected: { p_c: number } }[]
  it.each(cases)('agrees with the published case $id', ({ inputs, expected }) => {
    expect(probabilityOfConformity(inputs.y, 2 * inputs.u, inputs.TL ?? null, inputs.TU ?? null)).toBeCloseTo(expected.p_c, 6)
  })

  const guardBands = reference.cases.find(each => each.id === 'ilac-g8-guard-bands')!.expected as unknown as { rule: string; r: number; worst_case_specific_PFA: number }[]
  it.each(guardBands)('leaves at the guarded limit the risk published for "$rule" (ILAC-G8:09/2019, from memory)', ({ r, worst_case_specific_PFA: risk }) => {
    const found = 1 - probabilityOfConformity(10 - r * 0.2, 0.2, null, 10)
    expect(Math.abs(found - risk)).toBeLessThan(Math.max(1e-8, risk * 1e-6))
  })

  it('is half on a single limit and certain without uncertainty', () => {
    expect(probabilityOfConformity(5, 1, null, 5)).toBeCloseTo(0.5, 12)
    expect([probabilityOfConformity(5, 0, null, 5), probabilityOfConformity(5.1, 0, null, 5)]).toEqual([1, 0])
  })

  it('is not stated when no uncertainty is', () => {
    expect(judgeCharacteristic(limit(null, 1), figure(0.5), SIMPLE).probabilityOfConformity).toBeNull()
  })
})

describe('judgeCharacteristic on what is not stated', () => {
  it('gives no verdict and the reason of the measurement', () => {
    const given = { ...figure(null), notStated: 'Friction is not separated: only one direction was measured.' }
    expect(judgeCharacteristic(limit(null, 1), given, SIMPLE)).toMatchObject({ verdict: null, value: null, reason: given.notStated })
  })

  it('says which characteristic is missing when the measurement does not mention it', () => {
    expect(judgeCharacteristic(limit(null, 1), undefined, SIMPLE)).toMatchObject({
      verdict: null, reason: 'Cogging, peak to peak is not stated for this measurement.',
    })
  })
})

describe('the reason of a verdict', () => {
  it.each<[string, Limit, number, DecisionRule, number | null]>([
    ['6.83 mN·m is above the limit 5.40 mN·m by 1.43 mN·m.', limit(null, 0.0054), 0.00683, SIMPLE, null],
    ['4.02 mN·m is below the limit 5.40 mN·m by 1.38 mN·m.', limit(null, 0.0054), 0.00402, SIMPLE, null],
    ['5.40 mN·m is exactly on the limit, which conforms.', limit(null, 0.0054), 0.0054, SIMPLE, null],
    ['5.404 mN·m is above the limit 5.400 mN·m by 0.004 mN·m.', limit(null, 0.0054), 0.005404, SIMPLE, null],
    ['3.20 mN·m is below the lower limit 4.00 mN·m by 0.80 mN·m.', limit(0.004, 0.006), 0.0032, SIMPLE, null],
    ['5.10 mN·m lies between the limits 4.00 and 6.00 mN·m.', limit(0.004, 0.006), 0.0051, SIMPLE, null],
    ['4.02 mN·m is within the limit 5.40 mN·m by at least the guard band of 0.30 mN·m.', limit(null, 0.0054), 0.00402, GUARDED, 0.0003],
    ['5.21 mN·m is within the limit 5.40 mN·m, but not by the guard band of 0.30 mN·m: with an uncertainty of ±0.30 mN·m only values up to 5.10 mN·m are accepted.',
      limit(null, 0.0054), 0.00521, GUARDED, 0.0003],
    ['4.10 mN·m is within the lower limit 4.00 mN·m, but not by the guard band of 0.30 mN·m: with an uncertainty of ±0.30 mN·m only values from 4.30 mN·m on are accepted.',
      limit(0.004, 0.006), 0.0041, GUARDED, 0.0003],
    ['5.00 mN·m is within the upper limit 6.00 mN·m, but not by the guard band of 1.20 mN·m; the uncertainty of ±1.20 mN·m leaves no value that could be accepted between the limits.',
      limit(0.004, 0.006), 0.005, GUARDED, 0.0012],
    ['5.21 mN·m is within the limit 5.40 mN·m, but closer to it than the guard band of 0.30 mN·m.', limit(null, 0.0054), 0.00521, FOUR_WAY, 0.0003],
    ['5.50 mN·m is above the limit 5.40 mN·m by 0.10 mN·m, which is within the guard band of 0.30 mN·m.', limit(null, 0.0054), 0.0055, FOUR_WAY, 0.0003],
  ])('reads: %s', (sentence, bounds, value, rule, uncertainty) => {
    expect(reason(bounds, value, rule, uncertainty)).toBe(sentence)
  })
})

describe('judgeCharacteristic refuses', () => {
  it.each<[string, () => unknown]>([
    ['a limit without bounds', () => verdict(limit(null, null), 1, SIMPLE)],
    ['crossed bounds', () => verdict(limit(2, 1), 1, SIMPLE)],
    ['another characteristic', () => judgeCharacteristic(limit(null, 1), { ...figure(1), key: 'cogging.rms' }, SIMPLE)],
    ['another unit', () => judgeCharacteristic(limit(null, 1), { ...figure(1), unit: '%' }, SIMPLE)],
    ['a value that is not finite', () => verdict(limit(null, 1), Number.NaN, SIMPLE)],
    ['a negative uncertainty', () => verdict(limit(null, 1), 1, SIMPLE, -0.1)],
    ['a negative guard band', () => verdict(limit(null, 1), 1, { kind: 'guard-band', ratio: -1 }, 0.1)],
  ])('%s', (_, judge) => {
    expect(judge).toThrow(RangeError)
  })
})
