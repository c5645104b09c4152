import { and, asc, eq, gte, inArray, isNull, or } from 'drizzle-orm'
import { rawFiles } from '../../database/schema/measurements'
import { papers } from '../../database/schema/papers'
import { notices } from '../../database/schema/returns'
import { drawCertificate } from '../../papers/pdf/draw-certificate'
import type { PaperFonts } from '../../papers/pdf/fonts'
import { parseRecord } from '../../papers/record'
import { now } from '../context'
import type { Services } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'

/** Raw files are attached while they stay under this in total, bytes. */
const LARGEST_ATTACHMENTS = 15 * 1024 * 1024
/** Older papers that nothing waits for are drawn when someone asks. */
const DRAWN_UNASKED_MS = 24 * 3_600_000

/**
 * Draws the PDFs of papers that a mail waits for or that are new, the oldest first. Can be run at any time and any number of times: a PDF is drawn from the record alone and
 * stored once. A paper that cannot be drawn is logged and does not stop the others.
 */
export async function drawPapers(services: Services, fonts: PaperFonts): Promise<void> {
  const since = new Date(services.clock().getTime() - DRAWN_UNASKED_MS).toISOString()
  const awaited = services.db.select({ id: notices.paperId }).from(notices).where(eq(notices.state, 'queued'))
  const open = services.db.select({ id: papers.id, number: papers.number }).from(papers)
    .where(and(isNull(papers.pdfSha256), or(gte(papers.issuedAt, since), inArray(papers.id, awaited)))).orderBy(asc(papers.id)).all()
  for (const paper of open) {
    try {
      await drawPaper(services, fonts, paper.id)
    }
    catch (error) {
      console.error(`Paper ${paper.number} could not be drawn and is tried again later.`, error)
    }
  }
  services.wake('outbox')
}

/**
 * Draws one paper, unless it is drawn already.
 *
 * @returns SHA-256 of the stored PDF.
 */
export async function drawPaper(services: Services, fonts: PaperFonts, paperId: number): Promise<string> {
  const paper = services.db.select().from(papers).where(eq(papers.id, paperId)).get()
  if (!paper) throw new DomainError('not-found', 'There is no such paper.')
  if (paper.pdfSha256) return paper.pdfSha256
  const record = parseRecord(paper.record)
  const bytes = await drawCertificate({ record, recordText: paper.record, recordSha256: paper.recordSha256, signature: paper.signature, keyId: paper.keyId, fonts, rawFiles: await attachments(services, record) })
  const sha256 = await services.files.put(bytes)
  services.db.transaction((tx) => {
    tx.insert(rawFiles).values({ sha256, size: bytes.length, storedAt: now(services) }).onConflictDoNothing().run()
    const stored = tx.update(papers).set({ pdfSha256: sha256, pdfDrawnAt: now(services) }).where(and(eq(papers.id, paperId), isNull(papers.pdfSha256))).run()
    if (stored.changes > 0) appendToLogbook(services, tx, { actorId: null, action: 'paper.drawn', subjectKind: 'paper', subjectId: paper.number, content: { pdfSha256: sha256 } })
  }, { behavior: 'immediate' })
  return services.db.select({ sha256: papers.pdfSha256 }).from(papers).where(eq(papers.id, paperId)).get()!.sha256!
}

async function attachments(services: Services, record: ReturnType<typeof parseRecord>) {
  const files = new Map(record.samples.flatMap(sample => sample.files.map(file => [file.sha256, file] as const)))
  const total = [...files.values()].reduce((sum, file) => sum + file.size, 0)
  if (total > LARGEST_ATTACHMENTS) return null
  return Promise.all([...files.values()].map(async file => ({ name: file.name, sha256: file.sha256, bytes: await services.files.get(file.sha256) })))
}
