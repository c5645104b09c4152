import { describe, expect, it } from 'vitest'
import { combGeometry, describeComb } from '#shared/compute/figures/comb'
import { controlChartGeometry, describeControlChart } from '#shared/compute/figures/control-chart'
import { describeTrace, tickLabel, torquePrefix, traceGeometry } from '#shared/compute/figures/trace'

const wave = (peakNm: number, order: number) => Array.from({ length: 4096 }, (_, index) => peakNm * Math.sin(2 * Math.PI * order * index / 4096))
const text = (torqueNm: number) => `${(torqueNm * 1e3).toFixed(2)} mN·m`

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

describe('traceGeometry of unusual motors', () => {
  it('draws a motor without any torque as a flat line on an axis', () => {
    const geometry = traceGeometry({ coggingNm: Array.from({ length: 16 }, () => 0), forwardNm: null, reverseNm: null, limitPeakToPeakNm: null, width: 720, height: 250 })
    expect(geometry.cogging).not.toContain('NaN')
    expect(geometry.yTicks.map(tick => tick.label)).toContain('0')
  })

  it('lays the band about the middle of the range and keeps it inside the plot', () => {
    const coggingNm = wave(1e-3, 12).map(value => value + 4e-3)
    const { band, plot, heightOf } = traceGeometry({ coggingNm, forwardNm: null, reverseNm: null, limitPeakToPeakNm: 5.4e-3, width: 720, height: 250 })
    expect(band!.top).toBeCloseTo(heightOf(6.7e-3), 6)
    expect(band!.top + band!.height).toBeCloseTo(heightOf(1.3e-3), 6)
    expect(band!.top).toBeGreaterThanOrEqual(plot.top)
  })

  it('ends at 360° with the value of 0°', () => {
    const coggingNm = Array.from({ length: 4096 }, (_, index) => 1e-3 * Math.cos(2 * Math.PI * 5 * index / 4096))
    const { cogging, plot } = traceGeometry({ coggingNm, forwardNm: null, reverseNm: null, limitPeakToPeakNm: null, width: 720, height: 250 })
    const places = [...cogging.matchAll(/[ML]([\d.]+) ([\d.]+)/g)].map(match => match.slice(1).map(Number))
    expect(places.at(-1)).toEqual([plot.right, places[0]![1]])
  })

  it('refuses a limit of zero', () => {
    expect(() => traceGeometry({ coggingNm: wave(1e-3, 1), forwardNm: null, reverseNm: null, limitPeakToPeakNm: 0, width: 720, height: 250 })).toThrow(RangeError)
  })
})

describe('describeTrace', () => {
  const input = { coggingNm: wave(2e-3, 4), forwardNm: null, reverseNm: null, limitPeakToPeakNm: null, width: 720, height: 250 }
  it('says the range of each direction', () => {
    expect(describeTrace({ ...input, forwardNm: wave(2e-3, 4).map(value => value + 1e-3), reverseNm: wave(2e-3, 4).map(value => value - 1e-3) }, text))
      .toBe('Cogging runs from -2.00 mN·m to 2.00 mN·m over one turn. Forward it runs from -1.00 mN·m to 3.00 mN·m, in reverse from -3.00 mN·m to 1.00 mN·m.')
  })
  it('says that one direction is missing', () => expect(describeTrace(input, text)).toContain('One direction only'))
  it.each([[4.001e-3, 'stays inside'], [4e-3, 'stays inside'], [3.999e-3, 'leaves']])('compares a peak to peak of 4 mN·m with a limit of %f N·m', (limitPeakToPeakNm, words) => {
    expect(describeTrace({ ...input, limitPeakToPeakNm }, text)).toContain(words)
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

  it('draws an empty axis where no order stands out', () => {
    const geometry = combGeometry({ orders: [], limits: [], highestOrder: 64, width: 720, height: 250 })
    expect(geometry.teeth).toEqual([])
    expect(geometry.yTicks.length).toBeGreaterThan(1)
  })

  it('keeps the notch of a limit above the highest order inside the plot', () => {
    const geometry = combGeometry({ orders: [row(12, 1e-3)], limits: [{ order: 300, upperNm: 1e-3 }], highestOrder: 64, width: 720, height: 250 })
    expect(geometry.notches[0]!.x).toBeLessThanOrEqual(geometry.plot.right)
  })

  it('shortens notches of neighbouring orders so that they do not touch', () => {
    const { notches } = combGeometry({ orders: [row(84, 2e-3)], limits: [{ order: 12, upperNm: 6e-4 }, { order: 14, upperNm: 6e-4 }, { order: 84, upperNm: 2e-3 }], highestOrder: 252, width: 720, height: 250 })
    expect(notches[0]!.x + notches[0]!.halfWidth).toBeLessThan(notches[1]!.x - notches[1]!.halfWidth)
    expect(notches[2]!.halfWidth).toBe(9)
  })

  it('gives the teeth in rising order, so that keys walk them from left to right', () => {
    const geometry = combGeometry({ orders: [row(84, 2e-3), row(12, 1e-3)], limits: [], highestOrder: 252, width: 720, height: 250 })
    expect(geometry.teeth.map(tooth => tooth.order)).toEqual([12, 84])
  })

  it('refuses a negative amplitude', () => {
    expect(() => combGeometry({ orders: [row(1, -1)], limits: [], highestOrder: 10, width: 720, height: 250 })).toThrow(RangeError)
  })
})

describe('describeComb', () => {
  const input = { orders: [{ order: 12, amplitudeNm: 8e-4, origins: ['rotorSide' as const, 'statorSide' as const] }, { order: 84, amplitudeNm: 2e-3, origins: ['design' as const] }], limits: [{ order: 12, upperNm: 6e-4 }], highestOrder: 252, width: 720, height: 250 }
  it('says the largest first, with both origins where an order fits both, then what is above its limit', () => {
    expect(describeComb(input, text)).toBe('Order 84: 2.00 mN·m, design. Order 12: 0.80 mN·m, rotor side or stator side. Above its limit: order 12 with 0.80 mN·m (limit 0.60 mN·m).')
  })
  it('says when none is above its limit', () => expect(describeComb({ ...input, limits: [{ order: 12, upperNm: 8e-4 }] }, text)).toContain('No order lies above its limit.'))
  it('says when no order stands out', () => expect(describeComb({ ...input, orders: [] }, text)).toBe('No order stands out from the noise.'))
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

  const plain = { limits: null, sheetUpper: null, signals: [], width: 960, height: 320, floor: 0 }

  it('breaks the line where a value is missing and keeps its place', () => {
    const geometry = controlChartGeometry({ ...plain, values: [1, 2, null, 4], labels: ['a', 'b', 'c', 'd'] })
    expect(geometry.line.match(/M/g)).toHaveLength(2)
    expect(geometry.points.map(point => point.index)).toEqual([0, 1, 3])
    expect(geometry.missing.map(place => place.index)).toEqual([2])
    expect(geometry.missing[0]!.x).toBeCloseTo((geometry.points[1]!.x + geometry.points[2]!.x) / 2, 6)
  })

  it('labels the first and the last point, the others as far as there is room', () => {
    const labels = Array.from({ length: 20 }, (_, index) => `lot ${index}`)
    const { xTicks } = controlChartGeometry({ ...plain, values: labels.map((_, index) => index), labels })
    expect([xTicks[0]!.label, xTicks.at(-1)!.label]).toEqual(['lot 0', 'lot 19'])
    for (let index = 1; index < xTicks.length; index++) expect(xTicks[index]!.at - xTicks[index - 1]!.at).toBeGreaterThanOrEqual(96)
  })

  it('moves the names of close lines apart, in the order of the lines, inside the plot', () => {
    const { lineLabels, plot } = controlChartGeometry({ ...plain, values: [1, 9, 0.2], labels: ['a', 'b', 'c'], limits: { centre: 0.1, lower: 0.05, upper: 0.15 }, sheetUpper: 0.16 })
    expect(lineLabels.map(label => label.line)).toEqual(['sheetUpper', 'upper', 'centre', 'lower'])
    for (let index = 1; index < lineLabels.length; index++) expect(lineLabels[index]!.at - lineLabels[index - 1]!.at).toBeGreaterThanOrEqual(14.999)
    expect(lineLabels.at(-1)!.at).toBeLessThanOrEqual(plot.bottom)
  })

  it('refuses a chart of nothing', () => {
    expect(() => controlChartGeometry({ ...plain, values: [null], labels: ['a'] })).toThrow(RangeError)
  })
})

describe('describeControlChart', () => {
  const input = { values: [4, null, 6], labels: ['Mon', 'Tue', 'Wed'], limits: { centre: 4, lower: 3, upper: 5 }, sheetUpper: 7, signals: [false, false, true], width: 960, height: 320, floor: 0 }
  const names = ['A', 'B', 'C']
  const unit = (value: number) => `${value} mN·m`
  it('says how many, the lines, what is missing and what lies outside', () => {
    expect(describeControlChart(input, names, unit)).toBe('3 points, 1 of them not stated. Centre 4 mN·m, control limits 3 mN·m to 5 mN·m. Limit of the sheet 7 mN·m. Outside the control limits: C with 6 mN·m.')
  })
  it('says when no point lies outside', () => expect(describeControlChart({ ...input, signals: [] }, names, unit)).toContain('No point lies outside'))
  it('says that there are no control limits yet', () => expect(describeControlChart({ ...input, limits: null, sheetUpper: null }, names, unit)).toBe('3 points, 1 of them not stated. No control limits yet.'))
})
