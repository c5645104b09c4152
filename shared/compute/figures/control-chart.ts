import { scaleLinear } from 'd3-scale'
import { polyline } from './path'
import { tickLabel } from './trace'
import type { Tick } from './trace'

export interface ControlChartInput {
  /** Values in time order, in the unit shown; null: not stated for that one. */
  values: readonly (number | null)[]
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

export type ControlLine = 'sheetUpper' | 'upper' | 'centre' | 'lower'

export interface ControlChartGeometry {
  width: number
  height: number
  plot: { left: number; right: number; top: number; bottom: number }
  /** The values joined in order; it is broken where one is missing. */
  line: string
  points: { index: number; x: number; y: number; signal: boolean }[]
  /** Places of values that are not stated. */
  missing: { index: number; x: number }[]
  centre: number | null
  /** null also where it lies below the floor, which no value can reach. */
  lower: number | null
  upper: number | null
  sheetUpper: number | null
  /** Names of the lines at the right edge, moved apart where lines lie close. */
  lineLabels: { line: ControlLine; at: number }[]
  /** Within two and within one standard deviation of the centre, when limits are known. */
  zones: { top: number; height: number }[]
  yTicks: Tick[]
  xTicks: Tick[]
}

const MARGIN = { left: 54, right: 64, top: 14, bottom: 34 }
/** Width that a date needs below the axis, and height of a line's name. */
const LABEL_ROOM = { width: 96, height: 15 }

/**
 * A control chart: points in order, centre and control limits, zones of one and two standard deviations.
 *
 * @param input values with one label each, limits, size.
 * @returns paths and places in a rectangle with the origin at the top left.
 * @throws RangeError when a value is not finite, labels and values differ in number, or there is nothing at all to draw.
 */
export function controlChartGeometry(input: ControlChartInput): ControlChartGeometry {
  const { values, limits, width, height } = input
  const present = values.filter(value => value !== null)
  if (!present.every(Number.isFinite) || values.length !== input.labels.length) throw new RangeError('controlChartGeometry: values must be finite or null, one label each')
  const plot = { left: MARGIN.left, right: width - MARGIN.right, top: MARGIN.top, bottom: height - MARGIN.bottom }
  const y = heightScale(input, present, plot)
  const x = scaleLinear().domain([0, Math.max(1, values.length - 1)]).range([plot.left + 10, plot.right - 10])
  const places = values.map((_, index) => values.length === 1 ? (plot.left + plot.right) / 2 : x(index))
  const clampY = (value: number) => Math.min(plot.bottom, Math.max(plot.top, y(value)))
  const zone = (multiple: number) => {
    const sigma = (limits!.upper - limits!.centre) / 3
    const top = clampY(limits!.centre + multiple * sigma)
    return { top, height: clampY(limits!.centre - multiple * sigma) - top }
  }
  const lines = {
    sheetUpper: input.sheetUpper === null ? null : y(input.sheetUpper),
    upper: limits && y(limits.upper), centre: limits && y(limits.centre), lower: limits && limits.lower >= y.domain()[0]! ? y(limits.lower) : null,
  }
  return {
    width, height, plot, ...lines,
    lineLabels: moveApart(lines, plot),
    line: runsOf(values).map(run => polyline(run.map(index => ({ x: places[index]!, y: y(values[index]!) })))).join(''),
    points: values.flatMap((value, index) => value === null ? [] : [{ index, x: places[index]!, y: y(value), signal: input.signals[index] ?? false }]),
    missing: values.flatMap((value, index) => value === null ? [{ index, x: places[index]! }] : []),
    zones: limits ? [zone(2), zone(1)] : [],
    yTicks: y.ticks(5).map(value => ({ at: y(value), label: tickLabel(value) })),
    xTicks: thinLabels(input.labels, places),
  }
}

function heightScale(input: ControlChartInput, present: readonly number[], plot: ControlChartGeometry['plot']) {
  const extent = [...present, ...(input.limits ? [input.limits.lower, input.limits.upper] : []), ...(input.sheetUpper === null ? [] : [input.sheetUpper])]
  if (extent.length === 0) throw new RangeError('controlChartGeometry: at least one value or limit is needed')
  const low = Math.min(...extent)
  const high = Math.max(...extent)
  const pad = (high - low || Math.abs(high) || 1) * 0.06
  return scaleLinear().domain([input.floor === null ? low - pad : Math.max(input.floor, low - pad), high + pad]).nice(5).range([plot.bottom, plot.top])
}

/** Indices of neighbouring values that are stated. */
function runsOf(values: readonly (number | null)[]): number[][] {
  const runs: number[][] = []
  values.forEach((value, index) => {
    if (value === null) return
    if (index > 0 && values[index - 1] !== null) runs.at(-1)!.push(index)
    else runs.push([index])
  })
  return runs
}

/** Names downwards, each at its line or as far below it as the name above needs; then up again from the lower edge. */
function moveApart(lines: Record<ControlLine, number | null>, plot: ControlChartGeometry['plot']): { line: ControlLine; at: number }[] {
  const labels = (Object.keys(lines) as ControlLine[]).flatMap(line => lines[line] === null ? [] : [{ line, at: lines[line] }]).sort((a, b) => a.at - b.at)
  for (let index = 1; index < labels.length; index++) labels[index]!.at = Math.max(labels[index]!.at, labels[index - 1]!.at + LABEL_ROOM.height)
  let room = plot.bottom
  for (const label of [...labels].reverse()) {
    label.at = Math.min(label.at, room)
    room = label.at - LABEL_ROOM.height
  }
  return labels
}

/** Labels that have room, evenly spaced, the first and the last among them. */
function thinLabels(labels: readonly string[], places: readonly number[]): Tick[] {
  const apart = places.length < 2 ? Infinity : places[1]! - places[0]!
  const step = Math.max(1, Math.ceil(LABEL_ROOM.width / apart))
  const last = labels.length - 1
  return labels.flatMap((label, index) => index === last || (index % step === 0 && last - index >= step) ? [{ at: places[index]!, label }] : [])
}

/**
 * The chart in words, for those who do not see it.
 *
 * @param input what was drawn.
 * @param names what each point is called.
 * @param text how a value is written, with its unit.
 */
export function describeControlChart(input: ControlChartInput, names: readonly string[], text: (value: number) => string): string {
  const { values, limits } = input
  const missing = values.filter(value => value === null).length
  const count = `${values.length === 1 ? '1 point' : `${values.length} points`}${missing === 0 ? '' : `, ${missing} of them not stated`}.`
  const control = limits ? `Centre ${text(limits.centre)}, control limits ${text(limits.lower)} to ${text(limits.upper)}.` : 'No control limits yet.'
  const sheet = input.sheetUpper === null ? '' : ` Limit of the sheet ${text(input.sheetUpper)}.`
  const outside = values.flatMap((value, index) => value !== null && input.signals[index] ? [`${names[index]} with ${text(value)}`] : [])
  const signals = !limits ? '' : outside.length === 0 ? ' No point lies outside the control limits.' : ` Outside the control limits: ${outside.join(', ')}.`
  return `${count} ${control}${sheet}${signals}`
}
