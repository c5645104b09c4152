import { describe, expect, it } from 'vitest'
import { judgeLot } from '#shared/compute/sampling/lot-verdict'
import { makePlan } from '#shared/compute/sampling/plan'
import type { CharacteristicVerdict, MotorVerdict, NonconformityClass, SamplingScheme, Severity, Verdict } from '#shared/compute/terms/judgement'

const characteristic = (name: NonconformityClass, verdict: Verdict | null): CharacteristicVerdict => ({
  key: 'cogging.rms', value: 0.001, expandedUncertainty: null, lower: null, upper: 0.002, unit: 'N·m', class: name, verdict,
  probabilityOfConformity: null, reason: '',
})
const good: MotorVerdict = { verdict: 'pass', characteristics: [characteristic('major', 'pass')], nonconformingClasses: [] }
const bad = (...classes: NonconformityClass[]): MotorVerdict =>
  ({ verdict: 'fail', characteristics: classes.map(each => characteristic(each, 'fail')), nonconformingClasses: classes })
const unjudged: MotorVerdict = { verdict: null, characteristics: [characteristic('major', null)], nonconformingClasses: [] }
const repeat = (count: number, motor: MotorVerdict | null): (MotorVerdict | null)[] => new Array<MotorVerdict | null>(count).fill(motor)

const planOf = (scheme: SamplingScheme, severity: Severity = 'normal', lotSize = 1200) => makePlan({ lotSize, severity, scheme })
/** n = 32, Ac = 2, Re = 3. */
const plan = planOf({ kind: 'attributes', level: 'I', aql: { major: '2.5' } })

describe('judgeLot', () => {
  it('accepts at the acceptance number when the sample is complete', () => {
    const verdict = judgeLot({ plan, motors: [...repeat(2, bad('major')), ...repeat(30, good)] })
    expect(verdict).toMatchObject({ outcome: 'accept', complete: true, judged: 32, returnToNormal: false })
    expect(verdict.classes).toEqual([{ class: 'major', nonconforming: 2, ac: 2, re: 3, outcome: 'accept' }])
    expect(verdict.sentence).toBe('Accepted: 32 of 32 motors judged, 2 nonconforming (accept on 2, reject on 3).')
  })

  it('stays open with one motor unjudged, however good the others are', () => {
    expect(judgeLot({ plan, motors: repeat(31, good) })).toMatchObject({ outcome: 'open', complete: false, judged: 31 })
    expect(judgeLot({ plan, motors: [...repeat(31, good), null] })).toMatchObject({ outcome: 'open', judged: 31 })
    expect(judgeLot({ plan, motors: [...repeat(31, good), unjudged] })).toMatchObject({ outcome: 'open', judged: 31 })
  })

  it('rejects at the rejection number, not one below, even before the sample is complete', () => {
    expect(judgeLot({ plan, motors: repeat(2, bad('major')) }).outcome).toBe('open')
    const verdict = judgeLot({ plan, motors: [null, ...repeat(3, bad('major'))] })
    expect(verdict).toMatchObject({ outcome: 'reject', complete: false, judged: 3 })
    expect(verdict.sentence).toBe('Rejected before the sample was complete: 3 of 32 motors judged, 3 nonconforming (accept on 2, reject on 3).')
  })

  it('accepts between Ac and Re on reduced inspection and returns to normal', () => {
    const reduced = planOf({ kind: 'attributes', level: 'II', aql: { major: '1.0' } }, 'reduced')
    expect(reduced.classes[0]).toMatchObject({ n: 32, ac: 1, re: 3 })
    const judged = (count: number) => judgeLot({ plan: reduced, motors: [...repeat(count, bad('major')), ...repeat(32 - count, good)] })
    expect(judged(1)).toMatchObject({ outcome: 'accept', returnToNormal: false })
    expect(judged(2)).toMatchObject({ outcome: 'accept', returnToNormal: true })
    expect(judged(2).sentence).toContain('the next lot is inspected normally')
    expect(judged(3)).toMatchObject({ outcome: 'reject', returnToNormal: false })
  })

  it('judges a class over the first motors of its own sample only', () => {
    const classes = planOf({ kind: 'attributes', level: 'II', aql: { critical: '0.10', major: '1.0' } })
    expect(classes.classes.map(row => row.n)).toEqual([125, 80])
    const within = [...repeat(77, good), ...repeat(3, bad('major')), ...repeat(45, good)]
    const beyond = [...repeat(78, good), ...repeat(3, bad('major')), ...repeat(44, good)]
    expect(judgeLot({ plan: classes, motors: within }).outcome).toBe('reject')
    expect(judgeLot({ plan: classes, motors: beyond })).toMatchObject({ outcome: 'accept', classes: [{ nonconforming: 0 }, { nonconforming: 2 }] })
  })

  it('rejects when any class rejects and names that class', () => {
    const classes = planOf({ kind: 'attributes', level: 'II', aql: { critical: '0.10', major: '1.0' } })
    const verdict = judgeLot({ plan: classes, motors: [bad('critical'), ...repeat(124, good)] })
    expect(verdict).toMatchObject({ outcome: 'reject', complete: true })
    expect(verdict.sentence).toBe('Rejected: 125 of 125 motors judged, 1 critical nonconforming (accept on 0, reject on 1).')
  })

  it('lets a class that the plan does not name accept on 0', () => {
    const verdict = judgeLot({ plan, motors: [bad('critical')] })
    expect(verdict.outcome).toBe('reject')
    expect(verdict.classes[0]).toEqual({ class: 'critical', nonconforming: 1, ac: 0, re: 1, outcome: 'reject' })
  })

  it('counts a motor that fails in one class as not judged in another that could not be judged', () => {
    const classes = planOf({ kind: 'attributes', level: 'I', aql: { major: '2.5', minor: '2.5' } })
    const half: MotorVerdict = { verdict: 'fail', characteristics: [characteristic('major', 'fail'), characteristic('minor', null)], nonconformingClasses: ['major'] }
    const verdict = judgeLot({ plan: classes, motors: [half, ...repeat(31, good)] })
    expect(verdict).toMatchObject({ outcome: 'open', complete: false, classes: [{ outcome: 'accept' }, { outcome: 'open' }] })
  })

  it('counts a conditional pass as conforming', () => {
    const conditional: MotorVerdict = { ...good, verdict: 'conditional-pass' }
    expect(judgeLot({ plan, motors: repeat(32, conditional) }).outcome).toBe('accept')
  })

  it('refuses more motors than the plan draws', () => {
    expect(() => judgeLot({ plan, motors: repeat(33, good) })).toThrow(/at most plan.n = 32/)
  })
})
