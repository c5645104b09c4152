import { describe, expect, it } from 'vitest'
import { defineLifecycle } from '#shared/compute/lifecycle/lifecycle'
import type { Lifecycle } from '#shared/compute/lifecycle/lifecycle'
import { limitSheetLifecycle } from '#shared/compute/lifecycle/limit-sheet'
import { DISPOSITIONS, lotLifecycle } from '#shared/compute/lifecycle/lot'
import { nonconformanceLifecycle } from '#shared/compute/lifecycle/nonconformance'
import { paperLifecycle } from '#shared/compute/lifecycle/paper'

const walk = <S extends string, A extends string>(lifecycle: Lifecycle<S, A>, ...actions: A[]): S =>
  actions.reduce((state, action) => lifecycle.transition(state, action), lifecycle.initial)

describe('lotLifecycle', () => {
  it('leads from receipt to acceptance, and through hold and disposition to the end', () => {
    expect(walk(lotLifecycle, 'draw', 'measure', 'measure', 'finish-measuring', 'accept')).toBe('accepted')
    expect(walk(lotLifecycle, 'draw', 'measure', 'finish-measuring', 'reopen-measuring', 'finish-measuring', 'reject', 'hold', 'disposition', 'close')).toBe('closed')
  })

  it('lets nobody accept a lot that was rejected, or decide one that is not ready', () => {
    for (const state of lotLifecycle.states.filter(each => each !== 'ready')) {
      expect(() => lotLifecycle.transition(state, 'accept'), state).toThrow(RangeError)
      expect(() => lotLifecycle.transition(state, 'reject'), state).toThrow(RangeError)
    }
  })

  it('shows each role its own actions', () => {
    expect(lotLifecycle.allowedActions('ready', 'inspector')).toEqual(['measure', 'accept', 'reject'])
    expect(lotLifecycle.allowedActions('on-hold', 'inspector')).toEqual([])
    expect(lotLifecycle.allowedActions('on-hold', 'engineer')).toEqual(['disposition'])
  })

  it('offers nobody what follows from another action', () => {
    expect(lotLifecycle.allowedActions('rejected', 'engineer')).toEqual([])
    expect(lotLifecycle.transition('rejected', 'hold')).toBe('on-hold')
  })

  it('ends in accepted and closed only', () => {
    expect(lotLifecycle.states.filter(lotLifecycle.isFinal)).toEqual(['accepted', 'closed'])
  })

  it('knows five dispositions', () => {
    expect(DISPOSITIONS).toEqual(['return-to-supplier', 'sort', 'rework', 'concession', 'scrap'])
  })
})

describe('nonconformanceLifecycle', () => {
  it('closes after an accepted answer, also one that was sent back first', () => {
    expect(walk(nonconformanceLifecycle, 'notify', 'acknowledge', 'answer', 'send-back', 'answer', 'accept-answer', 'close')).toBe('closed')
  })

  it('takes an accepted answer back when the next lots do not bear it out', () => {
    expect(nonconformanceLifecycle.transition('accepted-answer', 'send-back')).toBe('sent-back')
  })

  it('does not close before an answer is accepted', () => {
    for (const state of nonconformanceLifecycle.states.filter(each => each !== 'accepted-answer')) {
      expect(() => nonconformanceLifecycle.transition(state, 'close'), state).toThrow(RangeError)
    }
  })

  it('leaves answering to the supplier and judging to the engineer', () => {
    expect(nonconformanceLifecycle.allowedActions('acknowledged', 'supplier')).toEqual(['answer'])
    expect(nonconformanceLifecycle.allowedActions('answered', 'supplier')).toEqual([])
    expect(nonconformanceLifecycle.allowedActions('answered', 'engineer')).toEqual(['accept-answer', 'send-back'])
  })
})

describe('limitSheetLifecycle', () => {
  it('comes back to draft when sent back, and into force only through submission', () => {
    expect(walk(limitSheetLifecycle, 'edit', 'submit', 'send-back', 'submit', 'approve', 'retire')).toBe('retired')
    expect(() => limitSheetLifecycle.transition('draft', 'approve')).toThrow('limitSheetLifecycle.transition: action in state draft must be edit or submit, got approve')
  })

  it('never edits a sheet that was submitted, approved or retired', () => {
    for (const state of ['submitted', 'approved', 'retired'] as const) expect(() => limitSheetLifecycle.transition(state, 'edit')).toThrow(RangeError)
  })
})

describe('paperLifecycle', () => {
  it('ends as superseded or withdrawn', () => {
    expect([walk(paperLifecycle, 'supersede'), walk(paperLifecycle, 'withdraw')]).toEqual(['superseded', 'withdrawn'])
    expect(() => paperLifecycle.transition('withdrawn', 'supersede')).toThrow('must be none')
  })

  it.each([lotLifecycle, nonconformanceLifecycle, limitSheetLifecycle, paperLifecycle])('lets auditor, administrator and build engineer change nothing', (lifecycle) => {
    for (const role of ['auditor', 'administrator', 'build-engineer'] as const) {
      expect(lifecycle.transitions.filter(row => row.roles.includes(role))).toEqual([])
    }
  })
})

describe('defineLifecycle', () => {
  it('refuses two rows for one state and action', () => {
    const row = { from: 'a', action: 'go', to: 'b', roles: [] }
    expect(() => defineLifecycle('twice', 'a', [row, { ...row, to: 'c' }])).toThrow(/one row for "a go"/)
  })

  it('refuses a state that cannot be reached', () => {
    expect(() => defineLifecycle('lost', 'a', [{ from: 'a', action: 'go', to: 'b', roles: [] }, { from: 'c', action: 'go', to: 'a', roles: [] }])).toThrow(/reach c from a/)
  })
})
