import { scaleLinear } from 'd3-scale'
import type { OrderAmplitude } from '../terms/measurement'
import type { Origin } from '../terms/motor'
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

export interface CombGeometry {
  width: number
  height: number
  plot: { left: number; right: number; top: number; bottom: number }
  teeth: CombTooth[]
  notches: { order: number; x: number; y: number; upperNm: number }[]
  yTicks: Tick[]
  unit: string
  factor: number
}

const MARGIN = { left: 44, right: 16, top: 12, bottom: 40 }
/** Width that a three-digit label needs. */
const LABEL_ROOM = 26

/**
 * Amplitude by order as a comb: a tooth for each order, a notch for each limit; the largest teeth are labelled first.
 *
 * @throws RangeError when an amplitude is not finite or negative.
 */
export function combGeometry(input: CombInput): CombGeometry {
  const { width, height } = input
  if (input.orders.some(row => !Number.isFinite(row.amplitudeNm) || row.amplitudeNm < 0)) throw new RangeError('combGeometry: amplitudes must be finite and not negative')
  const largest = Math.max(...input.orders.map(row => row.amplitudeNm), ...input.limits.map(row => row.upperNm), Number.MIN_VALUE)
  const { unit, factor } = torquePrefix(largest)
  const plot = { left: MARGIN.left, right: width - MARGIN.right, top: MARGIN.top, bottom: height - MARGIN.bottom }
  const shown = Math.max(8, ...input.orders.filter(row => row.amplitudeNm > 0.004 * largest).map(row => row.order), ...input.limits.map(row => row.order))
  const x = scaleLinear().domain([0, Math.min(input.highestOrder, Math.ceil(shown * 1.04))]).range([plot.left, plot.right])
  const y = scaleLinear().domain([0, largest * factor * 1.05]).nice(4).range([plot.bottom, plot.top])
  const limitOf = new Map(input.limits.map(row => [row.order, row.upperNm]))
  const teeth = input.orders.filter(row => row.order <= x.domain()[1]!).map((row): CombTooth => {
    const origin = row.origins[0] ?? 'other'
    return { order: row.order, x: x(row.order), y: y(row.amplitudeNm * factor), origin, letter: ORIGIN_LETTERS[origin], amplitudeNm: row.amplitudeNm, over: row.amplitudeNm > (limitOf.get(row.order) ?? Infinity), labelled: false }
  })
  labelLargest(teeth, largest)
  return {
    width, height, plot, teeth, unit, factor,
    notches: input.limits.map(row => ({ order: row.order, x: x(row.order), y: y(row.upperNm * factor), upperNm: row.upperNm })),
    yTicks: y.ticks(4).map(value => ({ at: y(value), label: tickLabel(value) })),
  }
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
