import { describeCharacteristic } from '#shared/compute/judging/characteristics'
import { formatRow } from '#shared/compute/judging/quantities'
import { partRemarks } from '#shared/compute/judging/notes'
import { limitText } from '#shared/compute/judging/sheet-changes'
import type { Limit } from '#shared/compute/terms/judgement'
import type { PaperRecord, PaperSample } from '#shared/contracts/paper-record'
import { failing, nameOf } from './figures'
import { drawVerdict } from './marks'
import { FAIL, INK, PAGE, SOFT } from './sheet'
import type { Sheet } from './sheet'

interface Column { title: string[]; x: number; align: 'left' | 'right' }

/** Heads of a table, repeated on every further page. */
function tableHead(sheet: Sheet, columns: Column[]): () => void {
  const lines = Math.max(...columns.map(column => column.title.length))
  const draw = () => {
    sheet.y -= 9.5 * lines + 2
    for (const column of columns) column.title.forEach((line, index) => sheet.text(line, column.x, sheet.y + 9.5 * (lines - 1 - index), { size: 7.4, colour: SOFT, align: column.align, face: 'bold' }))
    sheet.y -= 5
    sheet.rule(sheet.y, PAGE.left, PAGE.right, INK, 0.7)
  }
  sheet.need(9.5 * lines + 34)
  draw()
  sheet.onNewPage = draw
  return () => void (sheet.onNewPage = null)
}

/** Label and value pairs in two columns. */
export function drawFacts(sheet: Sheet, facts: readonly [string, string, ('mono' | 'sans')?][]): void {
  const half = (PAGE.right - PAGE.left) / 2
  const rows = Math.ceil(facts.length / 2)
  for (let row = 0; row < rows; row++) {
    const pair = [facts[row], facts[row + rows]]
    const cells = pair.map(fact => fact ? sheet.wrap(fact[1], half - 96, { size: 8.8, face: fact[2] ?? 'sans' }) : [])
    const height = 11.5 * Math.max(1, ...cells.map(lines => lines.length)) + 2.5
    sheet.need(height)
    pair.forEach((fact, column) => {
      if (!fact) return
      const x = PAGE.left + column * half
      sheet.text(fact[0], x, sheet.y - 10, { size: 8, colour: SOFT })
      cells[column]!.forEach((line, index) => sheet.text(line, x + 82, sheet.y - 10 - 11.5 * index, { size: 8.8, face: fact[2] ?? 'sans' }))
    })
    sheet.y -= height
  }
  sheet.y -= 2
}

export function drawLimits(sheet: Sheet, record: PaperRecord): void {
  const end = tableHead(sheet, [{ title: ['Characteristic'], x: PAGE.left, align: 'left' }, { title: ['Limit'], x: PAGE.left + 330, align: 'right' }, { title: ['Class'], x: PAGE.left + 352, align: 'left' }, { title: ['Count of nonconforming motors'], x: PAGE.right, align: 'right' }])
  record.sheet.content.limits.forEach((limit) => {
    sheet.need(14)
    sheet.y -= 12.5
    sheet.text(describeCharacteristic(limit.key).label, PAGE.left, sheet.y, { size: 8.6 })
    sheet.text(limitText(limit), PAGE.left + 330, sheet.y, { size: 8.6, face: 'mono', align: 'right' })
    sheet.text(limit.class, PAGE.left + 352, sheet.y, { size: 8.6 })
    const over = record.samples.filter(sample => sample.characteristics.some(row => row.key === limit.key && (row.verdict === 'fail' || row.verdict === 'conditional-fail'))).length
    sheet.text(`${over}`, PAGE.right, sheet.y, { size: 8.6, face: over ? 'monoBold' : 'mono', colour: over ? FAIL : INK, align: 'right' })
    sheet.y -= 3.5
    sheet.rule()
  })
  end()
}

/** As many limited characteristics as have room beside serial and verdict. */
const VALUE_COLUMNS = 4

/** Every drawn motor with its main figures; whatever fails stands in a line of its own below. */
export function drawResults(sheet: Sheet, record: PaperRecord): void {
  const shown = record.sheet.content.limits.slice(0, VALUE_COLUMNS)
  const start = PAGE.left + 132
  const width = (PAGE.right - 76 - start) / shown.length
  const units = shown.map(limit => formatRow({ value: null, expandedUncertainty: null, lower: limit.lower, upper: limit.upper, unit: limit.unit }))
  const columns: Column[] = [
    { title: ['', 'No.'], x: PAGE.left, align: 'left' }, { title: ['', 'Serial'], x: PAGE.left + 26, align: 'left' },
    ...shown.map((limit, index): Column => ({ title: [describeCharacteristic(limit.key).label.replace('Cogging, peak to peak', 'Peak to peak'), units[index]!.unit || 'ratio'], x: start + width * (index + 1), align: 'right' })),
    { title: ['', 'Verdict'], x: PAGE.right, align: 'right' },
  ]
  const end = tableHead(sheet, columns)
  for (const sample of record.samples) drawResult(sheet, sample, shown, columns)
  end()
  sheet.y -= 3
  const rest = record.sheet.content.limits.length - shown.length
  const notes = [...new Set(record.samples.flatMap(sample => partRemarks(sample.warnings).notes.map(note => note.sentence)))].map(note => ` ${note}`).join('')
  sheet.paragraph(`Values with their expanded uncertainty, k = 2.${rest > 0 ? ` ${rest} further limited characteristics are judged too; all figures stand in the attached record, and those that fail are named above.` : ''}${notes}`, { size: 7.6, colour: SOFT })
}

function drawResult(sheet: Sheet, sample: PaperSample, shown: Limit[], columns: Column[]): void {
  const fails = sample.characteristics.filter(row => row.verdict === 'fail' || row.verdict === 'conditional-fail')
  const unjudged = sample.characteristics.filter(row => row.verdict === null)
  const remarks = [...fails.map(row => `${describeCharacteristic(row.key).label}: ${row.reason}`), ...unjudged.map(row => `${describeCharacteristic(row.key).label}: ${row.reason}`), ...partRemarks(sample.warnings).doubts.map(warning => warning.sentence)]
  const lines = remarks.flatMap(remark => sheet.wrap(remark, PAGE.right - PAGE.left - 30, { size: 7.6 }))
  sheet.need(15 + 10 * Math.min(lines.length, 6))
  sheet.y -= 12
  sheet.text(String(sample.drawOrder), PAGE.left, sheet.y, { size: 8, colour: SOFT, face: 'mono' })
  sheet.text(nameOf(sample), PAGE.left + 26, sheet.y, { size: 8.8, face: failing(sample) ? 'monoBold' : 'mono' })
  shown.forEach((limit, index) => {
    const row = sample.characteristics.find(each => each.key === limit.key)
    const texts = row ? formatRow(row) : null
    const bad = row?.verdict === 'fail' || row?.verdict === 'conditional-fail'
    const text = texts?.value == null ? (sample.cogging ? 'not stated' : '–') : `${texts.value}${texts.expandedUncertainty === null ? '' : ` ± ${texts.expandedUncertainty}`}`
    sheet.text(text, columns[index + 2]!.x, sheet.y, { size: 7.8, face: bad ? 'monoBold' : 'mono', colour: bad ? FAIL : texts?.value == null ? SOFT : INK, align: 'right' })
  })
  drawVerdict(sheet, sample.verdict, PAGE.right, sheet.y, { size: 8.2, align: 'right', word: sample.cogging ? undefined : 'not measured' })
  for (const line of lines) {
    sheet.need(11)
    sheet.y -= 10
    sheet.text(line, PAGE.left + 26, sheet.y, { size: 7.6, colour: SOFT })
  }
  sheet.y -= 3.6
  sheet.rule()
}
