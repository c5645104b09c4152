import type { Verdict } from '#shared/compute/terms/judgement'
import { COPPER, FAIL, INK, SOFT } from './sheet'
import type { Sheet, TextStyle } from './sheet'

const WORDS: Record<Verdict, string> = { 'pass': 'pass', 'conditional-pass': 'conditional pass', 'conditional-fail': 'conditional fail', 'fail': 'fail' }

/** A circle rolls, a square does not: the verdict's mark in a square of this size, its lower left corner at (x, y). */
export function drawMark(sheet: Sheet, verdict: Verdict | null, x: number, y: number, size: number): void {
  const middle = size / 2
  const line = size * 0.15
  const top = y + size
  if (verdict === null) return sheet.path(`M${size * 0.15} ${middle}L${size * 0.85} ${middle}`, x, top, { stroke: SOFT, width: line })
  const colour = isFailing(verdict) ? FAIL : INK
  const edge = size * 0.14
  if (verdict === 'fail') return sheet.path(`M${edge / 2} ${edge / 2}H${size - edge / 2}V${size - edge / 2}H${edge / 2}Z`, x, top, { fill: colour })
  if (verdict === 'conditional-fail') {
    sheet.path(`M${edge} ${edge}H${size - edge}V${size - edge}H${edge}Z`, x, top, { stroke: colour, width: line })
    return sheet.path(`M${edge} ${edge}H${middle}V${size - edge}H${edge}Z`, x, top, { fill: colour })
  }
  const radius = middle - edge
  sheet.circle(x + middle, y + middle, radius, { stroke: colour, width: line })
  if (verdict === 'conditional-pass') sheet.path(`M${middle} ${middle - radius}A${radius} ${radius} 0 0 0 ${middle} ${middle + radius}Z`, x, top, { fill: colour })
}

const wordFor = (verdict: Verdict | null): string => verdict === null ? 'not judged' : WORDS[verdict]
const isFailing = (verdict: Verdict | null): boolean => verdict === 'fail' || verdict === 'conditional-fail'

/** Width of mark and word. */
export function verdictWidth(sheet: Sheet, verdict: Verdict | null, size: number, word = wordFor(verdict)): number {
  return size * 1.26 + sheet.width(word, { size, face: isFailing(verdict) ? 'bold' : 'sans' })
}

/** Mark and word, the word's right end (or the mark's left edge) at x. */
export function drawVerdict(sheet: Sheet, verdict: Verdict | null, x: number, y: number, style: TextStyle & { word?: string } = {}): void {
  const size = style.size ?? 9
  const word = style.word ?? wordFor(verdict)
  const failing = isFailing(verdict)
  const mark = size * 0.86
  const left = style.align === 'right' ? x - verdictWidth(sheet, verdict, size, word) : x
  drawMark(sheet, verdict, left, y - size * 0.08, mark)
  sheet.text(word, left + mark + size * 0.4, y, { size, face: failing ? 'bold' : style.face ?? 'sans', colour: failing ? FAIL : verdict === null ? SOFT : INK })
}

/** The shaft in its bore. */
export function drawBrand(sheet: Sheet, x: number, top: number, size: number): void {
  sheet.circle(x + size / 2, top - size / 2, size * 0.41, { stroke: INK, width: size * 0.1 })
  sheet.circle(x + size / 2, top - size / 2, size * 0.15, { fill: COPPER })
}
