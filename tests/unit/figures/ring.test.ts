import { describe, expect, it } from 'vitest'
import { describeRing, ringGeometry } from '#shared/compute/figures/ring'

const turn = (peakNm: number, order: number, points = 2048) => Float64Array.from({ length: points }, (_, index) => peakNm * Math.cos(2 * Math.PI * order * index / points))
const points = (path: string) => [...path.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)].map(match => ({ x: Number(match[1]), y: Number(match[2]) }))
const LIMIT = 5.4e-3
const share = (ring: { centre: number; radius: number }, point: { x: number; y: number }) => Math.hypot(point.x - ring.centre, point.y - ring.centre) / ring.radius - 1
/** Peaks that are higher than the dips are deep: its range lies unevenly about zero. */
const uneven = (first: number, second: number) => Array.from({ length: 4096 }, (_, index) => first * Math.cos(2 * Math.PI * 84 * index / 4096) + second * Math.cos(2 * Math.PI * 168 * index / 4096))

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
    expect(ring.trace.length).toBeLessThan(4000)
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

  it.each([360, 500, 720, 1024, 4096])('keeps the path of a tile under 4 kB from %i values', (count) => {
    expect(ringGeometry({ values: turn(2.2e-3, 84, count), limitPeakToPeakNm: LIMIT, size: 100 }).trace.length).toBeLessThan(4000)
  })

  it('marks nothing beyond the band while the peak to peak is inside its limit, though one side alone is above its half', () => {
    const values = uneven(2.15e-3, 0.7e-3)
    expect(Math.max(...values)).toBeGreaterThan(LIMIT / 2)
    expect(Math.max(...values) - Math.min(...values)).toBeLessThan(LIMIT)
    expect(ringGeometry({ values, limitPeakToPeakNm: LIMIT, size: 360 })).toMatchObject({ beyond: '', placesBeyond: 0 })
  })

  it('marks peaks and dips alike when an uneven range is just above its limit', () => {
    const values = uneven(2.15e-3, 0.7e-3)
    const ring = ringGeometry({ values, limitPeakToPeakNm: 0.98 * (Math.max(...values) - Math.min(...values)), size: 360 })
    const sides = ring.beyond.split('M').filter(Boolean).map(stroke => Math.sign(share(ring, points(`M${stroke}`)[0]!)))
    expect(sides.filter(side => side > 0)).toHaveLength(84)
    expect(sides.filter(side => side < 0)).toHaveLength(168)
  })

  it('leaves the stretch inside the band out of a jump from beyond one edge to beyond the other', () => {
    const ring = ringGeometry({ values: Array.from({ length: 16 }, (_, index) => index % 2 ? LIMIT : -LIMIT), limitPeakToPeakNm: LIMIT, size: 360 })
    expect(ring.placesBeyond).toBe(16)
    for (const point of points(ring.beyond)) expect(Math.abs(share(ring, point))).toBeGreaterThan(0.159)
  })

  it('does not tear a stroke that lies across the index mark', () => {
    const ring = ringGeometry({ values: turn(1.05 * LIMIT / 2, 1, 360), limitPeakToPeakNm: LIMIT, size: 360 })
    expect(ring.placesBeyond).toBe(2)
    const across = ring.beyond.split('M').filter(Boolean).map(stroke => points(`M${stroke}`)).find(stroke => stroke[0]!.y < ring.centre)!
    expect(across[0]!.x).toBeLessThan(ring.centre)
    expect(across.at(-1)!.x).toBeGreaterThan(ring.centre)
  })

  it('shows where the drawing is cut, and only then', () => {
    const at = (peakNm: number) => ringGeometry({ values: turn(peakNm, 12), limitPeakToPeakNm: LIMIT, size: 360 })
    const edge = 0.3 / 0.16 * LIMIT / 2
    expect(at(0.999 * edge)).toMatchObject({ cut: false, cutEdge: null })
    expect(at(0.999 * edge).reach).toBeCloseTo(0.2997, 6)
    expect(at(2 * edge).reach).toBe(0.3)
    expect(at(1.001 * edge).cut).toBe(true)
    expect(points(at(1.001 * edge).cutEdge!)).not.toHaveLength(0)
  })

  it.each([null, LIMIT])('draws a motor without any torque as the zero circle (limit %s)', (limitPeakToPeakNm) => {
    const ring = ringGeometry({ values: Array.from({ length: 64 }, () => 0), limitPeakToPeakNm, size: 100 })
    expect(ring.trace).not.toContain('NaN')
    for (const point of points(ring.trace)) expect(share(ring, point)).toBeCloseTo(0, 2)
  })
})

describe('describeRing', () => {
  const text = (torqueNm: number) => `${(torqueNm * 1e3).toFixed(2)} mN·m`
  const say = (peakNm: number, limitPeakToPeakNm: number | null) => {
    const input = { values: turn(peakNm, 4), limitPeakToPeakNm, size: 100 }
    return describeRing(input, ringGeometry(input), text)
  }

  it('says that all lies inside the band', () => expect(say(2e-3, LIMIT)).toBe('Cogging torque around one turn, about 4.00 mN·m peak to peak, limit 5.40 mN·m; all of it lies inside the limit band.'))
  it('counts the places outside the band', () => expect(say(3e-3, LIMIT)).toContain('8 places lie outside the limit band.'))
  it('says that the drawing is cut', () => expect(say(9e-3, LIMIT)).toMatch(/18\.00 mN·m peak to peak.*reaches farther than is drawn/))
  it('says that there is no limit', () => expect(say(2e-3, null)).toBe('Cogging torque around one turn, about 4.00 mN·m peak to peak, no limit.'))
})
