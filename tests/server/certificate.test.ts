import { execFileSync, spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import jsQR from 'jsqr'
import { PDFDocument } from 'pdf-lib'
import { PNG } from 'pngjs'
import { describe, expect, it, onTestFinished } from 'vitest'
import { papers } from '../../server/database/schema/papers'
import { seedDemo } from '../../server/database/seed/seed-demo'
import type { RawFile } from '../../server/papers/pdf/attachments'
import { drawCertificate } from '../../server/papers/pdf/draw-certificate'
import { canonicalRecord, parseRecord } from '../../server/papers/record'
import { drawPaper, drawPapers } from '../../server/services/papers/draw-papers'
import { FONTS } from './support/fonts'
import { buildRecord } from './support/record'
import type { RecordOptions } from './support/record'
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
})

/** Draws a built record; the seal is of the right shape, its truth is tested elsewhere. */
async function drawBuilt(options: RecordOptions, rawFiles: RawFile[] | null = []) {
  const built = buildRecord(options)
  const { text: recordText, sha256: recordSha256 } = canonicalRecord(built)
  const input = { record: built, recordText, recordSha256, signature: Buffer.alloc(64, 7).toString('base64'), keyId: '0123456789abcdef', fonts: FONTS, rawFiles }
  return { record: built, recordText, bytes: await drawCertificate(input), again: () => drawCertificate(input) }
}

/** The words of each page. */
function pagesOf(bytes: Uint8Array): string[] {
  const path = join(folder(), 'paper.pdf')
  writeFileSync(path, bytes)
  return execFileSync('pdftotext', ['-layout', path, '-'], { encoding: 'utf8' }).split('\f').filter(page => page.trim() !== '')
}

describe('a certificate of any size', () => {
  const sizes = [
    { samples: 1, failing: 0, outcome: 'acceptance' }, { samples: 5, failing: 1, outcome: 'rejection' }, { samples: 32, failing: 0, outcome: 'acceptance' }, { samples: 200, failing: 9, outcome: 'rejection' },
  ]
  it.each(sizes)('opens and is the same on a second drawing with $samples samples ($outcome)', async (size) => {
    const { bytes, again, record: built } = await drawBuilt(size)
    const document = await PDFDocument.load(bytes, { updateMetadata: false })
    expect(built.kind).toBe(size.outcome)
    expect(document.getTitle()).toBe(`Certificate of ${size.outcome} P-2026-000318`)
    expect([document.getAuthor(), document.getProducer(), document.getCreationDate()?.toISOString()]).toEqual(['Kestrel Fold Robotics', 'Evenlot', '2026-11-17T13:05:21.000Z'])
    expect(Buffer.from(await again()).equals(Buffer.from(bytes))).toBe(true)
  }, 120_000)

  it.skipIf(!poppler).each(sizes)('names every serial under a repeated head, and the page on each page, with $samples samples ($outcome)', async (size) => {
    const { bytes, record: built } = await drawBuilt(size)
    const pages = pagesOf(bytes)
    expect((await PDFDocument.load(bytes)).getPageCount()).toBe(pages.length)
    pages.forEach((page, index) => expect(page).toContain(`page ${index + 1} of ${pages.length}`))
    for (const sample of built.samples) expect(pages.join('')).toContain(sample.serial!)
    const withRows = pages.filter(page => /71-\d{4} +\d\S* ±/.test(page))
    expect(withRows.length).toBeGreaterThan(0)
    for (const page of withRows) expect(page).toMatch(/No\. +Serial .*Verdict/)
  }, 120_000)
})

describe('what a certificate says', () => {
  it.skipIf(!poppler)('states every limited characteristic, limits, rule, rig, people, seed and address', async () => {
    const { bytes, recordText } = await drawBuilt({ samples: 5, failing: 1 })
    const words = pagesOf(bytes).join('').replaceAll(/\s+/g, ' ')
    for (const each of ['EN 10204 type 3.1', 'at most 5.40 mN·m', 'from 0.50 to 2.50 mN·m', 'at least 80.0 %', '91.2 ± 0.8', 'Simple acceptance', 'CAL-26-0417', 'Harrow Torque Laboratory', 'due 11 May 2027', 'torque sensor, slow sweep',
      'approved by Emil Brandt', '17 Nov 2026, 14:05 (Europe/Berlin)', '9f3a6c0e51d2b874', 'a weak or misplaced magnet', 'https://evenlot.kestrelfold.example/check/6f1d0b8a93e24c57a1b06d3f8e92c410', createHash('sha256').update(recordText).digest('hex')]) expect(words).toContain(each)
  }, 60_000)

  it.skipIf(!poppler)('says "not stated" for what is missing, and shows a value in the unit of its column', async () => {
    const { bytes } = await drawBuilt({ samples: 5, failing: 0, change: built => ({
      ...built, part: { ...built.part, ratedTorqueNm: null, revision: '' }, lot: { ...built.lot, orderNumber: '' },
      samples: built.samples.map(sample => sample.drawOrder === 2 ? { ...sample, serial: null, characteristics: sample.characteristics.map(row => row.key === 'order.12' ? { ...row, value: 1.234e-3, expandedUncertainty: 0.01e-3 } : row) } : sample),
    }) })
    const words = pagesOf(bytes).join('')
    expect(words).toMatch(/revision not stated/)
    expect(words).toMatch(/Rated torque +not stated/)
    expect(words).toMatch(/Order +not stated/)
    // The column's head says μN·m, because the limit is 600 μN·m.
    expect(words).toMatch(/position 13 .* 1234 ± 10 /)
  }, 60_000)

  it.skipIf(!poppler)('sets signs that its faces lack in the fallback face, and says so when no face has them', async () => {
    const named = (name: string) => drawBuilt({ samples: 1, failing: 0, change: built => ({ ...built, supplier: { ...built.supplier, name } }) })
    const greek = pagesOf((await named('Σύρος θ')).bytes).join('')
    expect(greek).toContain('Σύρος θ')
    expect(greek).not.toContain('typefaces lack')
    const other = pagesOf((await named('东风 Motors')).bytes).join('')
    expect(other).toContain('□□ Motors')
    expect(other).toContain('typefaces lack')
  }, 60_000)
})

describe('attachments of a certificate', () => {
  const raw = (name: string, digit: string): RawFile => ({ name, sha256: digit.repeat(64), bytes: new TextEncoder().encode(`angle,torque\n${digit},0\n`) })

  it.skipIf(!poppler)('are all kept when files have the same name, or that of the record', async () => {
    const at = folder()
    const { bytes, recordText } = await drawBuilt({ samples: 1, failing: 0 }, [raw('map.csv', 'b'), raw('map.csv', 'a'), raw('record.json', 'c')])
    writeFileSync(join(at, 'paper.pdf'), bytes)
    execFileSync('pdfdetach', ['-saveall', '-o', at, join(at, 'paper.pdf')])
    expect(readdirSync(at).sort()).toEqual(['map-aaaaaaaaaaaa.csv', 'map-bbbbbbbbbbbb.csv', 'paper.pdf', 'record-cccccccccccc.json', 'record.json'])
    expect(readFileSync(join(at, 'record.json'), 'utf8')).toBe(recordText)
    expect(readFileSync(join(at, 'map-aaaaaaaaaaaa.csv'), 'utf8')).toBe('angle,torque\na,0\n')
  }, 60_000)

  it.skipIf(!poppler)('are named by hash only when they are too large together', async () => {
    const { bytes } = await drawBuilt({ samples: 1, failing: 0 }, null)
    expect(pagesOf(bytes).join('').replaceAll(/\s+/g, ' ')).toContain('names every raw file by its SHA-256')
  }, 60_000)
})
