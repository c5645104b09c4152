import { describe, expect, it } from 'vitest'
import { explainFailures } from '#shared/compute/judging/explain'
import type { ExplainedMotor } from '#shared/compute/judging/explain'
import type { Verdict } from '#shared/compute/terms/judgement'
import type { OrderAmplitude } from '#shared/compute/terms/measurement'
import type { Origin } from '#shared/compute/terms/motor'

const order = (number: number, amplitudeNm: number, ...origins: Origin[]): OrderAmplitude =>
  ({ order: number, amplitudeNm, phaseDeg: 0, expandedUncertaintyNm: 0.01, significant: true, origins, reason: '' })
const motor = (serial: string, verdict: Verdict | null, orders: OrderAmplitude[], failing = ['cogging.peakToPeak']): ExplainedMotor => ({
  serial, orders,
  verdict: {
    verdict,
    nonconformingClasses: [],
    characteristics: failing.map(key => ({
      key, value: 1, expandedUncertainty: null, lower: null, upper: 1, unit: 'N·m', class: 'major', verdict, probabilityOfConformity: null, reason: '',
    })),
  },
})

describe('explainFailures', () => {
  it('names the orders that stand out and their side', () => {
    const bad = motor('71-4452', 'fail', [order(24, 1.5, 'rotorSide'), order(12, 2, 'rotorSide'), order(84, 0.4, 'design')])
    expect(explainFailures([bad])).toEqual(['71-4452: orders 12 and 24 stand out, the rotor side: a weak or misplaced magnet.'])
  })

  it('compares with the conforming motors of the sample, so that a usual design order is not blamed', () => {
    const usual = order(84, 3, 'design')
    const bad = motor('B', 'fail', [usual, order(14, 1, 'statorSide')])
    const sentences = explainFailures([motor('A', 'pass', [usual]), bad, motor('C', 'pass', [usual])])
    expect(sentences).toEqual(['B: order 14 stands out, the stator side: a slot opening, a tooth or the roundness of the stator.'])
  })

  it('says "either" when an order fits two origins', () => {
    expect(explainFailures([motor('B', 'fail', [order(24, 2, 'rotorSide', 'statorSide')])])).toEqual([
      'B: order 24 stands out, either the rotor side or the stator side: the map cannot tell which.'])
  })

  it('names two origins when both stand out', () => {
    expect(explainFailures([motor('B', 'conditional-fail', [order(12, 2, 'rotorSide'), order(14, 1.8, 'statorSide')])])[0]).toMatch(/^B: order 12 .*; order 14 /)
  })

  it('names no origin when nothing stands out from the conforming motors', () => {
    const usual = [order(84, 3, 'design')]
    expect(explainFailures([motor('A', 'pass', usual), motor('C', 'pass', usual), motor('B', 'fail', usual)]))
      .toEqual(['B: no order stands out, so the map names no likely origin.'])
  })

  it('leaves the orders alone when only friction fails', () => {
    expect(explainFailures([motor('B', 'fail', [order(12, 2, 'rotorSide')], ['friction.mean'])])[0]).toContain('only friction is beyond its limit')
  })

  it('is silent about conforming motors and those not judged', () => {
    expect(explainFailures([motor('A', 'pass', []), motor('B', 'conditional-pass', []), motor('C', null, [])])).toEqual([])
  })
})

describe('explainFailures, motors of the same finding', () => {
  it('says the finding once, with all serials that share it', () => {
    const motors = [
      motor('71-0001', 'pass', [order(12, 1, 'rotorSide')]), motor('71-0002', 'pass', [order(12, 1, 'rotorSide')]), motor('71-0003', 'fail', [order(12, 90, 'rotorSide')]), motor('71-0004', 'fail', [order(12, 80, 'rotorSide')]),
    ]
    const sentences = explainFailures(motors)
    expect(sentences).toHaveLength(1)
    expect(sentences[0]).toMatch(/^71-0003 and 71-0004: order 12 stands out, the rotor side/)
  })
})
