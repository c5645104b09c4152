import type { Verdict } from '../terms/judgement'
import type { QuantityRow, RowText } from './quantities'
import { formatDecimals, formatRow, joinQuantity } from './quantities'

/** A judged figure whose verdict has to be put into words. */
export interface ReasonRequest {
  row: QuantityRow & { value: number }
  /** null: a guarded rule without stated uncertainty. */
  verdict: Verdict | null
  /** Width of the guard band in the row's unit; 0: none. */
  guardBand: number
}

/** The bound that decides: the one crossed, otherwise the nearer one. */
interface Edge {
  side: 'lower' | 'upper'
  bound: number
  /** How far inside it the value lies; negative outside. */
  margin: number
}

function decidingEdge({ value, lower, upper }: ReasonRequest['row']): Edge {
  const edges: Edge[] = []
  if (upper !== null) edges.push({ side: 'upper', bound: upper, margin: upper - value })
  if (lower !== null) edges.push({ side: 'lower', bound: lower, margin: value - lower })
  return edges.reduce((least, edge) => edge.margin < least.margin ? edge : least)
}

/** Figures of the sentence in the unit and with the decimals of the row. */
class Wording {
  readonly text: RowText
  readonly value: string
  readonly limit: string
  readonly difference: string
  readonly edge: Edge

  constructor(readonly row: ReasonRequest['row']) {
    this.text = formatRow(row)
    this.edge = decidingEdge(row)
    this.value = joinQuantity(this.text.value!, this.text.unit)
    this.limit = this.quantity(this.edge.bound)
    // From the figures as shown, so that the reader's subtraction comes out.
    const shown = (figure: number): number => Number((figure * this.text.factor).toFixed(this.text.decimals))
    this.difference = joinQuantity(formatDecimals(Math.abs(shown(row.value) - shown(this.edge.bound)), this.text.decimals), this.text.unit)
  }

  /** A further figure, with enough decimals to show at least one digit of it. */
  quantity(figure: number): string {
    const scaled = figure * this.text.factor
    let decimals = this.text.decimals
    while (decimals < 9 && scaled !== 0 && Number(scaled.toFixed(decimals)) === 0) decimals++
    return joinQuantity(formatDecimals(scaled, decimals), this.text.unit)
  }

  get limitName(): string {
    const twoSided = this.row.lower !== null && this.row.upper !== null
    return twoSided ? `the ${this.edge.side} limit` : 'the limit'
  }
}

function inside(words: Wording): string {
  const { row, edge, text } = words
  if (edge.margin === 0) return `${words.value} is exactly on ${words.limitName}, which conforms.`
  if (row.lower !== null && row.upper !== null) {
    return `${words.value} lies between the limits ${text.lower} and ${joinQuantity(text.upper!, text.unit)}.`
  }
  return `${words.value} is ${edge.side === 'upper' ? 'below' : 'above'} the limit ${words.limit} by ${words.difference}.`
}

const outside = (words: Wording): string =>
  `${words.value} is ${words.edge.side === 'upper' ? 'above' : 'below'} ${words.limitName} ${words.limit} by ${words.difference}`

function insideGuardBand(words: Wording, guardBand: number): string {
  const { row, edge } = words
  const uncertainty = words.quantity(row.expandedUncertainty!)
  const start = `${words.value} is within ${words.limitName} ${words.limit}, but not by the guard band of ${words.quantity(guardBand)}`
  if (row.lower !== null && row.upper !== null && row.upper - row.lower < 2 * guardBand) {
    return `${start}; the uncertainty of ±${uncertainty} leaves no value that could be accepted between the limits.`
  }
  const accepted = edge.side === 'upper' ? `up to ${words.quantity(edge.bound - guardBand)}` : `from ${words.quantity(edge.bound + guardBand)} on`
  return `${start}: with an uncertainty of ±${uncertainty} only values ${accepted} are accepted.`
}

/**
 * Why a figure was judged so, in one sentence with figures and units.
 *
 * @param request figures of the row, verdict and guard band
 * @returns the sentence: "6.83 mN·m is above the limit 5.40 mN·m by 1.43 mN·m."
 * @throws RangeError when a figure is not finite
 */
export function reasonFor({ row, verdict, guardBand }: ReasonRequest): string {
  const words = new Wording(row)
  const { margin } = words.edge
  if (verdict === null) return `${words.value} is within ${words.limitName} ${words.limit}, but no uncertainty is stated, which the guard band needs.`
  if (verdict === 'conditional-pass') {
    return `${words.value} is within ${words.limitName} ${words.limit}, but closer to it than the guard band of ${words.quantity(guardBand)}.`
  }
  if (verdict === 'conditional-fail') return `${outside(words)}, which is within the guard band of ${words.quantity(guardBand)}.`
  if (margin < 0) return `${outside(words)}.`
  if (verdict === 'fail') return insideGuardBand(words, guardBand)
  if (guardBand === 0) return inside(words)
  const limits = row.lower !== null && row.upper !== null
    ? `the limits ${words.text.lower} and ${joinQuantity(words.text.upper!, words.text.unit)}`
    : `the limit ${words.limit}`
  return `${words.value} is within ${limits} by at least the guard band of ${words.quantity(guardBand)}.`
}
