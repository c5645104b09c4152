import { combGeometry } from '#shared/compute/figures/comb'
import { ringGeometry } from '#shared/compute/figures/ring'
import { formatQuantity, joinQuantity } from '#shared/compute/judging/quantities'
import { evaluateSeries } from '#shared/compute/torque/evaluate'
import type { Origin } from '#shared/compute/terms/motor'
import type { PaperRecord, PaperSample } from '#shared/contracts/paper-record'
import { BAND, CAUTION, COPPER, FAIL, FAIL_WASH, INK, LINE, PAGE, SOFT, STEEL } from './sheet'
import type { Sheet } from './sheet'
import { drawMark } from './marks'

const ORIGIN_COLOURS = { design: INK, rotorSide: COPPER, statorSide: STEEL, turn: CAUTION, other: SOFT } as const
const ORIGIN_DASHES: Record<Origin, number[] | undefined> = { design: undefined, rotorSide: [3, 1], statorSide: [1.2, 1], turn: [4, 1, 1, 1], other: [0.6, 1.2] }

export const limitOf = (record: PaperRecord): number | null => record.sheet.content.limits.find(limit => limit.key === 'cogging.peakToPeak')?.upper ?? null
export const nameOf = (sample: PaperSample): string => sample.serial ?? `position ${sample.position}`
export const failing = (sample: PaperSample): boolean => sample.verdict === 'fail' || sample.verdict === 'conditional-fail'

/** Share of its limit that a motor's worst characteristic takes. */
function worstShare(sample: PaperSample): number {
  return Math.max(0, ...sample.characteristics.flatMap(row => row.value !== null && row.upper !== null && row.upper > 0 ? [row.value / row.upper] : []))
}

/** The motor that a paper shows large: failing before conforming, then nearest to or farthest beyond a limit. */
export function worstMotor(record: PaperRecord): PaperSample | null {
  const measured = record.samples.filter(sample => sample.cogging)
  return measured.sort((a, b) => Number(failing(b)) - Number(failing(a)) || worstShare(b) - worstShare(a) || a.drawOrder - b.drawOrder)[0] ?? null
}

/** Ring of a motor in a square with its top left corner at (x, top). */
export function drawRing(sheet: Sheet, sample: PaperSample, limit: number | null, x: number, top: number, size: number): void {
  const large = size > 100
  const geometry = ringGeometry({ values: evaluateSeries(sample.cogging!, large ? 4096 : 1024), limitPeakToPeakNm: limit, size })
  if (geometry.band) sheet.path(geometry.band, x, top, { fill: BAND })
  sheet.path(geometry.zeroCircle, x, top, { stroke: LINE, width: 0.4 })
  sheet.path(geometry.trace, x, top, { stroke: large ? INK : SOFT, width: large ? 0.7 : 0.35 })
  sheet.path(geometry.beyond, x, top, { stroke: FAIL, width: large ? 2 : 1 })
  if (geometry.cutEdge) sheet.path(geometry.cutEdge, x, top, { stroke: FAIL, width: 0.4, dash: [2, 1.5] })
}

/** Large ring with its figure in the middle, and the comb beside it. */
export function drawWorst(sheet: Sheet, record: PaperRecord, sample: PaperSample): void {
  const size = 168
  sheet.need(size + 26)
  const top = sheet.y - 2
  drawRing(sheet, sample, limitOf(record), PAGE.left, top, size)
  const peak = sample.characteristics.find(row => row.key === 'cogging.peakToPeak')
  if (peak?.value != null) {
    const figure = formatQuantity(peak.value, 'N·m')
    const middle = PAGE.left + size / 2
    sheet.text(figure.text, middle, top - size / 2 + 1, { size: 17, face: 'monoBold', colour: failing(sample) ? FAIL : INK, align: 'centre' })
    sheet.text(`${figure.unit} peak to peak`, middle, top - size / 2 - 10, { size: 7, colour: SOFT, align: 'centre' })
    if (peak.upper !== null) sheet.text(`limit ${joinQuantity(formatQuantity(peak.upper, 'N·m').text, formatQuantity(peak.upper, 'N·m').unit)}`, middle, top - size / 2 - 19, { size: 7, colour: SOFT, align: 'centre' })
  }
  drawComb(sheet, record, sample, PAGE.left + size + 18, top, PAGE.right - PAGE.left - size - 18, size)
  sheet.y = top - size - 6
}

function drawComb(sheet: Sheet, record: PaperRecord, sample: PaperSample, x: number, top: number, width: number, height: number): void {
  const limits = record.sheet.content.limits.flatMap((limit) => {
    const order = /^order\.(\d+)$/.exec(limit.key)?.[1]
    return order && limit.upper !== null && limit.unit === 'N·m' ? [{ order: Number(order), upperNm: limit.upper }] : []
  })
  const geometry = combGeometry({ orders: sample.orders, limits, highestOrder: sample.cogging!.cosNm.length, width, height: height - 24 })
  sheet.text(`Amplitude by order, ${geometry.unit}`, x + geometry.plot.left, top - 6, { size: 8, face: 'bold' })
  const base = top - 12
  for (const tick of geometry.yTicks) {
    sheet.rule(base - tick.at, x + geometry.plot.left, x + geometry.plot.right, LINE, 0.5)
    sheet.text(tick.label, x + geometry.plot.left - 5, base - tick.at - 2.4, { size: 7, face: 'mono', colour: SOFT, align: 'right' })
  }
  for (const tooth of geometry.teeth) {
    sheet.path(`M${tooth.x} ${geometry.plot.bottom}L${tooth.x} ${tooth.y}`, x, base, { stroke: tooth.over ? FAIL : ORIGIN_COLOURS[tooth.origin], width: 1.9, dash: ORIGIN_DASHES[tooth.origin] })
    if (!tooth.labelled) continue
    sheet.text(String(tooth.order), x + tooth.x, base - geometry.plot.bottom - 9, { size: 7, face: 'mono', align: 'centre' })
    sheet.text(tooth.letter, x + tooth.x, base - geometry.plot.bottom - 18, { size: 7, face: 'monoBold', colour: ORIGIN_COLOURS[tooth.origin], align: 'centre' })
  }
  for (const notch of geometry.notches) sheet.path(`M${notch.x - 5} ${notch.y}L${notch.x + 5} ${notch.y}`, x, base, { stroke: FAIL, width: 1.4 })
  sheet.text('D design · R rotor side · S stator side · T once or twice a turn · O other · bar: limit', x + geometry.plot.left, top - height + 1, { size: 6.6, colour: SOFT })
}

const TILES_A_ROW = 10

/** Small rings of all motors, each with its serial and mark. */
export function drawRosette(sheet: Sheet, record: PaperRecord): void {
  const step = (PAGE.right - PAGE.left) / TILES_A_ROW
  const size = step - 6
  const height = size + 15
  record.samples.forEach((sample, index) => {
    const column = index % TILES_A_ROW
    if (column === 0) {
      sheet.need(height + 2)
      sheet.y -= height
    }
    const x = PAGE.left + column * step
    if (failing(sample)) sheet.page.drawRectangle({ x: x + 1, y: sheet.y - 1, width: step - 4, height: height - 3, color: FAIL_WASH, borderColor: FAIL, borderWidth: 0.8 })
    if (sample.cogging) drawRing(sheet, sample, limitOf(record), x + 2, sheet.y + height - 5, size - 2)
    const name = nameOf(sample)
    const text = Math.min(6.4, 6.4 * (step - 15) / Math.max(1, sheet.width(name, { size: 6.4, face: 'mono' })))
    drawMark(sheet, sample.verdict, x + 3, sheet.y + 3, 5)
    sheet.text(name, x + 10, sheet.y + 3.4, { size: text, face: failing(sample) ? 'monoBold' : 'mono', colour: failing(sample) ? FAIL : INK })
  })
  sheet.y -= 6
}
