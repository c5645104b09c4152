import { fail, type Outcome } from './fault'
import { readCell } from './scan'

/** How a delimited text file separates its cells and writes its decimals. */
export interface Dialect {
  separator: ',' | ';' | '\t' | ' '
  decimal: '.' | ','
}

/** What the first lines of a file tell. */
export interface TableHead {
  dialect: Dialect
  /** The file as scanned: UTF-8 or Latin-1, line ends by LF or CR LF, no byte order mark. */
  bytes: Uint8Array
  /** Header cells, or null when the file has none. */
  header: string[] | null
  /** Cells of a line of units under the header, if there is one. */
  units: string[] | null
  /** Offset of the first line of data in `bytes`. */
  dataOffset: number
  /** Line of the first data, from 1. */
  dataLine: number
  /** Cells a line, empty trailing ones not counted. */
  columnCount: number
  /** First lines of data as text. */
  sample: string[][]
}

interface HeadLine {
  number: number
  offset: number
  text: string
}

const NEWLINE = 10
const HEAD_BYTES = 262_144
/** Lines looked at first; files with a longer preamble are looked at again, further. */
const HEAD_LINES = [60, 2000]
/** The last of these decide on the dialect: they are the likeliest to be data. */
const SNIFFED_LINES = 24
const SAMPLE_LINES = 8
const DIALECTS: Dialect[] = [
  { separator: '\t', decimal: '.' },
  { separator: '\t', decimal: ',' },
  { separator: ';', decimal: '.' },
  { separator: ';', decimal: ',' },
  { separator: ',', decimal: '.' },
  { separator: ' ', decimal: '.' },
  { separator: ' ', decimal: ',' },
]

/** UTF-16 to UTF-8, byte order mark off, lone CR to LF. */
function plainBytes(bytes: Uint8Array): Uint8Array {
  if (bytes[0] === 0xFF && bytes[1] === 0xFE) return new TextEncoder().encode(new TextDecoder('utf-16le').decode(bytes))
  if (bytes[0] === 0xFE && bytes[1] === 0xFF) return new TextEncoder().encode(new TextDecoder('utf-16be').decode(bytes))
  const start = bytes[0] === 0xEF && bytes[1] === 0xBB && bytes[2] === 0xBF ? 3 : 0
  const body = start ? bytes.subarray(start) : bytes
  const first = body.subarray(0, 4096)
  return first.includes(13) && !first.includes(10) ? body.map((byte) => (byte === 13 ? 10 : byte)) : body
}

/** Text of the first bytes: UTF-8, or Latin-1 where that fails. */
function decodeHead(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes, { stream: true })
  }
  catch {
    return new TextDecoder('latin1').decode(bytes)
  }
}

/** The first lines with their places in the file. */
function headLines(bytes: Uint8Array, most: number): HeadLine[] {
  const offsets: number[] = []
  let offset = 0
  while (offset < Math.min(bytes.length, HEAD_BYTES) && offsets.length < most) {
    offsets.push(offset)
    const newline = bytes.indexOf(NEWLINE, offset)
    offset = newline < 0 ? bytes.length : newline + 1
  }
  const texts = decodeHead(bytes.subarray(0, Math.min(offset, HEAD_BYTES))).split('\n')
  return offsets.map((start, index) => ({ number: index + 1, offset: start, text: (texts[index] ?? '').replace(/\r+$/, '') }))
}

/** Splits a line into cells; empty ones at the end are dropped. */
export function splitCells(line: string, separator: Dialect['separator']): string[] {
  const cells: string[] = []
  const pattern = separator === ' ' ? /\s*(?:"((?:[^"]|"")*)"|(\S+))(?:\s+|$)/y : undefined
  if (pattern) {
    for (let match = pattern.exec(line); match; match = pattern.exec(line)) cells.push((match[1]?.replaceAll('""', '"') ?? match[2] ?? '').trim())
  }
  else {
    cells.push(...splitQuoted(line, separator))
  }
  while (cells.length > 0 && cells.at(-1) === '') cells.pop()
  return cells
}

function splitQuoted(line: string, separator: string): string[] {
  if (!line.includes('"')) return line.split(separator).map((cell) => cell.trim())
  const cells: string[] = []
  let cell = ''
  let quoted = false
  for (let at = 0; at < line.length; at++) {
    const character = line[at]!
    if (character === '"' && quoted && line[at + 1] === '"') cell += line[++at]
    else if (character === '"') quoted = !quoted
    else if (character === separator && !quoted) {
      cells.push(cell.trim())
      cell = ''
    }
    else cell += character
  }
  cells.push(cell.trim())
  return cells
}

/** How much a line looks like data in a dialect: numbers count for it, text with digits in it against it. */
function numericCells(cells: string[], decimal: Dialect['decimal']): number {
  let score = 0
  for (const cell of cells) {
    const kind = readCell(cell, decimal).kind
    if (kind === 'number' || kind === 'not-finite') score++
    else if (kind === 'text' && /\d/.test(cell)) score -= 2
  }
  return score
}

/** The dialect in which most of the lines are rows of the same number of numbers. */
function sniffDialect(lines: HeadLine[], forced: string | undefined): { dialect: Dialect; columnCount: number } | null {
  let best: { dialect: Dialect; columnCount: number; score: number } | null = null
  for (const dialect of DIALECTS) {
    if (forced && dialect.separator !== forced) continue
    const counts = new Map<number, number>()
    for (const line of lines) {
      const cells = splitCells(line.text, dialect.separator)
      const score = cells.length < 2 ? 0 : numericCells(cells, dialect.decimal)
      if (score > 0) counts.set(cells.length, (counts.get(cells.length) ?? 0) + score)
    }
    for (const [columnCount, score] of counts) {
      if (!best || score > best.score) best = { dialect, columnCount, score }
    }
  }
  return best
}

const isUnitsLine = (cells: string[]) => cells.every((cell) => cell.length <= 12 && !/\d{2}/.test(cell) && /^[[({]?[^\s,;]{0,10}[\])}]?$/.test(cell))
const SHORT_UNIT = /^[[({]?(?:-|1|deg|°|rad|turns?|rev|s|ms|[uµμ]s|[mkuµμ]?g?f?N?[·.*\s]?c?m|N|[mk]?A|m?V|%|rpm|counts?|ozf?[·.-]?in|)[\])}]?$/i

/** Columns that hold numbers in most of the lines. */
function numericColumns(lines: string[][], decimal: Dialect['decimal'], columnCount: number): number[] {
  const counts = Array.from({ length: columnCount }, (_, column) => lines.filter((cells) => readCell(cells[column] ?? '', decimal).kind === 'number').length)
  const most = Math.max(...counts)
  return counts.flatMap((count, column) => (count > 0 && count >= most / 2 ? [column] : []))
}

/** Finds header, line of units and first line of data. */
function findData(lines: HeadLine[], sniffed: HeadLine[], found: { dialect: Dialect; columnCount: number }) {
  const { dialect, columnCount } = found
  const cellsOf = (line: HeadLine) => splitCells(line.text, dialect.separator)
  const numeric = numericColumns(sniffed.map(cellsOf), dialect.decimal, columnCount)
  const isData = (cells: string[]) => numeric.every((column) => readCell(cells[column] ?? '', dialect.decimal).kind === 'number')
  const isWords = (cells: string[]) => cells.length >= Math.min(2, columnCount)
    && cells.every((cell) => ['text', 'empty'].includes(readCell(cell, dialect.decimal).kind))
  const first = lines.findIndex((line) => !line.text.startsWith('#') && isData(cellsOf(line)))
  if (first < 0 || numeric.length === 0) return null
  const above = lines.slice(0, first).filter((line) => line.text.trim() !== '')
  const candidates = above.map((line) => ({ line, cells: splitCells(line.text.replace(/^#\s*/, ''), dialect.separator) }))
    .filter(({ line, cells }) => isWords(cells) && (!line.text.startsWith('#') || cells.length >= columnCount))
  const plain = candidates.filter(({ line }) => !line.text.startsWith('#'))
  const pool = plain.some(({ cells }) => cells.length >= columnCount) ? plain.filter(({ cells }) => cells.length >= columnCount) : candidates
  const last = pool.at(-1)
  const before = pool.at(-2)
  const hasUnits = last !== undefined && before !== undefined && isUnitsLine(last.cells) && last.cells.every((cell) => SHORT_UNIT.test(cell))
  const header = hasUnits ? before : last
  const start = last && !last.line.text.startsWith('#') ? lines[lines.indexOf(last.line) + 1] ?? lines[first]! : lines[first]!
  return { header: header?.cells ?? null, units: hasUnits ? last.cells : null, start }
}

const FORCED = /^"?sep=(\t|.)"?$/i

/** Reads the head from the first lines; null when they hold no row of numbers. */
function readLines(bytes: Uint8Array, lines: HeadLine[]): TableHead | null {
  const forced = FORCED.exec(lines[0]!.text)?.[1]
  const usable = forced ? lines.slice(1) : lines
  const sniffed = usable.filter((line) => !line.text.startsWith('#') && line.text.trim() !== '').slice(-SNIFFED_LINES)
  const found = sniffDialect(sniffed, forced)
  const data = found && findData(usable, sniffed, found)
  if (!data) return null
  const sample = usable.slice(usable.indexOf(data.start)).filter((line) => line.text.trim() !== '' && !line.text.startsWith('#')).slice(0, SAMPLE_LINES)
  return {
    ...found, bytes, header: data.header, units: data.units, dataOffset: data.start.offset, dataLine: data.start.number,
    sample: sample.map((line) => splitCells(line.text, found.dialect.separator)),
  }
}

/**
 * Finds out how a delimited text file is written: separator, decimal mark, header, line of units, first line of data.
 *
 * Every dialect is tried on the first lines; the one in which they hold the most numbers in rows of one length is taken.
 * Lines that begin with `#` and free lines above the header are passed over; Excel's `sep=` is obeyed.
 *
 * @param file - bytes of the file
 * @returns what the head tells, or the fault `empty-file` or `not-a-table`
 */
export function readHead(file: Uint8Array): Outcome<TableHead> {
  const bytes = plainBytes(file)
  if (bytes.subarray(0, 4096).includes(0)) {
    return fail('not-a-table', null, 'The file is not a text table.', 'Export the measurement as CSV text and upload that file.')
  }
  for (const most of HEAD_LINES) {
    const lines = headLines(bytes, most)
    if (lines.every((line) => line.text.trim() === '')) return fail('empty-file', null, 'The file is empty.', 'Export the measurement again and upload that file.')
    const head = readLines(bytes, lines)
    if (head) return { ok: true, value: head }
  }
  return fail('not-a-table', null, 'No line of the file holds two numbers or more, so it is not a table of angle and torque.',
    'Export the measurement as CSV text with one row a reading.')
}
