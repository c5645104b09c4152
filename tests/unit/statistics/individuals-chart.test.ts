import { describe, expect, it } from 'vitest'
import { individualsLimits, movingRanges } from '#shared/compute/statistics/individuals-chart'
import published from '../../reference/individuals-chart.json'

describe('individualsLimits', () => {
  it('agrees with the e-Handbook’s flow-rate example (NIST/SEMATECH 6.3.2.2)', () => {
    const limits = individualsLimits(published.x)
    expect(limits.centre).toBeCloseTo(published.mean, 10)
    expect(limits.movingRangeCentre).toBeCloseTo(published.meanMovingRange, 4)
    expect(Math.abs(limits.upper - published.upper)).toBeLessThan(published.tolerance)
    expect(Math.abs(limits.lower - published.lower)).toBeLessThan(published.tolerance)
  })

  it('takes two values, and refuses one or a value that is not finite', () => {
    expect(individualsLimits([1, 3])).toMatchObject({ centre: 2, movingRangeCentre: 2 })
    expect(() => individualsLimits([1])).toThrow(RangeError)
    expect(() => individualsLimits([1, Number.NaN])).toThrow(RangeError)
  })

  it('has one range less than values', () => expect(movingRanges([3, 1, 4])).toEqual([2, 3]))
})
