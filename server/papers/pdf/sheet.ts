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

  private constructor(readonly document: PDFDocument, private readonly faces: Record<Face | 'fallback', PDFFont>, private readonly known: Record<Face, Set<number>>) {}

  static async create(fonts: PaperFonts): Promise<Sheet> {
    const document = await PDFDocument.create({ updateMetadata: false })
    document.registerFontkit(fontkit)
    const embed = (bytes: Uint8Array) => document.embedFont(bytes, { subset: true })
    const faces = { sans: await embed(fonts.sans), bold: await embed(fonts.sansSemiBold), mono: await embed(fonts.mono), monoBold: await embed(fonts.monoSemiBold), fallback: await embed(fonts.fallback) }
    const known = (face: Face) => new Set(faces[face].getCharacterSet())
    const sheet = new Sheet(document, faces, { sans: known('sans'), bold: known('bold'), mono: known('mono'), monoBold: known('monoBold') })
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
    for (const sign of text.normalize('NFC').replaceAll(/\s/g, match => match === '\u00A0' ? '\u00A0' : ' ')) {
      const font = this.known[face].has(sign.codePointAt(0)!) ? this.faces[face] : this.faces.fallback
      const last = runs.at(-1)
      if (last?.font === font) last.text += sign
      else runs.push({ text: sign, font })
    }
    return runs
  }

  width(text: string, { size = 9, face = 'sans' }: TextStyle = {}): number {
    return this.runs(text, face).reduce((sum, run) => sum + run.font.widthOfTextAtSize(run.text, size), 0)
  }

  text(text: string, x: number, y: number, style: TextStyle = {}): void {
    const { size = 9, face = 'sans', colour = INK, align = 'left' } = style
    const total = this.width(text, style)
    let at = align === 'right' ? x - total : align === 'centre' ? x - total / 2 : x
    for (const run of this.runs(text, face)) {
      this.page.drawText(run.text, { x: at, y, size, font: run.font, color: colour })
      at += run.font.widthOfTextAtSize(run.text, size)
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
        pieces.push(piece)
        piece = ''
      }
      piece += sign
    }
    return [...pieces, piece]
  }

  /** A wrapped paragraph at the current place; moves down. */
  paragraph(text: string, style: TextStyle & { x?: number; width?: number; leading?: number; after?: number } = {}): void {
    const { x = PAGE.left, width = PAGE.right - PAGE.left, size = 9, after = 5 } = style
    const leading = style.leading ?? size * 1.38
    for (const line of this.wrap(text, width, style)) {
      this.need(leading)
      this.y -= leading
      this.text(line, x, this.y + (leading - size) * 0.45, style)
    }
    this.y -= after
  }

  heading(text: string): void {
    this.need(44)
    this.y -= 21
    this.text(text, PAGE.left, this.y, { size: 11.5, face: 'bold' })
    this.y -= 6
  }

  rule(y = this.y, x1: number = PAGE.left, x2: number = PAGE.right, colour = LINE, thickness = 0.7): void {
    this.page.drawLine({ start: { x: x1, y }, end: { x: x2, y }, color: colour, thickness })
  }

  /** A path of a figure whose origin is at the top left, placed with that corner at (x, y). */
  path(path: string, x: number, y: number, style: { fill?: RGB; stroke?: RGB; width?: number; dash?: number[] }): void {
    if (path === '') return
    this.page.drawSvgPath(path, { x, y, color: style.fill, borderColor: style.stroke, borderWidth: style.stroke ? style.width ?? 0.7 : 0, borderDashArray: style.dash })
  }
}
