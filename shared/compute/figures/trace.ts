import { scaleLinear } from 'd3-scale'
import { extremes, extremesByColumn } from './extremes'
import type { TorqueText } from './extremes'
import { polyline } from './path'

export interface TraceInput {
  /** Cogging over one turn, N·m. */
  coggingNm: ArrayLike<number>
  /** What the sensor read while the angle rose and fell, zero removed, N·m; null when that direction is missing. */
  forwardNm: ArrayLike<number> | null
  reverseNm: ArrayLike<number> | null
  /** Limit of the peak to peak, N·m; null: none. */
  limitPeakToPeakNm: number | null
  width: number
  height: number
}

export interface Tick { at: number; label: string }

export interface TraceGeometry {
  width: number
  height: number
  plot: { left: number; right: number; top: number; bottom: number }
  /** The mean of both directions. */
  cogging: string
  forward: string | null
  reverse: string | null
  /** Limit band as top and height, about the middle of the cogging's range; null without a limit. */
  band: { top: number; height: number } | null
  yTicks: Tick[]
  xTicks: Tick[]
  /** Shown unit is N·m, mN·m or μN·m: N·m × factor. */
  unit: string
  factor: number
  /** Height of a torque in N·m. */
  heightOf: (torqueNm: number) => number
}

const MARGIN = { left: 44, right: 12, top: 10, bottom: 26 }

/** Prefix in which torques up to this size are read easily. */
export function torquePrefix(largestNm: number): { unit: string; factor: number } {
  if (largestNm >= 1) return { unit: 'N·m', factor: 1 }
  return largestNm >= 1e-3 ? { unit: 'mN·m', factor: 1e3 } : { unit: '\u03BCN·m', factor: 1e6 }
}

/** A tick's number without float noise. */
export function tickLabel(value: number): string {
  return String(Number(value.toPrecision(6))).replace('-', '\u2212')
}

/**
 * The map unrolled over the shaft angle, 0 to 360°, with the directions and the limit band.
 *
 * The band lies about the middle of the cogging's range, as in the ring: cogging leaves it exactly when its peak to peak is above the limit.
 *
 * @param input series at equal steps over one turn, limit, size.
 * @returns path strings, ticks and band in a rectangle with the origin at the top left; a motor without torque is a flat line.
 * @throws RangeError when a series has fewer than 8 values or one that is not finite, or the limit is not positive.
 */
export function traceGeometry(input: TraceInput): TraceGeometry {
  const { width, height, limitPeakToPeakNm } = input
  const series = [input.coggingNm, input.forwardNm, input.reverseNm].map(values => values ? Array.from(values) : null)
  if (series.some(values => values && (values.length < 8 || !values.every(Number.isFinite)))) throw new RangeError('traceGeometry: every series must be eight or more finite numbers')
  if (limitPeakToPeakNm !== null && !(limitPeakToPeakNm > 0)) throw new RangeError(`traceGeometry: limitPeakToPeakNm must be above zero or null, got ${limitPeakToPeakNm}`)
  const { low, high } = extremes(series[0]!)
  const edges = limitPeakToPeakNm === null ? null : { low: (low + high - limitPeakToPeakNm) / 2, high: (low + high + limitPeakToPeakNm) / 2 }
  const all = extremes([...series.flatMap(values => values ?? []), ...(edges ? [edges.low, edges.high] : [])])
  const largest = Math.max(Math.abs(all.low), Math.abs(all.high))
  const { unit, factor } = torquePrefix(largest)
  const shown = largest * factor || 1
  const plot = { left: MARGIN.left, right: width - MARGIN.right, top: MARGIN.top, bottom: height - MARGIN.bottom }
  const y = scaleLinear().domain([-shown, shown]).nice(6).range([plot.bottom, plot.top])
  const x = scaleLinear().domain([0, 360]).range([plot.left, plot.right])
  const heightOf = (torqueNm: number) => y(torqueNm * factor)
  const point = (values: readonly number[], index: number) => ({ x: x(360 * index / values.length), y: heightOf(values[index % values.length]!) })
  // The first value again at 360°, so that the turn is seen to close.
  const path = (values: readonly number[]) => polyline([...extremesByColumn(values, plot.right - plot.left), values.length].map(index => point(values, index)))
  const [forward, reverse] = [series[1], series[2]].map(values => values ? path(values) : null)
  return {
    width, height, plot, unit, factor, heightOf, cogging: path(series[0]!), forward: forward!, reverse: reverse!,
    band: edges && { top: heightOf(edges.high), height: heightOf(edges.low) - heightOf(edges.high) },
    yTicks: y.ticks(6).map(value => ({ at: y(value), label: tickLabel(value) })),
    xTicks: [0, 90, 180, 270, 360].map(value => ({ at: x(value), label: `${value}°` })),
  }
}

/** The trace in words, for those who do not see it. */
export function describeTrace(input: TraceInput, text: TorqueText): string {
  const range = (values: ArrayLike<number>) => `from ${text(extremes(values).low)} to ${text(extremes(values).high)}`
  const directions = input.forwardNm && input.reverseNm
    ? `Forward it runs ${range(input.forwardNm)}, in reverse ${range(input.reverseNm)}.`
    : 'One direction only: friction is not separated.'
  const { low, high } = extremes(input.coggingNm)
  const limit = input.limitPeakToPeakNm === null ? '' : high - low > input.limitPeakToPeakNm ? ` It leaves the limit band of ${text(input.limitPeakToPeakNm)}.` : ` It stays inside the limit band of ${text(input.limitPeakToPeakNm)}.`
  return `Cogging runs ${range(input.coggingNm)} over one turn.${limit} ${directions}`
}
