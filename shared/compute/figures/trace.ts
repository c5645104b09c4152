import { scaleLinear } from 'd3-scale'
import { polyline } from './path'

export interface TraceInput {
  /** Cogging over one turn, N·m. */
  coggingNm: ArrayLike<number>
  /** What the sensor read while the angle rose and fell, zero removed, N·m; null when that direction is missing. */
  forwardNm: ArrayLike<number> | null
  reverseNm: ArrayLike<number> | null
  limitPeakToPeakNm: number | null
  width: number
  height: number
}

export interface Tick { at: number; label: string }

export interface TraceGeometry {
  width: number
  height: number
  plot: { left: number; right: number; top: number; bottom: number }
  cogging: string
  forward: string | null
  reverse: string | null
  /** Limit band as top and height; null without a limit. */
  band: { top: number; height: number } | null
  yTicks: Tick[]
  xTicks: Tick[]
  /** Shown unit is mN·m or μN·m: N·m × factor. */
  unit: string
  factor: number
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
 * @throws RangeError when a series has fewer than 8 values or one that is not finite.
 */
export function traceGeometry(input: TraceInput): TraceGeometry {
  const { width, height, limitPeakToPeakNm } = input
  const series = [input.coggingNm, input.forwardNm, input.reverseNm].map(values => values ? Array.from(values) : null)
  for (const values of series) {
    if (values && (values.length < 8 || !values.every(Number.isFinite))) throw new RangeError('traceGeometry: every series must be eight or more finite numbers')
  }
  const all = series.flatMap(values => values ?? [])
  const half = limitPeakToPeakNm === null ? 0 : limitPeakToPeakNm / 2
  const largest = all.reduce((most, value) => Math.max(most, Math.abs(value)), Math.max(half, Number.MIN_VALUE))
  const { unit, factor } = torquePrefix(largest)
  const plot = { left: MARGIN.left, right: width - MARGIN.right, top: MARGIN.top, bottom: height - MARGIN.bottom }
  const y = scaleLinear().domain([-largest * factor, largest * factor]).nice(6).range([plot.bottom, plot.top])
  const x = scaleLinear().domain([0, 360]).range([plot.left, plot.right])
  const path = (values: number[] | null) => values ? polyline(envelope(values, plot.right - plot.left).map(({ index, value }) => ({ x: x(360 * index / values.length), y: y(value * factor) }))) : null
  const [cogging, forward, reverse] = series.map(path)
  return {
    width, height, plot, unit, factor, cogging: cogging!, forward: forward ?? null, reverse: reverse ?? null,
    band: limitPeakToPeakNm === null ? null : { top: y(half * factor), height: y(-half * factor) - y(half * factor) },
    yTicks: y.ticks(6).map(value => ({ at: y(value), label: tickLabel(value) })),
    xTicks: [0, 90, 180, 270, 360].map(value => ({ at: x(value), label: `${value}°` })),
  }
}

/** Per column of the picture the lowest and highest value in order; the eye sees the same, the path stays short. */
function envelope(values: readonly number[], columns: number): { index: number; value: number }[] {
  if (values.length <= 2 * columns) return [...values, values[0]!].map((value, index) => ({ index, value }))
  const kept: { index: number; value: number }[] = []
  const count = Math.round(columns)
  for (let column = 0; column < count; column++) {
    const from = Math.floor(column * values.length / count)
    const to = Math.floor((column + 1) * values.length / count)
    let low = from
    let high = from
    for (let index = from; index < to; index++) {
      if (values[index]! < values[low]!) low = index
      if (values[index]! > values[high]!) high = index
    }
    for (const index of low < high ? [low, high] : [high, low]) kept.push({ index, value: values[index]! })
  }
  return kept
}
