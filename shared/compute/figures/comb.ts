import { scaleLinear } from 'd3-scale'
import type { OrderAmplitude } from '../terms/measurement'
import type { Origin } from '../terms/motor'
import type { TorqueText } from './extremes'
import { tickLabel, torquePrefix } from './trace'
import type { Tick } from './trace'

export const ORIGIN_LETTERS: Record<Origin, string> = { design: 'D', rotorSide: 'R', statorSide: 'S', turn: 'T', other: 'O' }
export const ORIGIN_WORDS: Record<Origin, string> = { design: 'design', rotorSide: 'rotor side', statorSide: 'stator side', turn: 'once or twice a turn', other: 'other' }

export interface CombInput {
  orders: readonly Pick<OrderAmplitude, 'order' | 'amplitudeNm' | 'origins'>[]
  limits: readonly { order: number; upperNm: number }[]
  highestOrder: number
  width: number
  height: number
}

export interface CombTooth {
  order: number
  x: number
  /** Top of the tooth. */
  y: number
  origin: Origin
  letter: string
  amplitudeNm: number
  /** Above its own limit. */
  over: boolean
  /** Whether there is room for its number below. */
  labelled: boolean
}

export interface CombNotch {
  order: number
  x: number
  y: number
  /** Half its length, short enough that neighbouring notches do not touch. */
  halfWidth: number
  upperNm: number
}

export interface CombGeometry {
  width: number
  height: number
  plot: { left: number; right: number; top: number; bottom: number }
  /** In rising order. */
  teeth: CombTooth[]
  notches: CombNotch[]
  yTicks: Tick[]
  unit: string
  factor: number
}

const MARGIN = { left: 44, right: 16, top: 12, bottom: 40 }
/** Width that a three-digit label needs. */
const LABEL_ROOM = 26
const NOTCH_HALF = 9

/**
 * Amplitude by order as a comb: a tooth for each order, a notch for each limit; the largest teeth are labelled first.
 *
 * The axis ends at the last order of some size, or the last that has a limit. Without any order the axis is drawn empty.
 *
 * @param input orders with peak amplitudes in N·m, limits in N·m, the highest order fitted, and the size.
 * @returns teeth, notches and ticks in a rectangle with the origin at the top left.
 * @throws RangeError when an amplitude or a limit is not finite or negative.
 */
export function combGeometry(input: CombInput): CombGeometry {
  const { width, height, limits } = input
  const sizes = [...input.orders.map(row => row.amplitudeNm), ...limits.map(row => row.upperNm)]
  if (sizes.some(value => !Number.isFinite(value) || value < 0)) throw new RangeError('combGeometry: amplitudes and limits must be finite and not negative')
  const largest = Math.max(0, ...sizes)
  const { unit, factor } = torquePrefix(largest)
  const plot = { left: MARGIN.left, right: width - MARGIN.right, top: MARGIN.top, bottom: height - MARGIN.bottom }
  const shown = Math.max(8, ...input.orders.filter(row => row.amplitudeNm > 0.004 * largest).map(row => row.order))
  const last = Math.max(Math.min(input.highestOrder, Math.ceil(shown * 1.04)), ...limits.map(row => Math.ceil(row.order * 1.04)))
  const x = scaleLinear().domain([0, last]).range([plot.left, plot.right])
  const y = scaleLinear().domain([0, largest * factor * 1.05 || 1]).nice(4).range([plot.bottom, plot.top])
  const limitOf = new Map(limits.map(row => [row.order, row.upperNm]))
  const teeth = input.orders.filter(row => row.order <= last).map((row): CombTooth => {
    const origin = row.origins[0] ?? 'other'
    return { order: row.order, x: x(row.order), y: y(row.amplitudeNm * factor), origin, letter: ORIGIN_LETTERS[origin], amplitudeNm: row.amplitudeNm, over: row.amplitudeNm > (limitOf.get(row.order) ?? Infinity), labelled: false }
  }).sort((a, b) => a.order - b.order)
  labelLargest(teeth, largest)
  return {
    width, height, plot, teeth, unit, factor,
    notches: limits.map(row => ({ order: row.order, x: x(row.order), y: y(row.upperNm * factor), halfWidth: notchHalf(row.order, limits, x(1) - x(0)), upperNm: row.upperNm })),
    yTicks: y.ticks(4).map(value => ({ at: y(value), label: tickLabel(value) })),
  }
}

function notchHalf(order: number, limits: CombInput['limits'], step: number): number {
  const nearest = Math.min(...limits.filter(row => row.order !== order).map(row => Math.abs(row.order - order)))
  return Math.max(2, Math.min(NOTCH_HALF, nearest * step / 2 - 1))
}

function labelLargest(teeth: CombTooth[], largest: number): void {
  const taken: number[] = []
  for (const tooth of [...teeth].sort((a, b) => Number(b.over) - Number(a.over) || b.amplitudeNm - a.amplitudeNm)) {
    if (!tooth.over && tooth.amplitudeNm < 0.01 * largest) continue
    if (taken.some(x => Math.abs(x - tooth.x) < LABEL_ROOM)) continue
    tooth.labelled = true
    taken.push(tooth.x)
  }
}

/** The comb in words, for those who do not see it: the six largest orders, then what lies above its limit. */
export function describeComb(input: CombInput, text: TorqueText): string {
  if (input.orders.length === 0) return 'No order stands out from the noise.'
  const words = (origins: readonly Origin[]) => origins.length === 0 ? ORIGIN_WORDS.other : origins.map(origin => ORIGIN_WORDS[origin]).join(' or ')
  const largest = [...input.orders].sort((a, b) => b.amplitudeNm - a.amplitudeNm || a.order - b.order).slice(0, 6)
  const list = largest.map(row => `Order ${row.order}: ${text(row.amplitudeNm)}, ${words(row.origins)}.`).join(' ')
  if (input.limits.length === 0) return list
  const over = input.limits.flatMap((limit) => {
    const row = input.orders.find(({ order }) => order === limit.order)
    return row && row.amplitudeNm > limit.upperNm ? [`order ${row.order} with ${text(row.amplitudeNm)} (limit ${text(limit.upperNm)})`] : []
  })
  return `${list} ${over.length === 0 ? 'No order lies above its limit.' : `Above its limit: ${over.join(', ')}.`}`
}
