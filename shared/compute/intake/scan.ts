/** Powers of ten that a double holds exactly. */
const EXACT_POWERS = Float64Array.from({ length: 23 }, (_, power) => Number(`1e${power}`))
const MOST_EXACT_DIGITS = 15
const SPACE = 32
const TAB = 9
const NEWLINE = 10
const RETURN = 13
const QUOTE = 34
const PLUS = 43
const MINUS = 45
const ZERO = 48

const NUMERIC = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/
const WORD_FOR_NOT_FINITE = /^[+-]?(?:nan|inf|infinity|#?n\/?a|1\.#(?:inf|ind|qnan)|#num!|#div\/0!)$/i

/** What a cell turned out to hold. */
export type CellKind = 'number' | 'empty' | 'not-finite' | 'text'

/**
 * Tells what the text of a cell holds, by the same grammar as the byte scanner.
 *
 * @param text - the cell, trimmed and without quotes
 * @param decimal - decimal mark of the file
 * @returns the kind, and the value when it is a number
 */
export function readCell(text: string, decimal: '.' | ','): { kind: CellKind; value: number } {
  if (text === '') return { kind: 'empty', value: NaN }
  if (WORD_FOR_NOT_FINITE.test(text)) return { kind: 'not-finite', value: NaN }
  if (decimal === ',' && text.includes('.')) return { kind: 'text', value: NaN }
  const dotted = decimal === ',' ? text.replace(',', '.') : text
  if (!NUMERIC.test(dotted)) return { kind: 'text', value: NaN }
  const value = Number(dotted)
  return Number.isFinite(value) ? { kind: 'number', value } : { kind: 'not-finite', value: NaN }
}

/**
 * Reads cells of delimited text straight from bytes, without a string per cell.
 *
 * A number of at most 15 significant digits and a power of ten of at most 22 is one whole number times or
 * divided by one power of ten, both exact in a double, so the one rounding is the correct one: equal to
 * `Number()` to the last bit (Clinger 1990, the fast path; from memory). Anything longer goes to `Number()` itself.
 * The last byte of the range must be a newline.
 */
export class CellScanner {
  /** Where the next cell begins. */
  position = 0
  private readonly blank: number

  constructor(
    private readonly bytes: Uint8Array,
    private readonly separator: number,
    private readonly decimal: number,
  ) {
    // Tabs around cells are blanks unless they separate.
    this.blank = separator === TAB ? SPACE : TAB
  }

  /** Moves over blanks; true when the line ends there. */
  skipBlanks(): boolean {
    let at = this.position
    let byte = this.bytes[at]!
    while (byte === SPACE || byte === this.blank || byte === RETURN) byte = this.bytes[++at]!
    this.position = at
    return byte === NEWLINE
  }

  /**
   * Reads the number in the cell at `position`, and moves behind its separator.
   *
   * @returns the value; NaN when the cell is no plain number (`position` is left at the cell's start)
   */
  number(): number {
    const { bytes, decimal } = this
    this.skipBlanks()
    let at = this.position
    let byte = bytes[at]!
    const quoted = byte === QUOTE
    if (quoted) byte = bytes[++at]!
    const negative = byte === MINUS
    if (negative || byte === PLUS) byte = bytes[++at]!
    let mantissa = 0
    let significant = 0
    let digits = 0
    let power = 0
    let digit = byte - ZERO
    while (digit >= 0 && digit <= 9) {
      mantissa = mantissa * 10 + digit
      if (mantissa > 0) significant++
      digits++
      digit = (byte = bytes[++at]!) - ZERO
    }
    if (byte === decimal) {
      digit = (byte = bytes[++at]!) - ZERO
      const start = at
      while (digit >= 0 && digit <= 9) {
        mantissa = mantissa * 10 + digit
        if (mantissa > 0) significant++
        digit = (byte = bytes[++at]!) - ZERO
      }
      digits += at - start
      power = start - at
    }
    if (digits === 0 || significant > MOST_EXACT_DIGITS) return this.slow()
    return this.finish(negative ? -mantissa : mantissa, power, at, quoted)
  }

  /** Exponent, quote and separator behind the digits. */
  private finish(mantissa: number, powerOfDigits: number, from: number, quoted: boolean): number {
    const { bytes } = this
    let at = from
    let power = powerOfDigits
    let byte = bytes[at]!
    if (byte === 101 || byte === 69) {
      byte = bytes[++at]!
      const negative = byte === MINUS
      if (negative || byte === PLUS) byte = bytes[++at]!
      const start = at
      let exponent = 0
      while (byte >= ZERO && byte <= ZERO + 9 && at - start < 6) {
        exponent = exponent * 10 + byte - ZERO
        byte = bytes[++at]!
      }
      if (at === start) return this.slow()
      power += negative ? -exponent : exponent
    }
    if (power < -22 || power > 22 || (quoted && bytes[at++] !== QUOTE)) return this.slow()
    if (!this.closes(at)) return this.slow()
    return power < 0 ? mantissa / EXACT_POWERS[-power]! : mantissa * EXACT_POWERS[power]!
  }

  /** Whether the cell ends at `from` but for blanks; if so moves behind the separator. */
  private closes(from: number): boolean {
    const { bytes, separator } = this
    let at = from
    let byte = bytes[at]!
    if (byte === separator && separator !== SPACE) {
      this.position = at + 1
      return true
    }
    while (byte === SPACE || byte === this.blank || byte === RETURN) byte = bytes[++at]!
    if (byte === NEWLINE) this.position = at
    else if (byte === separator) this.position = at + 1
    else if (separator === SPACE && at > from) this.position = at
    else return false
    return true
  }

  /** The rare cell: its text goes to `Number()`, if it is one. */
  private slow(): number {
    const start = this.position
    const cell = readCell(this.text(), this.decimal === 44 ? ',' : '.')
    if (cell.kind === 'number') return cell.value
    this.position = start
    return NaN
  }

  /** Reads the cell at `position` as text (Latin-1), trimmed and unquoted, and moves behind its separator. */
  text(): string {
    this.skipBlanks()
    const start = this.position
    this.skip()
    let end = this.position
    while (end > start && this.isEdge(this.bytes[end - 1]!)) end--
    let text = ''
    for (let at = start; at < end && at < start + 400; at++) text += String.fromCharCode(this.bytes[at]!)
    return text.startsWith('"') ? text.slice(1).replace(/"$/, '').replaceAll('""', '"').trim() : text
  }

  private isEdge(byte: number): boolean {
    return byte === this.separator || byte === SPACE || byte === TAB || byte === RETURN || byte === NEWLINE
  }

  /** Moves behind the separator of the cell at `position`, or to the newline that ends it. */
  skip(): void {
    const { bytes, separator } = this
    let at = this.position
    let byte = bytes[at]!
    if (byte === QUOTE) {
      byte = bytes[++at]!
      while (byte !== NEWLINE && (byte !== QUOTE || bytes[at + 1] === QUOTE)) byte = bytes[(at += byte === QUOTE ? 2 : 1)]!
    }
    while (byte !== separator && byte !== NEWLINE) byte = bytes[++at]!
    this.position = byte === NEWLINE ? at : at + 1
    if (separator === SPACE) this.skipBlanks()
  }

  /**
   * Moves behind the cell at `position` if it reads as the given bytes, and tells so.
   *
   * @param word - bytes of a cell, without blanks about it
   */
  skipWord(word: Uint8Array): boolean {
    this.skipBlanks()
    for (let index = 0; index < word.length; index++) if (this.bytes[this.position + index] !== word[index]) return false
    return word.length > 0 && this.closes(this.position + word.length)
  }

  /** Moves to the line behind the next newline. */
  skipLine(): void {
    let at = this.position
    while (this.bytes[at] !== NEWLINE) at++
    this.position = at + 1
  }

  /** True at the newline. */
  get atLineEnd(): boolean {
    return this.bytes[this.position] === NEWLINE
  }

  /** The byte at `position`. */
  get byte(): number {
    return this.bytes[this.position]!
  }
}
