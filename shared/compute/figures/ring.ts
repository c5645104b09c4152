import { circlePath, polyline } from './path'
import type { Point } from './path'

/** The limit's half is drawn as this share of the zero circle's radius. */
const LIMIT_SHARE = 0.16
/** Without a limit the largest value is drawn as this share. */
const FREE_SHARE = 0.14
/** Nothing is drawn farther from the zero circle than this share; figures are never changed by it. */
const LARGEST_SHARE = 0.3

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
  /** Annulus of the limit (draw with even-odd fill); null without a limit. */
  band: string | null
  /** Torque around the turn, closed. */
  trace: string
  /** Parts beyond the band, one path of many strokes; '' when there are none. */
  beyond: string
  /** True when a part lies so far out that the drawing is cut there. */
  cut: boolean
}

/**
 * Torque around one turn of the shaft as a ring about a zero circle, clockwise from the index mark at the top.
 *
 * r(θ) = R·(1 + share·τ(θ)/(limit/2)), share 0.16, so that every ring with the same limit has the same scale. Drawn out to ±0.30 R.
 *
 * @param input values, limit and size.
 * @returns path strings in a square with the origin at the top left.
 * @throws RangeError when there are fewer than 8 values, one is not finite, or the limit or size is not positive.
 */
export function ringGeometry(input: RingInput): RingGeometry {
  const { size, limitPeakToPeakNm } = input
  const values = Array.from(input.values)
  if (values.length < 8 || !values.every(Number.isFinite)) throw new RangeError('ringGeometry: values must be eight or more finite numbers')
  if (!(size > 0)) throw new RangeError(`ringGeometry: size must be above zero, got ${size}`)
  if (limitPeakToPeakNm !== null && !(limitPeakToPeakNm > 0)) throw new RangeError(`ringGeometry: limitPeakToPeakNm must be above zero or null, got ${limitPeakToPeakNm}`)
  const centre = size / 2
  const radius = size / 2 / (1 + LARGEST_SHARE + 0.02)
  const half = limitPeakToPeakNm === null ? null : limitPeakToPeakNm / 2
  const largest = Math.max(...values.map(Math.abs), Number.MIN_VALUE)
  const gain = half === null ? FREE_SHARE / largest : LIMIT_SHARE / half
  const place = (index: number, value: number): Point => {
    const share = Math.max(-LARGEST_SHARE, Math.min(LARGEST_SHARE, gain * value))
    const angle = 2 * Math.PI * index / values.length
    const r = radius * (1 + share)
    return { x: centre + r * Math.sin(angle), y: centre - r * Math.cos(angle) }
  }
  const kept = thinOut(values, size)
  return {
    size, centre, radius,
    zeroCircle: circlePath(centre, centre, radius),
    band: half === null ? null : circlePath(centre, centre, radius * (1 + LIMIT_SHARE)) + circlePath(centre, centre, radius * (1 - LIMIT_SHARE)),
    trace: polyline(kept.map(index => place(index, values[index]!)), true),
    beyond: half === null ? '' : strokesBeyond(values, half, place),
    cut: values.some(value => Math.abs(gain * value) > LARGEST_SHARE),
  }
}

/** Indices that a ring of this size needs: per short arc the first value, the lowest and the highest, in order. */
function thinOut(values: readonly number[], size: number): number[] {
  const arcs = Math.max(90, Math.round(size * 1.8))
  if (values.length <= 3 * arcs) return values.map((_, index) => index)
  const kept: number[] = []
  for (let arc = 0; arc < arcs; arc++) {
    const from = Math.floor(arc * values.length / arcs)
    const to = Math.floor((arc + 1) * values.length / arcs)
    let low = from
    let high = from
    for (let index = from; index < to; index++) {
      if (values[index]! < values[low]!) low = index
      if (values[index]! > values[high]!) high = index
    }
    kept.push(...(low < high ? [low, high] : low > high ? [high, low] : [low]))
  }
  return kept
}

/** Strokes where |value| is above half the limit, with the crossing points worked out between neighbours. */
function strokesBeyond(values: readonly number[], half: number, place: (index: number, value: number) => Point): string {
  const n = values.length
  const excess = (index: number) => Math.abs(values[index % n]!) - half
  const start = values.findIndex((_, index) => excess(index) <= 0)
  if (start < 0) return polyline(values.map((value, index) => place(index, value)), true)
  const strokes: Point[][] = []
  let stroke: Point[] | null = null
  for (let step = 1; step <= n; step++) {
    const index = start + step
    const now = excess(index)
    const before = excess(index - 1)
    if (now > 0 !== before > 0) {
      const share = before / (before - now)
      const a = values[(index - 1) % n]!
      const crossing = place(index - 1 + share, a + share * (values[index % n]! - a))
      if (now > 0) stroke = [crossing]
      else if (stroke) {
        strokes.push([...stroke, crossing])
        stroke = null
      }
    }
    if (now > 0) stroke?.push(place(index, values[index % n]!))
  }
  return strokes.map(points => polyline(points)).join('')
}
