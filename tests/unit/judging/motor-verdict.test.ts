import { describe, expect, it } from 'vitest'
import { judgeMotor } from '#shared/compute/judging/motor-verdict'
import type { DecisionRule, Limit, NonconformityClass } from '#shared/compute/terms/judgement'
import type { Characteristic } from '#shared/compute/terms/measurement'

const limit = (key: string, upper: number, name: NonconformityClass): Limit => ({ key, lower: null, upper, unit: 'N·m', class: name })
const figure = (key: string, value: number | null): Characteristic => ({ key, value, unit: 'N·m', expandedUncertainty: 0.1 })
const LIMITS = [limit('cogging.peakToPeak', 5, 'major'), limit('order.12', 2, 'minor'), limit('friction.mean', 1, 'critical')]
const judge = (values: (number | null)[], decisionRule: DecisionRule = { kind: 'simple' }) => judgeMotor({
  content: { limits: LIMITS, decisionRule },
  characteristics: values.map((value, i) => figure(LIMITS[i]!.key, value)),
})

describe('judgeMotor', () => {
  it('passes when every limit is kept, in the order of the sheet', () => {
    const verdict = judge([5, 2, 1])
    expect(verdict).toMatchObject({ verdict: 'pass', nonconformingClasses: [] })
    expect(verdict.characteristics.map(each => each.key)).toEqual(LIMITS.map(each => each.key))
  })

  it('fails by the worst limit and names each class once', () => {
    expect(judge([5.1, 2.1, 0])).toMatchObject({ verdict: 'fail', nonconformingClasses: ['major', 'minor'] })
  })

  it('gives no verdict when a limit cannot be judged and none fails', () => {
    expect(judge([4, 1, null])).toMatchObject({ verdict: null, nonconformingClasses: [] })
    expect(judge([4, 1])).toMatchObject({ verdict: null })
  })

  it('fails in spite of a limit that cannot be judged', () => {
    expect(judge([6, 1, null])).toMatchObject({ verdict: 'fail', nonconformingClasses: ['major'] })
  })

  it.each([
    [4.95, 'conditional-pass', []], [5.05, 'conditional-fail', ['major']], [5.2, 'fail', ['major']], [4.8, 'pass', []],
  ])('counts %d N·m under the four-way rule as %s', (value, expected, classes) => {
    expect(judge([value, 1, 0.5], { kind: 'four-way', ratio: 1 })).toMatchObject({ verdict: expected, nonconformingClasses: classes })
  })

  it('refuses a sheet without limits', () => {
    expect(() => judgeMotor({ content: { limits: [], decisionRule: { kind: 'simple' } }, characteristics: [] })).toThrow(/at least one limit/)
  })
})
