import fontkit from '@pdf-lib/fontkit'
import { PDFDocument, rgb } from 'pdf-lib'
import type { PDFFont, PDFPage, RGB } from 'pdf-lib'
import type { PaperFonts } from './fonts'

const hex = (code: string): RGB => rgb(Number.parseInt(code.slice(0, 2), 16) / 255, Number.parseInt(code.slice(2, 4), 16) / 255, Number.parseInt(code.slice(4), 16) / 255)

/** The same tokens as on screen, light. */
export const INK = hex('1F262B')
export const SOFT = hex('59626A')
export const LINE = hex('DDD5C5')
export const COPPER = hex('A34E17')
export const STEEL = hex('2B5B7A')
export const FAIL = hex('8C1D2F')
export const FAIL_WASH = hex('F6E3E3')
export const CAUTION = hex('7F5F00')
export const BAND = hex('ECE6D8')

/** A4 in points, and the frame in which everything stands. */
export const PAGE = { width: 595.28, height: 841.89, left: 42, right: 553.28, top: 800, bottom: 58 } as const

export type Face = 'sans' | 'bold' | 'mono' | 'monoBold'

export interface TextStyle { size?: number; face?: Face; colour?: RGB; align?: 'left' | 'right' | 'centre' }

/**
 * A document that is written from top to bottom: `y` is the baseline that comes next, `need` starts a new page when there is no room. Signs that a face lacks are set in the
 * fallback face.
 */
export class Sheet {
  page!: PDFPage
  y = 0
  /** Drawn at the top of every further page, such as a table's head. */
  onNewPage: (() => void) | null = null
  /** Whether a sign was met that no face holds; it is drawn as □. */
  lacksSigns = false

  /** Widths at size 1 by face and text: measuring is the slow part. */
  private readonly widths = new Map<string, number>()

  private constructor(readonly document: PDFDocument, private readonly faces: Record<Face | 'fallback', PDFFont>, private readonly known: Record<Face | 'fallback', Set<number>>) {}

  static async create(fonts: PaperFonts): Promise<Sheet> {
    const document = await PDFDocument.create({ updateMetadata: false })
    document.registerFontkit(fontkit)
    const embed = (bytes: Uint8Array) => document.embedFont(bytes, { subset: true })
    const faces = { sans: await embed(fonts.sans), bold: await embed(fonts.sansSemiBold), mono: await embed(fonts.mono), monoBold: await embed(fonts.monoSemiBold), fallback: await embed(fonts.fallback) }
    const known = (face: Face | 'fallback') => new Set(faces[face].getCharacterSet())
    const sheet = new Sheet(document, faces, { sans: known('sans'), bold: known('bold'), mono: known('mono'), monoBold: known('monoBold'), fallback: known('fallback') })
    sheet.addPage()
    return sheet
  }

  addPage(): void {
    this.page = this.document.addPage([PAGE.width, PAGE.height])
    this.y = PAGE.top
    this.onNewPage?.()
  }

  /** Makes sure that this much height is left. */
  need(height: number): void {
    if (this.y - height < PAGE.bottom) this.addPage()
  }

  /** Text in runs of one font each. */
  private runs(text: string, face: Face): { text: string; font: PDFFont }[] {
    const runs: { text: string; font: PDFFont }[] = []
    for (const wanted of text.normalize('NFC').replaceAll(/\s/g, match => match === '\u00A0' ? '\u00A0' : ' ')) {
      const code = wanted.codePointAt(0)!
      const font = this.known[face].has(code) ? this.faces[face] : this.faces.fallback
      const lacking = font === this.faces.fallback && !this.known.fallback.has(code)
      if (lacking) this.lacksSigns = true
      const sign = lacking ? '\u25A1' : wanted
      const last = runs.at(-1)
      if (last?.font === font) last.text += sign
      else runs.push({ text: sign, font })
    }
    return runs
  }

  width(text: string, { size = 9, face = 'sans' }: TextStyle = {}): number {
    const key = `${face} ${text}`
    const known = this.widths.get(key)
    if (known !== undefined) return size * known
    const width = this.runs(text, face).reduce((sum, run) => sum + run.font.widthOfTextAtSize(run.text, 1), 0)
    this.widths.set(key, width)
    return size * width
  }

  text(text: string, x: number, y: number, style: TextStyle = {}): void {
    const { size = 9, face = 'sans', colour = INK, align = 'left' } = style
    const total = this.width(text, style)
    let at = align === 'right' ? x - total : align === 'centre' ? x - total / 2 : x
    const runs = this.runs(text, face)
    for (const run of runs) {
      this.page.drawText(run.text, { x: at, y, size, font: run.font, color: colour })
      if (runs.length > 1) at += run.font.widthOfTextAtSize(run.text, size)
    }
  }

  /** Breaks a text into lines of at most this width; a word that is too long is broken inside. */
  wrap(text: string, width: number, style: TextStyle = {}): string[] {
    const lines: string[] = []
    let line = ''
    for (const word of text.split(' ').flatMap(each => this.pieces(each, width, style))) {
      const longer = line === '' ? word : `${line} ${word}`
      if (this.width(longer, style) <= width) line = longer
      else {
        if (line !== '') lines.push(line)
        line = word
      }
    }
    return [...lines, line]
  }

  private pieces(word: string, width: number, style: TextStyle): string[] {
    if (this.width(word, style) <= width) return [word]
    const pieces: string[] = []
    let piece = ''
    for (const sign of word) {
      if (this.width(piece + sign, style) > width) {
        // Rather after a hyphen or the like than anywhere.
        const joint = Math.max(...['-', '_', '/', '.'].map(each => piece.lastIndexOf(each))) + 1
        const cut = joint > piece.length / 3 ? joint : piece.length
        pieces.push(piece.slice(0, cut))
        piece = piece.slice(cut)
      }
      piece += sign
    }
    return [...pieces, piece]
  }

  /** A wrapped paragraph at the current place; moves down. */
  paragraph(text: string, style: TextStyle & { x?: number; width?: number; leading?: number; after?: number } = {}): void {
    const { x = PAGE.left, width = PAGE.right - PAGE.left, size = 9, after = 5 } = style
    const leading = style.leading ?? size * 1.38
    const lines = this.wrap(text, width, style)
    // A short paragraph stays whole; a long one leaves at least two lines on either page.
    for (const [index, line] of lines.entries()) {
      const together = lines.length <= 4 && index === 0 ? lines.length : index === 0 || index === lines.length - 2 ? 2 : 1
      this.need(leading * together)
      this.y -= leading
      this.text(line, x, this.y + (leading - size) * 0.45, style)
    }
    this.y -= after
  }

  /** A heading that stays with what follows: `keep` is the height of both. */
  heading(text: string, keep = 46): void {
    this.need(keep)
    const lines = this.wrap(text, PAGE.right - PAGE.left, { size: 11.5, face: 'bold' })
    this.y -= this.y === PAGE.top ? 9 : 21
    lines.forEach((line, index) => this.text(line, PAGE.left, this.y - 14 * index, { size: 11.5, face: 'bold' }))
    this.y -= 14 * (lines.length - 1) + 6
  }

  rule(y = this.y, x1: number = PAGE.left, x2: number = PAGE.right, colour = LINE, thickness = 0.7): void {
    this.page.drawLine({ start: { x: x1, y }, end: { x: x2, y }, color: colour, thickness })
  }

  line(x1: number, y1: number, x2: number, y2: number, style: { colour: RGB; width: number; dash?: number[] }): void {
    this.page.drawLine({ start: { x: x1, y: y1 }, end: { x: x2, y: y2 }, color: style.colour, thickness: style.width, dashArray: style.dash })
  }

  circle(x: number, y: number, radius: number, style: { fill?: RGB; stroke?: RGB; width?: number }): void {
    this.page.drawCircle({ x, y, size: radius, color: style.fill, borderColor: style.stroke, borderWidth: style.stroke ? style.width ?? 0.7 : 0 })
  }

  /** A path of a figure whose origin is at the top left, placed with that corner at (x, y). */
  path(path: string, x: number, y: number, style: { fill?: RGB; stroke?: RGB; width?: number; dash?: number[] }): void {
    if (path === '') return
    this.page.drawSvgPath(path, { x, y, color: style.fill, borderColor: style.stroke, borderWidth: style.stroke ? style.width ?? 0.7 : 0, borderDashArray: style.dash })
  }
}
