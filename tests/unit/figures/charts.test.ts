import { describe, expect, it } from 'vitest'
import { combGeometry } from '#shared/compute/figures/comb'
import { controlChartGeometry } from '#shared/compute/figures/control-chart'
import { tickLabel, torquePrefix, traceGeometry } from '#shared/compute/figures/trace'

const wave = (peakNm: number, order: number) => Array.from({ length: 4096 }, (_, index) => peakNm * Math.sin(2 * Math.PI * order * index / 4096))

describe('torquePrefix', () => {
  it.each([[1, 'N·m'], [0.999, 'mN·m'], [1e-3, 'mN·m'], [0.999e-3, 'μN·m']])('shows %f N·m in %s', (largest, unit) => expect(torquePrefix(largest).unit).toBe(unit))
})

describe('tickLabel', () => {
  it('has no float noise and a true minus sign', () => {
    expect(tickLabel(0.1 + 0.2)).toBe('0.3')
    expect(tickLabel(-2)).toBe('\u22122')
  })
})

describe('traceGeometry', () => {
  it('keeps the plot symmetric about zero, with the limit band in its middle', () => {
    const geometry = traceGeometry({ coggingNm: wave(2e-3, 84), forwardNm: null, reverseNm: null, limitPeakToPeakNm: 5.4e-3, width: 720, height: 250 })
    const middle = (geometry.plot.top + geometry.plot.bottom) / 2
    expect(geometry.band!.top + geometry.band!.height / 2).toBeCloseTo(middle, 6)
    expect(geometry.yTicks.map(tick => tick.label)).toContain('0')
    expect(geometry.forward).toBeNull()
    expect(geometry.unit).toBe('mN·m')
  })

  it('draws no more than two points a column, yet reaches both extremes', () => {
    const geometry = traceGeometry({ coggingNm: wave(2e-3, 84), forwardNm: null, reverseNm: null, limitPeakToPeakNm: null, width: 720, height: 250 })
    expect(geometry.cogging.split('L').length).toBeLessThanOrEqual(2 * 720)
    const heights = [...geometry.cogging.matchAll(/ (-?[\d.]+)(?=L|$)/g)].map(match => Number(match[1]))
    expect(Math.max(...heights) - Math.min(...heights)).toBeCloseTo(geometry.plot.bottom - geometry.plot.top, 0)
  })

  it('refuses a series that is not finite', () => {
    expect(() => traceGeometry({ coggingNm: [1, 2, 3, 4, 5, 6, 7, Number.NaN], forwardNm: null, reverseNm: null, limitPeakToPeakNm: null, width: 720, height: 250 })).toThrow(RangeError)
  })
})

describe('combGeometry', () => {
  const row = (order: number, amplitudeNm: number) => ({ order, amplitudeNm, origins: ['rotorSide' as const] })

  it('labels the largest of teeth that stand too close', () => {
    const geometry = combGeometry({ orders: [row(12, 8e-4), row(13, 5e-4), row(84, 2e-3)], limits: [], highestOrder: 252, width: 720, height: 250 })
    expect(geometry.teeth.filter(tooth => tooth.labelled).map(tooth => tooth.order)).toEqual([12, 84])
  })

  it('labels a tooth above its limit before a larger neighbour, and marks it only above, not at the limit', () => {
    const geometry = combGeometry({ orders: [row(12, 6.001e-4), row(13, 9e-4)], limits: [{ order: 12, upperNm: 6e-4 }], highestOrder: 252, width: 720, height: 250 })
    expect(geometry.teeth.find(tooth => tooth.order === 12)).toMatchObject({ over: true, labelled: true })
    expect(combGeometry({ orders: [row(12, 6e-4)], limits: [{ order: 12, upperNm: 6e-4 }], highestOrder: 252, width: 720, height: 250 }).teeth[0]!.over).toBe(false)
  })

  it('refuses a negative amplitude', () => {
    expect(() => combGeometry({ orders: [row(1, -1)], limits: [], highestOrder: 10, width: 720, height: 250 })).toThrow(RangeError)
  })
})

describe('controlChartGeometry', () => {
  it('places centre and limits, and clips a lower limit that cannot occur', () => {
    const geometry = controlChartGeometry({ values: [1, 2, 3], labels: ['a', 'b', 'c'], limits: { centre: 2, lower: -1, upper: 5 }, sheetUpper: 6, signals: [false, false, true], width: 900, height: 300, floor: 0 })
    expect(geometry.lower).toBeNull()
    expect(geometry.upper!).toBeLessThan(geometry.centre!)
    expect(geometry.sheetUpper!).toBeLessThan(geometry.upper!)
    expect(geometry.points.map(point => point.signal)).toEqual([false, false, true])
  })

  it('draws a single point in the middle', () => {
    const geometry = controlChartGeometry({ values: [2], labels: ['a'], limits: null, sheetUpper: null, signals: [false], width: 900, height: 300, floor: 0 })
    expect(geometry.points[0]!.x).toBeCloseTo((geometry.plot.left + geometry.plot.right) / 2, 6)
  })

  it('refuses values without labels', () => {
    expect(() => controlChartGeometry({ values: [1, 2], labels: ['a'], limits: null, sheetUpper: null, signals: [], width: 900, height: 300, floor: null })).toThrow(RangeError)
  })
})
