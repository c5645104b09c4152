import { scaleLinear } from 'd3-scale'
import { polyline } from './path'
import { tickLabel } from './trace'
import type { Tick } from './trace'

export interface ControlChartInput {
  /** Values in time order, in the unit shown. */
  values: readonly number[]
  labels: readonly string[]
  limits: { centre: number; lower: number; upper: number } | null
  /** Limit of the sheet, for comparison; null: none. */
  sheetUpper: number | null
  signals: readonly boolean[]
  width: number
  height: number
  /** Lowest value that can occur, such as 0 for amplitudes; null: none. */
  floor: number | null
}

export interface ControlChartGeometry {
  width: number
  height: number
  plot: { left: number; right: number; top: number; bottom: number }
  line: string
  points: { x: number; y: number; signal: boolean }[]
  centre: number | null
  lower: number | null
  upper: number | null
  sheetUpper: number | null
  /** Edges at one and two standard deviations, when limits are known. */
  zones: { top: number; height: number }[]
  yTicks: Tick[]
  xTicks: Tick[]
}

const MARGIN = { left: 54, right: 64, top: 14, bottom: 34 }

/**
 * A control chart: points in order, centre and control limits, zones of one and two standard deviations.
 *
 * @throws RangeError when a value is not finite or labels and values differ in number.
 */
export function controlChartGeometry(input: ControlChartInput): ControlChartGeometry {
  const { values, limits, width, height } = input
  if (!values.every(Number.isFinite) || values.length !== input.labels.length) throw new RangeError('controlChartGeometry: values must be finite, one label each')
  const plot = { left: MARGIN.left, right: width - MARGIN.right, top: MARGIN.top, bottom: height - MARGIN.bottom }
  const extent = [...values, ...(limits ? [limits.lower, limits.upper] : []), ...(input.sheetUpper === null ? [] : [input.sheetUpper])]
  const low = Math.min(...extent)
  const high = Math.max(...extent)
  const pad = (high - low || Math.abs(high) || 1) * 0.06
  const y = scaleLinear().domain([input.floor === null ? low - pad : Math.max(input.floor, low - pad), high + pad]).nice(5).range([plot.bottom, plot.top])
  const x = scaleLinear().domain([0, Math.max(1, values.length - 1)]).range([plot.left + 10, plot.right - 10])
  const points = values.map((value, index) => ({ x: values.length === 1 ? (plot.left + plot.right) / 2 : x(index), y: y(value), signal: input.signals[index] ?? false }))
  const clampY = (value: number) => Math.min(plot.bottom, Math.max(plot.top, y(value)))
  const sigma = limits ? (limits.upper - limits.centre) / 3 : 0
  const zone = (multiple: number) => ({ top: clampY(limits!.centre + multiple * sigma), height: clampY(limits!.centre - multiple * sigma) - clampY(limits!.centre + multiple * sigma) })
  return {
    width, height, plot, points, line: polyline(points),
    centre: limits ? y(limits.centre) : null, lower: limits && limits.lower >= y.domain()[0]! ? y(limits.lower) : null, upper: limits ? y(limits.upper) : null,
    sheetUpper: input.sheetUpper === null ? null : y(input.sheetUpper),
    zones: limits ? [zone(2), zone(1)] : [],
    yTicks: y.ticks(5).map(value => ({ at: y(value), label: tickLabel(value) })),
    xTicks: thinLabels(input.labels, points.map(point => point.x), plot.right - plot.left),
  }
}

/** Labels that have room, evenly spaced, the first and the last among them. */
function thinLabels(labels: readonly string[], places: readonly number[], width: number): Tick[] {
  const room = Math.max(1, Math.floor(width / 96))
  const step = Math.max(1, Math.ceil(labels.length / room))
  return labels.flatMap((label, index) => index % step === 0 ? [{ at: places[index]!, label }] : [])
}
