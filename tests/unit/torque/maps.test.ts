import { describe, expect, it } from 'vitest'
import { amplitude, characteristic, figuresOf, readMap, settingsWith } from './support'

/** Synthetic files from a physical model with exact answers. */
const MAPS = ['bldc12n14p-clean', 'bldc12n14p-rotor', 'bldc12n14p-stator', 'servo9n8p-static-ecc', 'hybrid200']

function analyseMap(name: string) {
  const { bytes, reference } = readMap(name)
  return { reference, result: figuresOf(bytes, settingsWith({ design: reference.design, ratedTorqueNm: reference.ratedTorqueNm })) }
}

describe.each(MAPS)('analyse on the sample map %s', (name) => {
  const { result, reference } = analyseMap(name)
  const { truth } = reference
  const largest = Math.max(...truth.orders.map((order) => order.amplitudeMilliNm))

  it('gives peak-to-peak, RMS and mean friction within 1 % of the truth', () => {
    expect(Math.abs(characteristic(result, 'cogging.peakToPeak').value! * 1e3 / truth.peakToPeakMilliNm - 1)).toBeLessThan(0.005)
    expect(Math.abs(characteristic(result, 'cogging.rms').value! * 1e3 / truth.rmsMilliNm - 1)).toBeLessThan(0.005)
    expect(Math.abs(characteristic(result, 'friction.mean').value! * 1e3 / truth.frictionMeanMilliNm! - 1)).toBeLessThan(0.005)
  })

  it('gives every order within 1 % of the largest amplitude', () => {
    for (const { order, amplitudeMilliNm } of truth.orders) {
      expect(Math.abs(amplitude(result.cogging, order) * 1e3 - amplitudeMilliNm), `order ${order}`).toBeLessThan(0.01 * largest)
    }
  })

  it('gives the phases of the strong orders within 2°, half an encoder count added', () => {
    const strong = truth.orders.filter(({ amplitudeMilliNm }) => amplitudeMilliNm > 0.1 * largest)
    for (const { order, phaseDeg } of strong) {
      const found = result.orders.find((entry) => entry.order === order)!.phaseDeg
      const off = found - (order * 180) / reference.countsPerTurn - phaseDeg
      expect(Math.abs(off - 360 * Math.round(off / 360)), `order ${order}`).toBeLessThan(2)
    }
  })
})

describe('analyse on faulty sample motors', () => {
  it('lays the orders of a weak magnet to the rotor side, none to the stator side', () => {
    const { result } = analyseMap('bldc12n14p-rotor')
    const found = new Set(result.orders.filter(({ order }) => order % 84 !== 0).flatMap(({ origins }) => origins))
    expect([...found]).toEqual(['rotorSide'])
    expect(characteristic(result, 'group.statorSide').value).toBe(0)
  })

  it('lays the orders of a wide slot opening to the stator side, none to the rotor side', () => {
    const { result } = analyseMap('bldc12n14p-stator')
    const found = new Set(result.orders.filter(({ order }) => order % 84 !== 0).flatMap(({ origins }) => origins))
    expect([...found]).toEqual(['statorSide'])
  })

  it('finds only the design order and its multiples in a nearly perfect motor', () => {
    const { result } = analyseMap('bldc12n14p-clean')
    expect(result.orders.map(({ order }) => order)).toEqual([84, 168, 252])
  })

  it('takes the sidebands of a hybrid stepper with an eccentric rotor for a modulation, not for its angle sensor', () => {
    const { result } = analyseMap('hybrid200')
    expect(result.orders.find(({ order }) => order === 99)!.reason).toContain('Sideband of order 100, whose amplitude changes once per turn')
    expect(characteristic(result, 'angleSensorEccentricity').value).toBeNull()
  })
})

describe('analyse on the sample map under load', () => {
  const { bytes, reference } = readMap('loaded12n14p')
  const result = figuresOf(bytes, settingsWith({ design: reference.design, ratedTorqueNm: reference.ratedTorqueNm }))

  it.each([
    ['peakToPeakOverRated', 'pp_over_rated'], ['rmsOverRated', 'rms_over_rated'], ['peakToPeakOverMean', 'pp_over_mean'], ['halfPeakToPeakOverMean', 'half_pp_over_mean'],
    ['maxMinusMinOverMaxPlusMin', 'max_minus_min_over_max_plus_min'], ['largestDeviationOverMean', 'peak_dev_over_mean'], ['rmsOverMean', 'rms_over_mean'],
  ])('gives the ripple ratio %s within 0.5 % of the truth', (definition, key) => {
    const value = characteristic(result, `rippleRatio.${definition}`).value!
    expect(Math.abs(value / reference.rippleRatioPercent[key]! - 1)).toBeLessThan(0.005)
  })

  it('states no friction and says why when one direction was measured', () => {
    for (const key of ['friction.mean', 'friction.peakToPeak', 'detent.peak']) {
      expect(characteristic(result, key)).toMatchObject({ value: null, notStated: expect.stringContaining('one direction only') })
    }
    expect(result.friction).toBeNull()
    expect(result.warnings.map(({ code }) => code)).toContain('one-direction-only')
  })

  it('says of order 42, six times the pole pairs, that it may come from the load\'s current', () => {
    const found = result.orders.find(({ order }) => order === 42)!
    expect(found.origins).toEqual(['statorSide', 'other'])
    expect(found.reason).toContain('ripple of the load\'s current')
  })
})
