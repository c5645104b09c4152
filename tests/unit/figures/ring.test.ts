import { describe, expect, it } from 'vitest'
import { ringGeometry } from '#shared/compute/figures/ring'

const turn = (peakNm: number, order: number, points = 2048) => Float64Array.from({ length: points }, (_, index) => peakNm * Math.cos(2 * Math.PI * order * index / points))
const points = (path: string) => [...path.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)].map(match => ({ x: Number(match[1]), y: Number(match[2]) }))
const LIMIT = 5.4e-3

describe('ringGeometry', () => {
  it('draws the limit’s half as 16 % of the zero circle', () => {
    const ring = ringGeometry({ values: turn(LIMIT / 2, 4), limitPeakToPeakNm: LIMIT, size: 360 })
    const radii = points(ring.trace).map(point => Math.hypot(point.x - ring.centre, point.y - ring.centre) / ring.radius)
    expect(Math.max(...radii)).toBeCloseTo(1.16, 3)
    expect(Math.min(...radii)).toBeCloseTo(0.84, 3)
  })

  it('begins at the index mark on top and runs clockwise', () => {
    const ring = ringGeometry({ values: Array.from({ length: 360 }, (_, index) => index < 90 ? 1e-3 : 0), limitPeakToPeakNm: LIMIT, size: 100 })
    const [first] = points(ring.trace)
    expect(first!.x).toBeCloseTo(ring.centre, 1)
    expect(first!.y).toBeLessThan(ring.centre - ring.radius)
    const quarter = points(ring.trace)[45]!
    expect(quarter.x).toBeGreaterThan(ring.centre)
  })

  it.each([[0.999, ''], [1, '']])('marks nothing beyond the band at %f of the limit', (share, beyond) => {
    expect(ringGeometry({ values: turn(share * LIMIT / 2, 12), limitPeakToPeakNm: LIMIT, size: 360 }).beyond).toBe(beyond)
  })

  it('marks one stroke for each peak just above the limit, beginning and ending on the band’s edge', () => {
    const ring = ringGeometry({ values: turn(1.05 * LIMIT / 2, 12), limitPeakToPeakNm: LIMIT, size: 360 })
    const strokes = ring.beyond.split('M').filter(Boolean)
    expect(strokes).toHaveLength(24)
    for (const stroke of strokes) {
      const [first] = points(`M${stroke}`)
      const share = Math.abs(Math.hypot(first!.x - ring.centre, first!.y - ring.centre) / ring.radius - 1)
      expect(share).toBeCloseTo(0.16, 3)
    }
  })

  it('cuts the drawing, not the figures, for a motor far beyond its limit', () => {
    const ring = ringGeometry({ values: turn(5 * LIMIT, 12), limitPeakToPeakNm: LIMIT, size: 360 })
    expect(ring.cut).toBe(true)
    for (const point of points(ring.trace)) expect(Math.hypot(point.x - ring.centre, point.y - ring.centre)).toBeLessThanOrEqual(180)
  })

  it('keeps the path of a small ring short, with the highest and lowest values still there', () => {
    const values = turn(1e-3, 84, 4096)
    values[1000] = 2.4e-3
    const ring = ringGeometry({ values, limitPeakToPeakNm: LIMIT, size: 100 })
    expect(ring.trace.length).toBeLessThan(6000)
    const radii = points(ring.trace).map(point => Math.hypot(point.x - ring.centre, point.y - ring.centre) / ring.radius)
    expect(Math.max(...radii)).toBeCloseTo(1 + 0.16 * 2.4e-3 / (LIMIT / 2), 2)
  })

  it('scales by the motor’s own amplitude where there is no limit', () => {
    const ring = ringGeometry({ values: turn(1e-6, 12), limitPeakToPeakNm: null, size: 100 })
    expect(ring.band).toBeNull()
    expect(Math.max(...points(ring.trace).map(point => Math.hypot(point.x - ring.centre, point.y - ring.centre) / ring.radius))).toBeCloseTo(1.14, 2)
  })

  it.each([[[1, 2, 3], LIMIT, 100], [[...turn(1, 1)].fill(Number.NaN), LIMIT, 100], [turn(1e-3, 1), 0, 100], [turn(1e-3, 1), LIMIT, 0]])('refuses what cannot be drawn', (values, limitPeakToPeakNm, size) => {
    expect(() => ringGeometry({ values, limitPeakToPeakNm, size })).toThrow(RangeError)
  })
})
