import { describeCharacteristic } from '#shared/compute/judging/characteristics'
import { limitText } from '#shared/compute/judging/sheet-changes'
import type { PaperRecord } from '#shared/contracts/paper-record'
import { FAIL, INK, PAGE, SOFT } from './sheet'
import type { Sheet } from './sheet'

export interface Column { title: string[]; x: number; align: 'left' | 'right' }

/** Label, value, and the face of the value. */
export type Fact = [label: string, value: string, face?: 'mono' | 'sans']

/** Head of a table, repeated on every further page; the answer ends the table. */
export function tableHead(sheet: Sheet, columns: Column[], height = 20): () => void {
  const lines = Math.max(...columns.map(column => column.title.length))
  const draw = () => {
    sheet.y -= 9.5 * lines + 2
    for (const { title, x, align } of columns) title.forEach((line, index) => sheet.text(line, x, sheet.y + 9.5 * (title.length - 1 - index), { size: 7.4, colour: SOFT, align, face: 'bold' }))
    sheet.y -= 5
    sheet.rule(sheet.y, PAGE.left, PAGE.right, INK, 0.7)
  }
  sheet.need(9.5 * lines + 7 + height)
  draw()
  sheet.onNewPage = draw
  return () => void (sheet.onNewPage = null)
}

/** Label and value pairs in two columns. */
export function drawFacts(sheet: Sheet, facts: readonly Fact[]): void {
  const half = (PAGE.right - PAGE.left) / 2 + 6
  const rows = Math.ceil(facts.length / 2)
  const label = 70
  for (let row = 0; row < rows; row++) {
    const pair = [facts[row], facts[row + rows]]
    const cells = pair.map((fact, column) => fact ? sheet.wrap(fact[1], (column === 0 ? half - 14 : PAGE.right - PAGE.left - half) - label, { size: 8.8, face: fact[2] ?? 'sans' }) : [])
    const height = 11.5 * Math.max(1, ...cells.map(lines => lines.length)) + 2.5
    sheet.need(height)
    pair.forEach((fact, column) => {
      if (!fact) return
      const x = PAGE.left + column * half
      sheet.text(fact[0], x, sheet.y - 10, { size: 8, colour: SOFT })
      cells[column]!.forEach((line, index) => sheet.text(line, x + label, sheet.y - 10 - 11.5 * index, { size: 8.8, face: fact[2] ?? 'sans' }))
    })
    sheet.y -= height
  }
  sheet.y -= 2
}

/** The limits of the sheet, and how many motors lie outside each. */
export function drawLimits(sheet: Sheet, record: PaperRecord): void {
  const limitX = PAGE.left + 356
  const end = tableHead(sheet, [{ title: ['Characteristic'], x: PAGE.left, align: 'left' }, { title: ['Limit'], x: limitX, align: 'right' }, { title: ['Class'], x: limitX + 22, align: 'left' }, { title: ['Nonconforming'], x: PAGE.right, align: 'right' }])
  for (const limit of record.sheet.content.limits) {
    const name = sheet.wrap(describeCharacteristic(limit.key).label, 205, { size: 8.6 })
    const over = record.samples.filter(sample => sample.characteristics.some(row => row.key === limit.key && (row.verdict === 'fail' || row.verdict === 'conditional-fail'))).length
    sheet.need(4 + 11 * name.length)
    const y = sheet.y - 11.5
    name.forEach((line, index) => sheet.text(line, PAGE.left, y - 11 * index, { size: 8.6 }))
    sheet.text(limitText(limit), limitX, y, { size: 8.4, face: 'mono', align: 'right' })
    sheet.text(limit.class, limitX + 22, y, { size: 8.6 })
    sheet.text(`${over}`, PAGE.right, y, { size: 8.6, face: over ? 'monoBold' : 'mono', colour: over ? FAIL : INK, align: 'right' })
    sheet.y = y - 11 * (name.length - 1) - 4
    sheet.rule()
  }
  end()
}
