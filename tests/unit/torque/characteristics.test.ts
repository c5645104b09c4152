import { describe, expect, it } from 'vitest'
import { ENGINE_VERSION } from '#shared/compute/torque/engine-version'
import { compensatedPeakToPeak } from '#shared/compute/torque/compensation'
import { evaluateAt, evaluateSeries } from '#shared/compute/torque/evaluate'
import { extremesOf } from '#shared/compute/torque/extremes'
import { clearPart } from '#shared/compute/torque/clear-part'
import { significantAmplitude } from '#shared/compute/torque/significance'
import type { FourierSeries } from '#shared/compute/terms/measurement'
import { amplitude, bench, characteristic, figuresOf, randomSource, settingsWith, warningCodes } from './support'

function sine(order: number, amplitudeNm: number, highest = order): FourierSeries {
  const series: FourierSeries = { meanNm: 0, cosNm: new Array<number>(highest).fill(0), sinNm: new Array<number>(highest).fill(0) }
  series.sinNm[order - 1] = amplitudeNm
  return series
}

describe('extremesOf', () => {
  /** A sampled sine of n points a period underreads its peak by at most 1 − cos(π/n); derivation. */
  it.each([[8, 0.0761], [20, 0.0123]])('finds the peak between grid points, where %i points a period underread it by up to %f', (points, share) => {
    expect(1 - Math.cos(Math.PI / points)).toBeCloseTo(share, 4)
    const series = sine(4, 1)
    // Half a step off, the worst case.
    const shift = Math.PI / (4 * points)
    const turned: FourierSeries = { ...series, cosNm: [0, 0, 0, Math.sin(4 * shift)], sinNm: [0, 0, 0, Math.cos(4 * shift)] }
    const grid = evaluateSeries(turned, 4 * points)
    const { highest, lowest } = extremesOf(turned, grid)
    expect(highest).toBeCloseTo(1, 9)
    expect(lowest).toBeCloseTo(-1, 9)
  })

  it('finds the higher of two peaks that the grid shows in the wrong order', () => {
    const series: FourierSeries = { meanNm: 0.25, cosNm: [0.001, 1], sinNm: [0, 0.3] }
    const dense = evaluateSeries(series, 100_000)
    const { highest, lowest } = extremesOf(series, evaluateSeries(series, 32))
    expect(highest).toBeCloseTo(Math.max(...dense), 8)
    expect(lowest).toBeCloseTo(Math.min(...dense), 8)
  })
})

describe('evaluateSeries', () => {
  it('equals the sum of cosines and sines at every point', () => {
    const { normal } = randomSource(5)
    const series: FourierSeries = { meanNm: 0.7, cosNm: Array.from({ length: 30 }, normal), sinNm: Array.from({ length: 30 }, normal) }
    evaluateSeries(series, 77).forEach((value, index) => {
      expect(value).toBeCloseTo(evaluateAt(series, (2 * Math.PI * index) / 77).value, 10)
    })
  })

  it('refuses a number of points that is no whole number from 1', () => {
    for (const points of [0, 1.5, -3, NaN]) expect(() => evaluateSeries(sine(1, 1), points)).toThrow(RangeError)
  })
})

describe('compensatedPeakToPeak', () => {
  /** Linear interpolation of P entries leaves A(1 − cos(πk/P)) of order k; derivation. */
  it.each([[84, 1024], [84, 512], [12, 256]])('leaves of order %i what a table of %i entries cannot hold', (order, entries) => {
    const left = compensatedPeakToPeak(sine(order, 1), 4096, { entries, stepNm: 0 })
    const expected = 2 * (1 - Math.cos((Math.PI * order) / entries))
    expect(left / expected).toBeGreaterThan(0.98)
    expect(left / expected).toBeLessThan(1.02)
  })

  /** A quantiser alone leaves one step peak-to-peak, and halving the step halves it; derivation. */
  it('leaves one step of the drive with a fine table, and half of it with half the step', () => {
    const left = (stepNm: number) => compensatedPeakToPeak(sine(4, 1), 4096, { entries: 16_384, stepNm })
    expect(left(0.02)).toBeCloseTo(0.02, 4)
    expect(left(0.01)).toBeCloseTo(0.01, 4)
  })

  it('leaves all of it when the drive\'s step is more than twice the torque', () => {
    expect(compensatedPeakToPeak(sine(4, 1), 4096, { entries: 1024, stepNm: 2.1 })).toBeCloseTo(2, 4)
  })
})

describe('significance', () => {
  it('takes noise alone for an order in about one map of a hundred', () => {
    const { normal } = randomSource(11)
    let alarms = 0
    for (let map = 0; map < 2000; map++) {
      const orders = Array.from({ length: 100 }, () => Math.hypot(normal(), normal()))
      if (Math.max(...orders) > significantAmplitude(1, 100)) alarms++
    }
    expect(alarms / 2000).toBeGreaterThan(0.004)
    expect(alarms / 2000).toBeLessThan(0.017)
  })

  it('keeps peak-to-peak from growing with noise that no order stands above', () => {
    const quiet = characteristic(figuresOf(bench({ noiseMilliNm: 0.001 })), 'cogging.peakToPeak').value!
    const noisy = characteristic(figuresOf(bench({ noiseMilliNm: 0.1 })), 'cogging.peakToPeak').value!
    expect(Math.abs(noisy / quiet - 1)).toBeLessThan(0.005)
  })

  it('keeps only orders above the threshold in the clear part', () => {
    const series: FourierSeries = { meanNm: 0, cosNm: [0.001, 1, 0.002], sinNm: [0, 0, 0] }
    expect(clearPart(series, 0.001).series.cosNm).toEqual([0, 1, 0])
  })
})

describe('analyse', () => {
  const result = figuresOf(bench(), settingsWith({ ordersNamed: [12, 20] }))

  it('states engine version, rows, turns and directions', () => {
    expect(result).toMatchObject({ engineVersion: ENGINE_VERSION, rows: 4800, turns: 2, directions: 'both', highestOrder: 252 })
  })

  it('lists every order that a limit names, significant or not', () => {
    expect(result.orders.map(({ order, significant }) => [order, significant])).toEqual([[12, true], [14, true], [20, false], [84, true]])
    expect(characteristic(result, 'order.12').value! * 1e3).toBeCloseTo(0.4, 2)
    expect(characteristic(result, 'order.12.ofRated').value).toBeCloseTo(0.4, 1)
    expect(characteristic(result, 'order.12.ofDesign').value).toBeCloseTo(100 * 0.4 / 3, 0)
  })

  it('sums groups as power and counts each order by its origin', () => {
    expect(characteristic(result, 'group.rotorSide').value! * 1e3).toBeCloseTo(0.4 / Math.SQRT2, 2)
    expect(characteristic(result, 'group.statorSide').value! * 1e3).toBeCloseTo(0.3 / Math.SQRT2, 2)
    expect(characteristic(result, 'group.design').value! * 1e3).toBeCloseTo(3 / Math.SQRT2, 2)
    expect(characteristic(result, 'harmonicContent').value).toBeCloseTo(0.5 / 3, 2)
  })

  it('takes the detent peak with friction in it', () => {
    const plain = figuresOf(bench({ orders: { 84: [3, -90] } }))
    expect(characteristic(plain, 'detent.peak').value! * 1e3).toBeCloseTo(4.5, 1)
  })

  it('refuses a ratio to the mean of a map without load, and says so', () => {
    for (const definition of ['peakToPeakOverMean', 'halfPeakToPeakOverMean', 'maxMinusMinOverMaxPlusMin', 'largestDeviationOverMean', 'rmsOverMean'] as const) {
      const judged = figuresOf(bench(), settingsWith({ rippleDefinition: definition }))
      expect(characteristic(judged, 'rippleRatio')).toMatchObject({ value: null, expandedUncertainty: null, notStated: expect.stringContaining('carries no load') })
    }
  })

  it('states no ratio to the rated torque when the part states none', () => {
    const judged = figuresOf(bench(), settingsWith({ ratedTorqueNm: null }))
    expect(characteristic(judged, 'rippleRatio')).toMatchObject({ value: null, notStated: 'The part states no rated torque.' })
  })

  it('states repeatability from two turns of one direction on, not from one', () => {
    expect(characteristic(result, 'repeatability')).toMatchObject({ value: null, notStated: expect.stringContaining('two turns') })
    const several = figuresOf(bench({ turns: 4, noiseMilliNm: 0.08 }))
    expect(several.turns).toBe(8)
    // 256 bins of 2400 readings a turn: the mean of 9.4 readings scatters by 0.08/√9.4.
    expect(characteristic(several, 'repeatability').value! * 1e3).toBeCloseTo(0.08 / Math.sqrt(2400 / 256), 2)
  })

  it('states no uncertainty of a characteristic without a rig', () => {
    const bare = figuresOf(bench(), settingsWith({ rig: null }))
    for (const entry of bare.characteristics) expect(entry.expandedUncertainty, entry.key).toBeNull()
  })

  it('predicts what compensation leaves, and warns where repeatability is not in it', () => {
    const judged = figuresOf(bench(), settingsWith({ compensation: { entries: 1024, stepNm: 1e-4 } }))
    const left = characteristic(judged, 'afterCompensation.peakToPeak').value! * 1e3
    expect(left).toBeGreaterThan(0.1)
    expect(left).toBeLessThan(0.1 + 2 * 3.7 * (1 - Math.cos((Math.PI * 84) / 1024)) + 0.01)
    expect(characteristic(judged, 'afterCompensation.reduction').value).toBeCloseTo(100 * (1 - left / (characteristic(judged, 'cogging.peakToPeak').value! * 1e3)), 6)
    expect(warningCodes(judged)).toContain('repeatability-not-measured')
  })
})

describe('analyse finds an eccentric angle sensor', () => {
  const milliradians = 2
  const read = (angle: number) => angle + (milliradians / 1e3) * Math.cos(((angle - 40) * Math.PI) / 180) * (180 / Math.PI)

  it('by the sidebands of the strong orders, and gives its size', () => {
    const result = figuresOf(bench({ readAngle: read }))
    expect(characteristic(result, 'angleSensorEccentricity').value! * 1e3).toBeCloseTo(milliradians, 1)
    expect(warningCodes(result)).toContain('angle-sensor-eccentricity')
    expect(result.orders.find(({ order }) => order === 83)!.reason).toContain('the rig, not the motor')
  })

  it('but not in a true modulation of the amplitude', () => {
    const result = figuresOf(bench({ orders: { 84: [3, -90], 83: [0.25, -110], 85: [0.25, -70] } }))
    expect(characteristic(result, 'angleSensorEccentricity').value).toBeNull()
    expect(warningCodes(result)).not.toContain('angle-sensor-eccentricity')
    expect(result.orders.find(({ order }) => order === 85)!.reason).toContain('changes once per turn')
  })

  it('and not in a clean map', () => {
    expect(amplitude(figuresOf(bench()).cogging, 83)).toBeLessThan(1e-6)
    expect(characteristic(figuresOf(bench()), 'angleSensorEccentricity').notStated).toBe('No pair of sidebands shows it above the noise.')
  })
})
