import type { ColumnRecipe, ColumnRole, Fault, Method } from '../terms/measurement'
import { readHead, type TableHead } from './dialect'
import { parseDirection } from './direction'
import { fail, type Outcome } from './fault'
import { bindRecipe, findOpen, guessColumns, type BoundColumn } from './recipe'
import { CellScanner, readCell } from './scan'

/** The checked rows of one file, in SI. */
export interface MeasurementTable {
  rows: number
  /** Line of each row, from 1. */
  lines: Uint32Array
  /** rad, N·m, A, V, s, rad/s, °C; one value a row. */
  columns: Partial<Record<ColumnRole, Float64Array>>
  /** Direction by the column's words; null when there is no such column. */
  direction: Int8Array | null
}

/** What was read, or the fault; the recipe as guessed or given goes with both. */
export type TableOutcome =
  | { ok: true; table: MeasurementTable; recipe: ColumnRecipe }
  | { ok: false; fault: Fault; recipe?: ColumnRecipe }

const SKIPPED = -1
const DIRECTION = -2
const HASH = 35
const NEWLINE = 10
const BYTES_A_ROW = 12

/** Columns that grow, and the state of reading them. */
class RowSink {
  rows = 0
  lines: Uint32Array
  readonly values: Float64Array[]
  direction: Int8Array | null
  private capacity: number

  constructor(numbers: number, withDirection: boolean, bytes: number) {
    this.capacity = Math.max(64, Math.ceil(bytes / BYTES_A_ROW))
    this.lines = new Uint32Array(this.capacity)
    this.values = Array.from({ length: numbers }, () => new Float64Array(this.capacity))
    this.direction = withDirection ? new Int8Array(this.capacity) : null
  }

  /** Makes room for one more row. */
  reserve(): void {
    if (this.rows < this.capacity) return
    this.capacity *= 2
    const grown = <T extends Uint32Array | Float64Array | Int8Array>(old: T, larger: T): T => {
      larger.set(old)
      return larger
    }
    this.lines = grown(this.lines, new Uint32Array(this.capacity))
    this.values.forEach((column, index) => { this.values[index] = grown(column, new Float64Array(this.capacity)) })
    if (this.direction) this.direction = grown(this.direction, new Int8Array(this.capacity))
  }
}

/** Reads lines of cells into columns. */
class RowReader {
  readonly sink: RowSink
  /** For each column of the file: which value it is, or SKIPPED, or DIRECTION. */
  private readonly slots: number[] = []
  private readonly names: string[] = []
  private line: number
  private lastWord: Uint8Array = new Uint8Array(0)
  private lastSign = 0

  constructor(private readonly head: TableHead, bound: BoundColumn[], length: number) {
    const numbers = bound.filter((column) => column.role !== 'direction')
    this.sink = new RowSink(numbers.length, numbers.length < bound.length, length)
    const last = Math.max(...bound.map((column) => column.index))
    for (let index = 0; index <= last; index++) {
      const column = bound.find((candidate) => candidate.index === index)
      this.slots.push(!column ? SKIPPED : column.role === 'direction' ? DIRECTION : numbers.indexOf(column))
      this.names.push(head.header?.[index] ?? `column ${index + 1}`)
    }
    this.line = head.dataLine
  }

  /** Reads all lines of the range; its last byte is a newline. Returns the fault of the first line that does not fit. */
  read(bytes: Uint8Array, from: number, to: number): Fault | null {
    const { separator, decimal } = this.head.dialect
    const cells = new CellScanner(bytes, separator.charCodeAt(0), decimal.charCodeAt(0))
    cells.position = from
    while (cells.position < to) {
      if (!cells.skipBlanks() && cells.byte !== HASH) {
        const fault = this.readRow(cells)
        if (fault) return fault
      }
      cells.skipLine()
      this.line++
    }
    return null
  }

  private readRow(cells: CellScanner): Fault | null {
    const { sink, slots } = this
    const start = cells.position
    sink.reserve()
    const row = sink.rows
    for (let index = 0; index < slots.length; index++) {
      const slot = slots[index]!
      if (index > 0 && cells.atLineEnd) return this.shortRow(cells, start, index)
      if (slot === SKIPPED) {
        cells.skip()
      }
      else if (slot === DIRECTION) {
        const fault = this.readDirection(cells, row)
        if (fault) return fault
      }
      else {
        const value = cells.number()
        if (Number.isNaN(value)) return this.badNumber(cells, start, index)
        sink.values[slot]![row] = value
      }
    }
    sink.lines[row] = this.line
    sink.rows = row + 1
    return null
  }

  private readDirection(cells: CellScanner, row: number): Fault | null {
    if (!cells.skipWord(this.lastWord)) {
      const word = cells.text()
      const sign = parseDirection(word)
      if (sign === null) {
        return fail('direction-unknown', this.line, `The direction "${word.slice(0, 40)}" is not known.`, 'Write fwd or rev, or +1 or -1, in the direction column.').fault
      }
      this.lastWord = /^[ -~]*$/.test(word) ? new TextEncoder().encode(word) : new Uint8Array(0)
      this.lastSign = sign
    }
    this.sink.direction![row] = this.lastSign
    return null
  }

  private shortRow(cells: CellScanner, start: number, found: number): Fault {
    const remedy = 'Check that the file was written to its end, and export it again.'
    cells.position = start
    return fail('row-too-short', this.line, `The row has ${found} ${found === 1 ? 'cell' : 'cells'} where ${this.slots.length} or more are needed.`, remedy).fault
  }

  private badNumber(cells: CellScanner, start: number, index: number): Fault {
    const text = cells.text()
    const name = this.names[index]!
    if (text === '' && cells.atLineEnd && index > 0) return this.shortRow(cells, start, index)
    const kind = readCell(text, this.head.dialect.decimal).kind
    if (kind === 'not-finite') {
      return fail('not-finite', this.line, `"${text.slice(0, 40)}" in "${name}" is not a finite number.`, 'Find out why the rig wrote it, and measure again.').fault
    }
    const what = kind === 'empty' ? `The cell in "${name}" is empty.` : `"${text.slice(0, 40)}" in "${name}" is not a number.`
    return fail('not-numeric', this.line, what, 'Correct the row at its source, or measure again.').fault
  }
}

/** Reads all rows behind the head; a last line without a line end is read from a copy that has one. */
function readRows(head: TableHead, bound: BoundColumn[]): Outcome<RowSink> {
  const { bytes, dataOffset } = head
  const reader = new RowReader(head, bound, bytes.length - dataOffset)
  const complete = Math.max(dataOffset, bytes.lastIndexOf(NEWLINE) + 1)
  let fault = reader.read(bytes, dataOffset, complete)
  if (!fault && complete < bytes.length) {
    const tail = new Uint8Array(bytes.length - complete + 1)
    tail.set(bytes.subarray(complete))
    tail[tail.length - 1] = NEWLINE
    fault = reader.read(tail, 0, tail.length)
  }
  if (fault) return { ok: false, fault }
  if (reader.sink.rows === 0) return fail('empty-file', null, 'The file has a header but no rows.', 'Export the measurement again and upload that file.')
  return { ok: true, value: reader.sink }
}

function scaled(values: Float64Array, rows: number, scale: number): Float64Array {
  const column = values.subarray(0, rows)
  if (scale !== 1) for (let row = 0; row < rows; row++) column[row]! *= scale
  return column
}

/**
 * Reads a measurement file into checked columns in SI units.
 *
 * @param bytes - the file: delimited text in any dialect that `readHead` knows
 * @param recipe - the rig's column recipe; null: guess it from the header
 * @param method - how the map was measured; tells which columns are needed
 * @returns the columns and the recipe used; or the fault, with the guess made so far. Codes: `empty-file`, `not-a-table`, `missing-column`,
 *   `unit-not-named`, `unit-unknown`, `not-numeric`, `not-finite`, `row-too-short`, `direction-unknown`
 */
export function readTable(bytes: Uint8Array, recipe: ColumnRecipe | null, method: Method): TableOutcome {
  const head = readHead(bytes)
  if (!head.ok) return { ...head, ...(recipe ? { recipe } : {}) }
  const used = recipe ?? guessColumns(head.value, method)
  const open = findOpen(used, method, head.value.header ? Math.max(1, head.value.dataLine - 1) : null)
  if (open) return { ok: false, fault: open, recipe: used }
  const bound = bindRecipe(head.value, used)
  if (!bound.ok) return { ...bound, recipe: used }
  const read = readRows(head.value, bound.value)
  if (!read.ok) return { ...read, recipe: used }
  const sink = read.value
  const columns: MeasurementTable['columns'] = {}
  bound.value.filter((column) => column.role !== 'direction').forEach((column, slot) => {
    columns[column.role] = scaled(sink.values[slot]!, sink.rows, column.scale)
  })
  return { ok: true, recipe: used, table: { rows: sink.rows, lines: sink.lines.subarray(0, sink.rows), columns, direction: sink.direction?.subarray(0, sink.rows) ?? null } }
}
