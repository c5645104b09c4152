import { execFileSync, spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import jsQR from 'jsqr'
import { PNG } from 'pngjs'
import { describe, expect, it, onTestFinished } from 'vitest'
import { papers } from '../../server/database/schema/papers'
import { seedDemo } from '../../server/database/seed/seed-demo'
import { drawCertificate } from '../../server/papers/pdf/draw-certificate'
import { canonicalRecord, parseRecord } from '../../server/papers/record'
import { drawPaper, drawPapers } from '../../server/services/papers/draw-papers'
import { FONTS } from './support/fonts'
import { openTestServices } from './support/services'
import type { PaperRecord } from '#shared/contracts/paper-record'

const poppler = spawnSync('pdftoppm', ['-v']).error === undefined
if (!poppler) console.warn('pdftoppm is not installed: tests of papers as pixels are skipped.')

let text = ''
let record: PaperRecord
let seal: { recordSha256: string; signature: string; keyId: string }

async function issued() {
  const { services } = openTestServices()
  await seedDemo(services, 'small')
  const paper = services.db.select().from(papers).all().find(row => row.kind === 'rejection')!
  text = paper.record
  record = parseRecord(text)
  seal = { recordSha256: paper.recordSha256, signature: paper.signature, keyId: paper.keyId }
  return { services, paper }
}

const draw = (of: PaperRecord, rawFiles: { name: string; sha256: string; bytes: Uint8Array }[] | null = []) => drawCertificate({ record: of, recordText: text, ...seal, fonts: FONTS, rawFiles })

function folder(): string {
  const path = mkdtempSync(join(tmpdir(), 'evenlot-paper-'))
  onTestFinished(() => rmSync(path, { recursive: true, force: true }))
  return path
}

describe('a certificate', () => {
  it('is drawn once from its record, the same bytes every time, and stored', async () => {
    const { services, paper } = await issued()
    const sha256 = await drawPaper(services, FONTS, paper.id)
    const stored = await services.files.get(sha256)
    expect(await drawPaper(services, FONTS, paper.id)).toBe(sha256)
    await drawPapers(services, FONTS)
    expect(Buffer.from(await services.files.get(sha256)).equals(Buffer.from(stored))).toBe(true)
    expect(Buffer.from(await draw(record)).equals(Buffer.from(await draw(record)))).toBe(true)
    expect(canonicalRecord(record).text).toBe(text)
  }, 60_000)

  it.skipIf(!poppler)('shows a code that an independent decoder reads, every serial, and page numbers', async () => {
    await issued()
    const at = folder()
    writeFileSync(join(at, 'paper.pdf'), await draw(record))
    execFileSync('pdftoppm', ['-r', '150', '-png', join(at, 'paper.pdf'), join(at, 'page')])
    const words = execFileSync('pdftotext', ['-layout', join(at, 'paper.pdf'), '-'], { encoding: 'utf8' })
    const pages = Number(/of (\d+)/.exec(words.slice(words.indexOf('page 1 of')))![1])
    const codes = Array.from({ length: pages }, (_, index) => {
      const image = PNG.sync.read(readFileSync(join(at, `page-${index + 1}.png`)))
      return jsQR(new Uint8ClampedArray(image.data), image.width, image.height)?.data
    }).filter(Boolean)
    expect(codes).toEqual([record.checkAddress])
    for (const sample of record.samples) expect(words).toContain(sample.serial!)
    expect(words).toContain('Certificate of rejection')
    expect(words).toContain(`page ${pages} of ${pages}`)
  }, 60_000)

  it.skipIf(!poppler)('carries its record byte for byte, and the raw files', async () => {
    await issued()
    const at = folder()
    const raw = { name: 'map.csv', sha256: '0'.repeat(64), bytes: new TextEncoder().encode('angle_deg,torque_mN.m\n') }
    writeFileSync(join(at, 'paper.pdf'), await draw(record, [raw]))
    execFileSync('pdfdetach', ['-saveall', '-o', at, join(at, 'paper.pdf')])
    expect(readFileSync(join(at, 'record.json'), 'utf8')).toBe(text)
    expect(readFileSync(join(at, 'map.csv'), 'utf8')).toBe('angle_deg,torque_mN.m\n')
  }, 60_000)

  it.skipIf(!poppler).each([1, 200])('has repeated heads and its page numbers with %i samples', async (count) => {
    await issued()
    const at = folder()
    const samples = Array.from({ length: count }, (_, index) => ({ ...record.samples[index % record.samples.length]!, drawOrder: index + 1, serial: `99-${1000 + index}` }))
    writeFileSync(join(at, 'paper.pdf'), await draw({ ...record, samples }))
    const words = execFileSync('pdftotext', ['-layout', join(at, 'paper.pdf'), '-'], { encoding: 'utf8' })
    const pages = words.split('\f').filter(page => page.trim() !== '')
    pages.forEach((page, index) => expect(page).toContain(`page ${index + 1} of ${pages.length}`))
    for (const page of pages.filter(each => (each.match(/99-\d{4} +\S+ ±/g) ?? []).length > 0)) expect(page).toContain('Serial')
    expect(words).toContain(`99-${1000 + count - 1}`)
  }, 120_000)
})
