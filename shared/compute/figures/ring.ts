import { extremes, extremesByColumn } from './extremes'
import type { TorqueText } from './extremes'
import { annulusPath, circlePath, polyline } from './path'
import type { Point } from './path'

/** The limit's half is drawn as this share of the zero circle's radius. */
const LIMIT_SHARE = 0.16
/** Without a limit the largest value is drawn as this share. */
const FREE_SHARE = 0.14
/** Nothing is drawn farther from the zero circle than this share; figures are never changed by it. */
const LARGEST_SHARE = 0.3
/** Up to this side a ring is a tile: many points are written in tenths, which keeps its path under 4 kB. */
const TILE_SIDE = 160

export interface RingInput {
  /** Cogging over one turn at equal steps from the index mark, N·m, mean removed; finite, 8 or more values. */
  values: ArrayLike<number>
  /** Limit of the peak to peak, N·m; null: none. */
  limitPeakToPeakNm: number | null
  /** Side of the square it is drawn in. */
  size: number
}

export interface RingGeometry {
  size: number
  centre: number
  /** Radius of the zero circle. */
  radius: number
  zeroCircle: string
  /** Annulus as wide as the limit, about the middle of the motor's range; null without a limit. */
  band: string | null
  /** Torque around the turn, closed. */
  trace: string
  /** Parts beyond the band, one path of many strokes; '' when there are none. */
  beyond: string
  /** How many strokes `beyond` has. */
  placesBeyond: number
  /** How far the drawing goes from the zero circle, as a share of its radius, at most 0.3. */
  reach: number
  /** True when a part lies so far out that the drawing is cut there. */
  cut: boolean
  /** Circles at which the drawing is cut; null when it is not. */
  cutEdge: string | null
}

/** A value of the turn with its place, in steps from the index mark; crossings lie between two steps. */
interface Reading { step: number; value: number }

/**
 * Torque around one turn of the shaft as a ring about a zero circle, clockwise from the index mark at the top.
 *
 * r(θ) = R·(1 + share·τ(θ)/(limit/2)), share 0.16, so that every ring with the same limit has the same scale. Drawn out to ±0.30 R.
 * The limit is one of the peak to peak, so the band lies about the middle of the range, (lowest + highest)/2: parts lie beyond it
 * exactly when the peak to peak of `values` is above the limit, however unevenly the torque lies about zero.
 *
 * @param input values, limit and size.
 * @returns path strings in a square with the origin at the top left.
 * @throws RangeError when there are fewer than 8 values, one is not finite, or the limit or size is not positive.
 */
export function ringGeometry(input: RingInput): RingGeometry {
  const { size, limitPeakToPeakNm } = input
  const values = Array.from(input.values)
  refuse(input, values)
  const centre = size / 2
  const radius = size / 2 / (1 + LARGEST_SHARE + 0.02)
  const { low, high } = extremes(values)
  const largest = Math.max(Math.abs(low), Math.abs(high))
  const gain = limitPeakToPeakNm !== null ? LIMIT_SHARE / (limitPeakToPeakNm / 2) : largest > 0 ? FREE_SHARE / largest : 0
  const radiusAt = (value: number) => radius * (1 + Math.max(-LARGEST_SHARE, Math.min(LARGEST_SHARE, gain * value)))
  const place = ({ step, value }: Reading): Point => {
    const angle = 2 * Math.PI * step / values.length
    return { x: centre + radiusAt(value) * Math.sin(angle), y: centre - radiusAt(value) * Math.cos(angle) }
  }
  const kept = extremesByColumn(values, Math.max(90, size * 1.8)).map((step): Reading => ({ step, value: values[step]! }))
  const decimals = size <= TILE_SIDE && kept.length > 300 ? 1 : 2
  const edges = limitPeakToPeakNm === null ? null : { low: (low + high - limitPeakToPeakNm) / 2, high: (low + high + limitPeakToPeakNm) / 2 }
  const strokes = edges === null || high - low <= limitPeakToPeakNm! ? [] : strokesBeyond(kept, values.length, edges)
  const cut = gain * largest > LARGEST_SHARE
  return {
    size, centre, radius, cut,
    reach: Math.min(LARGEST_SHARE, gain * largest),
    zeroCircle: circlePath(centre, centre, radius),
    band: edges && annulusPath(centre, centre, radiusAt(edges.high), radiusAt(edges.low)),
    trace: polyline(kept.map(place), true, decimals),
    beyond: strokes.map(stroke => polyline(stroke.map(place), false, decimals)).join(''),
    placesBeyond: strokes.length,
    cutEdge: cut ? circlePath(centre, centre, radius * (1 + LARGEST_SHARE)) + circlePath(centre, centre, radius * (1 - LARGEST_SHARE)) : null,
  }
}

function refuse({ size, limitPeakToPeakNm }: RingInput, values: readonly number[]): void {
  if (values.length < 8 || !values.every(Number.isFinite)) throw new RangeError('ringGeometry: values must be eight or more finite numbers')
  if (!(size > 0)) throw new RangeError(`ringGeometry: size must be above zero, got ${size}`)
  if (limitPeakToPeakNm !== null && !(limitPeakToPeakNm > 0)) throw new RangeError(`ringGeometry: limitPeakToPeakNm must be above zero or null, got ${limitPeakToPeakNm}`)
}

/**
 * The pieces of a closed line above the higher or below the lower edge, each from crossing to crossing.
 * A line from beyond one edge to beyond the other gives two pieces, with the stretch inside the band left out.
 */
function strokesBeyond(readings: readonly Reading[], steps: number, edges: { low: number; high: number }): Reading[][] {
  const side = (value: number) => value > edges.high ? 1 : value < edges.low ? -1 : 0
  const crossing = (a: Reading, b: Reading, edge: number): Reading => ({ step: a.step + (b.step - a.step) * (edge - a.value) / (b.value - a.value), value: edge })
  const edgeOf = (which: number) => which > 0 ? edges.high : edges.low
  // The walk begins where a stroke begins, so that none is torn at the index mark.
  const begin = readings.findIndex((reading, index) => side(reading.value) !== 0 && side(reading.value) !== side(readings.at(index - 1)!.value))
  // Rounding can leave a range one last digit above the limit with no reading beyond an edge.
  if (begin < 0) return []
  const walk = [...readings.slice(begin), ...readings.slice(0, begin + 1).map(reading => ({ ...reading, step: reading.step + steps }))]
  const before = readings.at(begin - 1)!
  let previous: Reading = { ...before, step: begin === 0 ? before.step - steps : before.step }
  const strokes: Reading[][] = []
  let stroke: Reading[] = []
  for (const reading of walk) {
    const was = side(previous.value)
    const is = side(reading.value)
    if (is !== was && was !== 0 && stroke.length > 0) {
      strokes.push([...stroke, crossing(previous, reading, edgeOf(was))])
      stroke = []
    }
    if (is !== was && is !== 0) stroke = [crossing(previous, reading, edgeOf(is))]
    if (is !== 0) stroke.push(reading)
    previous = reading
  }
  return strokes
}

/**
 * The ring in words, for those who do not see it.
 *
 * @param input what was drawn.
 * @param geometry the drawing of it.
 * @param text how a torque is written.
 */
export function describeRing(input: RingInput, geometry: RingGeometry, text: TorqueText): string {
  const { low, high } = extremes(input.values)
  const range = `Cogging torque around one turn, about ${text(high - low)} peak to peak`
  if (input.limitPeakToPeakNm === null) return `${range}, no limit.`
  const places = geometry.placesBeyond === 1 ? 'one place lies' : `${geometry.placesBeyond} places lie`
  const beyond = geometry.placesBeyond === 0 ? 'all of it lies inside the limit band.' : `${places} outside the limit band.`
  return `${range}, limit ${text(input.limitPeakToPeakNm)}; ${beyond}${geometry.cut ? ' It reaches farther than is drawn.' : ''}`
}
