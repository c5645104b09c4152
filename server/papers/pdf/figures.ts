import { combGeometry, ORIGIN_LETTERS, ORIGIN_WORDS } from '#shared/compute/figures/comb'
import { ringGeometry } from '#shared/compute/figures/ring'
import { formatRow, joinQuantity } from '#shared/compute/judging/quantities'
import { evaluateSeries } from '#shared/compute/torque/evaluate'
import type { Origin } from '#shared/compute/terms/motor'
import type { PaperRecord, PaperSample } from '#shared/contracts/paper-record'
import { BAND, CAUTION, COPPER, FAIL, FAIL_WASH, INK, LINE, PAGE, SOFT, STEEL } from './sheet'
import type { Sheet } from './sheet'
import { drawVerdict, verdictWidth } from './marks'

const ORIGIN_COLOURS = { design: INK, rotorSide: COPPER, statorSide: STEEL, turn: CAUTION, other: SOFT } as const
const ORIGIN_DASHES: Record<Origin, number[] | undefined> = { design: undefined, rotorSide: [3, 1], statorSide: [1.2, 1], turn: [4, 1, 1, 1], other: [0.6, 1.2] }

export const limitOf = (record: PaperRecord): number | null => record.sheet.content.limits.find(limit => limit.key === 'cogging.peakToPeak')?.upper ?? null
export const nameOf = (sample: PaperSample): string => sample.serial ?? `position ${sample.position}`
export const failing = (sample: PaperSample): boolean => sample.verdict === 'fail' || sample.verdict === 'conditional-fail'

/** Share of its limit that a motor's worst characteristic takes. */
function worstShare(sample: PaperSample): number {
  return Math.max(0, ...sample.characteristics.flatMap(row => row.value === null ? [] : [...(row.upper !== null && row.upper > 0 ? [row.value / row.upper] : []), ...(row.lower !== null && row.lower > 0 && row.value > 0 ? [row.lower / row.value] : [])]))
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
  sheet.path(geometry.beyond, x, top, { stroke: FAIL, width: large ? 1.8 : 0.9 })
  if (geometry.cutEdge) sheet.path(geometry.cutEdge, x, top, { stroke: FAIL, width: 0.4, dash: [2, 1.5] })
}

const RING_SIDE = 176
/** The comb's geometry is made for a screen; on paper its labels are smaller. */
const COMB_SCALE = 1.5

/** Large ring with its figure in the middle, and the comb beside it. */
export function drawWorst(sheet: Sheet, record: PaperRecord, sample: PaperSample): void {
  sheet.need(RING_SIDE + 18)
  const left = PAGE.left + 18
  const top = sheet.y - 9
  drawRing(sheet, sample, limitOf(record), left, top, RING_SIDE)
  drawRingText(sheet, sample, left + RING_SIDE / 2, top - RING_SIDE / 2)
  const combX = left + RING_SIDE + 24
  drawComb(sheet, record, sample, { x: combX, top, width: PAGE.right - combX, height: RING_SIDE })
  sheet.y = top - RING_SIDE - 7
}

function drawRingText(sheet: Sheet, sample: PaperSample, x: number, y: number): void {
  const outer = RING_SIDE / 2
  const labels = [['0°', 0, outer - 0.5, 'centre'], ['90°', outer + 1, -2.2, 'left'], ['180°', 0, -outer - 5, 'centre'], ['270°', -outer - 1, -2.2, 'right']] as const
  for (const [text, dx, dy, align] of labels) sheet.text(text, x + dx, y + dy, { size: 6.4, face: 'mono', colour: SOFT, align })
  const peak = sample.characteristics.find(row => row.key === 'cogging.peakToPeak')
  if (peak?.value == null) return
  const { value, upper, unit } = formatRow(peak)
  const bad = peak.verdict === 'fail' || peak.verdict === 'conditional-fail'
  sheet.text(value!, x, y + 3, { size: 17, face: 'monoBold', colour: bad ? FAIL : INK, align: 'centre' })
  sheet.text(`${unit} peak to peak`, x, y - 8, { size: 7, colour: SOFT, align: 'centre' })
  if (upper !== null) sheet.text(`limit ${joinQuantity(upper, unit)}`, x, y - 17, { size: 7, colour: SOFT, align: 'centre' })
}

interface Box { x: number; top: number; width: number; height: number }

function drawComb(sheet: Sheet, record: PaperRecord, sample: PaperSample, box: Box): void {
  const limits = record.sheet.content.limits.flatMap((limit) => {
    const order = /^order\.(\d+)$/.exec(limit.key)?.[1]
    return order && limit.upper !== null && limit.unit === 'N·m' ? [{ order: Number(order), upperNm: limit.upper }] : []
  })
  const geometry = combGeometry({ orders: sample.orders, limits, highestOrder: sample.cogging!.cosNm.length, width: box.width * COMB_SCALE, height: (box.height - 22) * COMB_SCALE })
  const x = (value: number) => box.x + value / COMB_SCALE
  const y = (value: number) => box.top - 10 - value / COMB_SCALE
  const { left, right, bottom } = geometry.plot
  sheet.text(`Amplitude by order, ${geometry.unit}`, x(left), box.top - 6, { size: 8, face: 'bold' })
  const decimals = Math.max(...geometry.yTicks.map(tick => tick.label.split('.')[1]?.length ?? 0))
  for (const tick of geometry.yTicks) {
    sheet.rule(y(tick.at), x(left), x(right), LINE, 0.5)
    sheet.text(Number(tick.label).toFixed(decimals), x(left) - 5, y(tick.at) - 2.4, { size: 7, face: 'mono', colour: SOFT, align: 'right' })
  }
  for (const tooth of geometry.teeth) {
    sheet.line(x(tooth.x), y(bottom), x(tooth.x), y(tooth.y), { colour: tooth.over ? FAIL : ORIGIN_COLOURS[tooth.origin], width: 1.9, dash: ORIGIN_DASHES[tooth.origin] })
    if (!tooth.labelled) continue
    sheet.text(String(tooth.order), x(tooth.x), y(bottom) - 9, { size: 7, face: tooth.over ? 'monoBold' : 'mono', colour: tooth.over ? FAIL : INK, align: 'centre' })
    sheet.text(tooth.letter, x(tooth.x), y(bottom) - 17.5, { size: 7, face: 'monoBold', colour: ORIGIN_COLOURS[tooth.origin], align: 'centre' })
  }
  for (const notch of geometry.notches) sheet.line(x(notch.x) - 4.5, y(notch.y), x(notch.x) + 4.5, y(notch.y), { colour: FAIL, width: 1.4 })
  drawCombLegend(sheet, x(left), box.top - box.height + 2, geometry.notches.length > 0)
}

function drawCombLegend(sheet: Sheet, x: number, y: number, limited: boolean): void {
  let at = x
  for (const origin of Object.keys(ORIGIN_LETTERS) as Origin[]) {
    sheet.text(ORIGIN_LETTERS[origin], at, y, { size: 6.8, face: 'monoBold', colour: ORIGIN_COLOURS[origin] })
    sheet.text(ORIGIN_WORDS[origin], at + 6, y, { size: 6.8, colour: SOFT })
    at += sheet.width(ORIGIN_WORDS[origin], { size: 6.8 }) + 15
  }
  if (!limited) return
  sheet.line(at, y + 2.2, at + 8, y + 2.2, { colour: FAIL, width: 1.4 })
  sheet.text('limit', at + 11, y, { size: 6.8, colour: SOFT })
}

/** From this many motors on the tiles are smaller. */
const MANY = 60

/** Small rings of all motors, each with its serial, mark and word. */
export function drawRosette(sheet: Sheet, record: PaperRecord): void {
  const tiles = record.samples.length > MANY ? 12 : 9
  const step = (PAGE.right - PAGE.left) / tiles
  const width = step - 4
  const lines = Math.max(...record.samples.map(sample => nameLines(sheet, sample, width).length))
  const tile = { width, height: width + 10.5 + 7 * lines }
  const caption = `One turn of the shaft for each motor, clockwise from the index mark at the top.${limitOf(record) === null ? ' Each ring has its own scale.' : ' Shaded: the band of the peak-to-peak limit; thick and red: beyond it. All rings have the same scale.'}`
  sheet.heading('All motors of the sample', 52 + tile.height)
  sheet.paragraph(caption, { size: 7.6, colour: SOFT, after: 5 })
  record.samples.forEach((sample, index) => {
    const column = index % tiles
    if (column === 0) {
      sheet.need(tile.height + 4)
      sheet.y -= tile.height + 4
    }
    drawTile(sheet, sample, limitOf(record), { x: PAGE.left + column * step + 2, top: sheet.y + tile.height, ...tile })
  })
  sheet.y -= 4
}

const TILE_NAME = 6.2

/** A serial is never shrunk until it cannot be read; a long one takes more lines. */
const nameLines = (sheet: Sheet, sample: PaperSample, width: number): string[] => sheet.wrap(nameOf(sample), width - 3, { size: TILE_NAME, face: failing(sample) ? 'monoBold' : 'mono' })

function drawTile(sheet: Sheet, sample: PaperSample, limit: number | null, { x, top, width, height }: Box): void {
  const bad = failing(sample)
  if (bad) sheet.page.drawRectangle({ x, y: top - height, width, height, color: FAIL_WASH, borderColor: FAIL, borderWidth: 0.8 })
  const ring = width - 5
  if (sample.cogging) drawRing(sheet, sample, limit, x + 2.5, top - 2.5, ring)
  else sheet.text('not measured', x + width / 2, top - width / 2, { size: 5.6, colour: SOFT, align: 'centre' })
  const style = { size: TILE_NAME, face: bad ? 'monoBold' : 'mono', colour: bad ? FAIL : INK, align: 'centre' } as const
  nameLines(sheet, sample, width).forEach((line, index) => sheet.text(line, x + width / 2, top - width - 5.4 - 7 * index, style))
  if (!sample.cogging) return
  const word = verdictWidth(sheet, sample.verdict, 5.8)
  drawVerdict(sheet, sample.verdict, x + (width - word) / 2, top - height + 3.4, { size: 5.8 })
}
