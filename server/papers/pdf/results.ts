import { describeCharacteristic } from '#shared/compute/judging/characteristics'
import { partRemarks } from '#shared/compute/judging/notes'
import { formatDecimals, formatRow } from '#shared/compute/judging/quantities'
import type { CharacteristicVerdict, Limit } from '#shared/compute/terms/judgement'
import type { PaperRecord, PaperSample } from '#shared/contracts/paper-record'
import { failing, nameOf } from './figures'
import { drawVerdict } from './marks'
import { FAIL, INK, PAGE, SOFT } from './sheet'
import type { Sheet } from './sheet'
import { tableHead } from './tables'
import type { Column } from './tables'

const SERIAL_X = PAGE.left + 26
const SERIAL = { size: 8.8, face: 'mono' } as const
const VERDICT_ROOM = 84
/** Room that a value with its uncertainty needs. */
const VALUE_ROOM = 70

interface Frame { serialWidth: number; valuesX: number; columns: number }

/** Every drawn motor with every limited characteristic, in as many tables as have room; what fails or is doubtful is said in words once, in the first. */
export function drawResults(sheet: Sheet, record: PaperRecord): void {
  const { limits } = record.sheet.content
  const longest = Math.max(...record.samples.map(sample => sheet.width(nameOf(sample), { ...SERIAL, face: 'monoBold' })), 40)
  const serialWidth = Math.min(longest, 130)
  const valuesX = SERIAL_X + serialWidth + 6
  const most = Math.floor((PAGE.right - VERDICT_ROOM - valuesX) / VALUE_ROOM)
  const tables = Math.ceil(limits.length / most)
  const columns = Math.ceil(limits.length / tables)
  const from = (table: number) => Math.ceil(table * limits.length / tables)
  for (let table = 0; table < tables; table++) {
    sheet.heading(table === 0 ? 'Results' : 'Results, further characteristics', 74)
    drawTable(sheet, record, limits.slice(from(table), from(table + 1)), { serialWidth, valuesX, columns }, table === 0)
  }
  sheet.y -= 3
  sheet.paragraph('Values with their expanded uncertainty, k = 2. The verdict is the motor’s, over all its limited characteristics.', { size: 7.6, colour: SOFT })
}

interface Value { limit: Limit; x: number; unit: string; factor: number }

function drawTable(sheet: Sheet, record: PaperRecord, limits: readonly Limit[], frame: Frame, remarks: boolean): void {
  const end = PAGE.right - VERDICT_ROOM
  const width = Math.min(104, (end - frame.valuesX) / frame.columns)
  const values = limits.map((limit, index): Value => {
    const { unit, factor } = formatRow({ value: null, expandedUncertainty: null, lower: limit.lower, upper: limit.upper, unit: limit.unit })
    return { limit, x: end - width * (limits.length - 1 - index), unit, factor }
  })
  const heads = values.map(({ limit, x, unit }): Column => {
    const label = describeCharacteristic(limit.key).label.replace('Cogging, peak to peak', 'Peak to peak')
    return { title: [...sheet.wrap(label, width - 8, { size: 7.4, face: 'bold' }), unit || 'ratio'], x, align: 'right' }
  })
  const close = tableHead(sheet, [{ title: ['No.'], x: PAGE.left, align: 'left' }, { title: ['Serial'], x: SERIAL_X, align: 'left' }, ...heads, { title: ['Verdict'], x: PAGE.right, align: 'right' }])
  for (const sample of record.samples) drawRow(sheet, sample, { values, serialWidth: frame.serialWidth, remarks })
  close()
}

function drawRow(sheet: Sheet, sample: PaperSample, { values, serialWidth, remarks }: { values: readonly Value[]; serialWidth: number; remarks: boolean }): void {
  const face = failing(sample) ? 'monoBold' : 'mono'
  const serial = sheet.wrap(nameOf(sample), serialWidth + 0.1, { ...SERIAL, face })
  const lines = remarks ? sheet.wrap(remarksOf(sample).join(' '), PAGE.right - SERIAL_X - VERDICT_ROOM, { size: 7.6 }).filter(line => line !== '') : []
  sheet.need(5 + 11 * serial.length + 9.6 * Math.min(lines.length, 6))
  const y = sheet.y - 11.5
  sheet.text(String(sample.drawOrder), PAGE.left, y, { size: 8, colour: SOFT, face: 'mono' })
  serial.forEach((line, index) => sheet.text(line, SERIAL_X, y - 11 * index, { ...SERIAL, face }))
  for (const value of values) drawValue(sheet, sample, value, y)
  drawVerdict(sheet, sample.verdict, PAGE.right, y, { size: 8.2, align: 'right', word: sample.attempt === null ? 'not measured' : undefined })
  sheet.y = y - 11 * (serial.length - 1)
  for (const line of lines) {
    sheet.need(11)
    sheet.y -= 9.6
    sheet.text(line, SERIAL_X, sheet.y, { size: 7.6, colour: SOFT })
  }
  sheet.y -= 3.8
  sheet.rule()
}

function drawValue(sheet: Sheet, sample: PaperSample, { limit, x, factor }: Value, y: number): void {
  const row = sample.characteristics.find(each => each.key === limit.key)
  if (!row || row.value === null) return sheet.text(sample.attempt === null ? '–' : 'not stated', x, y, { size: 7.6, colour: SOFT, align: 'right' })
  const bad = row.verdict === 'fail' || row.verdict === 'conditional-fail'
  sheet.text(valueText({ ...row, value: row.value }, factor), x, y, { size: 7.8, face: bad ? 'monoBold' : 'mono', colour: bad ? FAIL : INK, align: 'right' })
}

/** Value and uncertainty in the unit of the column's head, with the decimals that the row itself would have. */
function valueText(row: CharacteristicVerdict & { value: number }, factor: number): string {
  const own = formatRow(row)
  const decimals = Math.max(0, own.decimals + Math.round(Math.log10(own.factor / factor)))
  const value = formatDecimals(row.value * factor, decimals)
  return row.expandedUncertainty === null ? value : `${value} ± ${formatDecimals(row.expandedUncertainty * factor, decimals)}`
}

function remarksOf(sample: PaperSample): string[] {
  const named = sample.characteristics.filter(row => row.verdict === null || row.verdict !== 'pass')
  return [
    ...named.map(row => `${describeCharacteristic(row.key).label}: ${row.reason}`), ...partRemarks(sample.warnings).doubts.map(warning => warning.sentence),
    ...(sample.attempt !== null && sample.attempts > 1 ? [`Measured ${sample.attempts} times; attempt ${sample.attempt} counts.`] : []),
  ]
}
