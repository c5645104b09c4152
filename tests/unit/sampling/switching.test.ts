import { describe, expect, it } from 'vitest'
import { makePlan } from '#shared/compute/sampling/plan'
import { nextSeverity, switchingPoints } from '#shared/compute/sampling/switching'
import type { SwitchingEvent } from '#shared/compute/sampling/switching'
import type { LotVerdict, SamplingScheme, Severity } from '#shared/compute/terms/judgement'
// Each case in the file carries its source; the score of ISO 2859-1 is from memory.
import reference from '../../reference/attributes-sampling.json'

const lot = (accepted: boolean, severity: Severity = 'normal', more: Partial<Extract<SwitchingEvent, { kind: 'lot' }>> = {}): SwitchingEvent =>
  ({ kind: 'lot', severity, accepted, resubmitted: false, returnToNormal: false, points: accepted && severity === 'normal' ? 3 : 0, ...more })
const times = (count: number, event: SwitchingEvent): SwitchingEvent[] => new Array<SwitchingEvent>(count).fill(event)
const [good, bad] = [lot(true), lot(false)]
const [tightGood, tightBad] = [lot(true, 'tightened'), lot(false, 'tightened')]
const toTightened = [bad, bad]
const toReduced: SwitchingEvent[] = [...times(10, good), { kind: 'reduced-agreed' }]

const J: SamplingScheme = { kind: 'attributes', level: 'II', aql: { major: '1.0' } }
const verdictOf = (nonconforming: number, accepted: boolean): Pick<LotVerdict, 'outcome' | 'classes'> => ({
  outcome: accepted ? 'accept' : 'reject', classes: [{ class: 'major', nonconforming, ac: 0, re: 1, outcome: accepted ? 'accept' : 'reject' }],
})

interface Step { severity: Severity; n: number; ac: number; re: number; d: number; accepted: boolean; score?: number; next: Severity }
const scenarios = reference.cases.filter(each => ['switch-105E-1', 'switch-105E-5', 'switch-ISO-1', 'switch-ISO-3'].includes(each.id)) as unknown as
  { id: string; title: string; expected: Step[] }[]

describe('nextSeverity on constructed scenarios of the standards', () => {
  it.each(scenarios)('follows $id: $title', ({ expected }) => {
    const history: SwitchingEvent[] = []
    for (const step of expected) {
      const plan = makePlan({ lotSize: 1000, severity: step.severity, scheme: J })
      // The reduced numbers of ISO 2859-1 are not verified; 105E's are used and not compared here.
      if (step.severity !== 'reduced') expect(plan.classes[0]).toMatchObject({ n: step.n, ac: step.ac, re: step.re })
      const points = switchingPoints({ plan, verdict: verdictOf(step.d, step.accepted) })
      history.push(lot(step.accepted, step.severity, { points }))
      const state = nextSeverity(history)
      if (step.score !== undefined && step.next === 'normal') expect(state.score).toBe(step.score)
      if (step.next === 'reduced' && step.severity === 'normal') {
        expect(state).toMatchObject({ severity: 'normal', score: step.score, reducedOffered: true })
        history.push({ kind: 'reduced-agreed' })
      }
      expect(nextSeverity(history).severity).toBe(step.next)
    }
  })
})

describe('nextSeverity', () => {
  it('begins with normal inspection', () => {
    expect(nextSeverity([])).toEqual({ severity: 'normal', score: 0, reason: 'Normal inspection, as every supplier’s part begins.', state: 'active', reducedOffered: false })
  })

  it('tightens at two rejected of five, not at two of six', () => {
    expect(nextSeverity([bad, ...times(3, good), bad]).severity).toBe('tightened')
    expect(nextSeverity([bad, ...times(4, good), bad]).severity).toBe('normal')
  })

  it('returns to normal after five accepted in a row on tightened, not after four', () => {
    expect(nextSeverity([...toTightened, ...times(4, tightGood)]).severity).toBe('tightened')
    expect(nextSeverity([...toTightened, ...times(5, tightGood)]).severity).toBe('normal')
    expect(nextSeverity([...toTightened, ...times(4, tightGood), tightBad, ...times(4, tightGood)]).severity).toBe('tightened')
  })

  it('forgets the rejections that tightened it once normal again', () => {
    expect(nextSeverity([...toTightened, ...times(5, tightGood), bad]).severity).toBe('normal')
  })

  it('discontinues at the fifth rejected on tightened in all, not at the fourth', () => {
    const mixed = [tightBad, tightGood, tightBad, tightGood, tightBad, tightBad]
    expect(nextSeverity([...toTightened, ...mixed]).state).toBe('active')
    expect(nextSeverity([...toTightened, ...mixed, tightBad])).toMatchObject({ state: 'discontinued', severity: 'tightened' })
  })

  it('stays discontinued whatever is decided, until an engineer reopens it on tightened', () => {
    const discontinued = [...toTightened, ...times(5, tightBad)]
    expect(nextSeverity([...discontinued, ...times(6, tightGood)]).state).toBe('discontinued')
    const reopened = nextSeverity([...discontinued, { kind: 'reopened' }, ...times(4, tightBad)])
    expect(reopened).toMatchObject({ state: 'active', severity: 'tightened' })
  })

  it('offers reduced inspection at a score of 30, not at 29 or 28', () => {
    const two = lot(true, 'normal', { points: 2 })
    expect(nextSeverity(times(14, two))).toMatchObject({ score: 28, reducedOffered: false })
    expect(nextSeverity([...times(13, two), good])).toMatchObject({ score: 29, reducedOffered: false })
    expect(nextSeverity(times(15, two))).toMatchObject({ score: 30, reducedOffered: true, severity: 'normal' })
  })

  it('withdraws the offer when the score is set back, even by an accepted lot', () => {
    expect(nextSeverity([...times(10, good), lot(true, 'normal', { points: 0 })])).toMatchObject({ score: 0, reducedOffered: false })
  })

  it('goes to reduced when the engineer agrees, and stays there while lots are accepted', () => {
    expect(nextSeverity([...toReduced, ...times(3, lot(true, 'reduced'))])).toMatchObject({ severity: 'reduced', score: 0, reducedOffered: false })
  })

  it.each<[string, SwitchingEvent]>([
    ['a rejected lot', lot(false, 'reduced')], ['a lot between Ac and Re', lot(true, 'reduced', { returnToNormal: true })], ['the engineer', { kind: 'normal-restored' }],
  ])('returns from reduced to normal by %s', (_, event) => {
    expect(nextSeverity([...toReduced, event])).toMatchObject({ severity: 'normal', score: 0 })
  })

  it('ignores resubmitted lots in every state', () => {
    const again = (accepted: boolean, severity: Severity) => lot(accepted, severity, { resubmitted: true })
    expect(nextSeverity([bad, again(false, 'normal')]).severity).toBe('normal')
    expect(nextSeverity([...toTightened, ...times(9, again(true, 'tightened'))]).severity).toBe('tightened')
    expect(nextSeverity([...toTightened, ...times(9, again(false, 'tightened'))]).state).toBe('active')
    expect(nextSeverity([...toReduced, again(false, 'reduced')]).severity).toBe('reduced')
    expect(nextSeverity([...times(9, good), again(true, 'normal')]).score).toBe(27)
  })

  it('does not count a lot drawn under normal inspection towards the end of tightened', () => {
    expect(nextSeverity([...toTightened, ...times(5, good)]).severity).toBe('tightened')
  })

  it.each<[string, SwitchingEvent[]]>([
    ['agreement without score', [{ kind: 'reduced-agreed' }]], ['agreement on tightened', [...toTightened, { kind: 'reduced-agreed' }]],
    ['normal by hand on normal', [{ kind: 'normal-restored' }]], ['reopening what is active', [{ kind: 'reopened' }]],
  ])('refuses %s', (_, history) => {
    expect(() => nextSeverity(history)).toThrow(RangeError)
  })
})

describe('switchingPoints', () => {
  const points = (scheme: SamplingScheme, nonconforming: number, severity: Severity = 'normal') =>
    switchingPoints({ plan: makePlan({ lotSize: 1000, severity, scheme }), verdict: verdictOf(nonconforming, true) })

  it.each([[0, 3], [1, 3], [2, 0]])('gives for %d nonconforming at Ac = 2 (tighter Ac = 1) %d points', (count, expected) => {
    expect(points(J, count)).toBe(expected)
  })

  it.each([['0.15', 0], ['0.65', 1]])('gives 2 points at AQL %s, where the acceptance number is %d', (aql, count) => {
    expect(points({ kind: 'attributes', level: 'II', aql: { major: aql } }, count)).toBe(2)
  })

  it('gives none to a rejected lot, one on tightened inspection and one not sampled by attributes', () => {
    expect(switchingPoints({ plan: makePlan({ lotSize: 1000, severity: 'normal', scheme: J }), verdict: verdictOf(3, false) })).toBe(0)
    expect(points(J, 0, 'tightened')).toBe(0)
    expect(points({ kind: 'every' }, 0)).toBe(0)
  })

  it('gives the least of several classes', () => {
    expect(points({ kind: 'attributes', level: 'II', aql: { major: '1.0', critical: '0.15' } }, 0)).toBe(2)
    expect(points({ kind: 'attributes', level: 'II', aql: { major: '1.0', minor: '4.0' } }, 2)).toBe(0)
  })

  it('finds a tighter plan for every cell with an acceptance number of 2 or more', () => {
    for (const aql of ['0.025', '0.10', '1.0', '10', '150', '1000']) {
      for (const lotSize of [2, 50, 1200, 600_000]) {
        const plan = makePlan({ lotSize, severity: 'normal', scheme: { kind: 'attributes', level: 'III', aql: { major: aql } } })
        expect([2, 3]).toContain(switchingPoints({ plan, verdict: verdictOf(0, true) }))
      }
    }
  })
})
