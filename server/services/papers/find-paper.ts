import { and, asc, desc, eq, like, or, sql } from 'drizzle-orm'
import type { z } from 'zod'
import type { CheckAnswer, PaperListAnswer, PaperPage, paperListSchema } from '#shared/contracts/papers'
import { lots } from '../../database/schema/lots'
import { logbook } from '../../database/schema/logbook'
import { measurementFiles, measurements } from '../../database/schema/measurements'
import { papers, signingKeys } from '../../database/schema/papers'
import { parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import { parseRecord } from '../../papers/record'
import type { Context, Services } from '../context'
import { DomainError } from '../domain-error'

type Paper = typeof papers.$inferSelect
const PAGE_SIZE = 25

/** The paper behind an unguessable token. */
export function getPaperByToken(services: Pick<Services, 'db'>, token: string): Paper {
  const paper = services.db.select().from(papers).where(eq(papers.token, token)).get()
  if (!paper) throw new DomainError('not-found', 'No certificate has this address. Scan the code again, or ask the company that handed you the paper.')
  return paper
}

/** A paper by number; a supplier's contact finds its own company's only. */
export function getPaperByNumber(context: Context, number: string): Paper {
  const own = context.actor.role === 'supplier' ? eq(lots.supplierId, context.actor.supplierId ?? -1) : undefined
  const found = context.db.select({ paper: papers }).from(papers).innerJoin(lots, eq(lots.id, papers.lotId)).where(and(eq(papers.number, number), own)).get()
  if (!found) throw new DomainError('not-found', `There is no paper ${number}.`)
  return found.paper
}

/** What a check of the paper needs: record, signature, key, and digests of its logbook entries. */
export function describePaper(services: Pick<Services, 'db'>, paper: Paper): CheckAnswer {
  const { db } = services
  return {
    state: paper.state, endedAt: paper.endedAt, endedReason: paper.endedReason, record: parseRecord(paper.record), recordText: paper.record, recordSha256: paper.recordSha256, signature: paper.signature,
    keyId: paper.keyId, publicKeyPem: db.select().from(signingKeys).where(eq(signingKeys.id, paper.keyId)).get()!.publicKeyPem, pdfSha256: paper.pdfSha256,
    logbook: db.select({ sequence: logbook.sequence, at: logbook.at, action: logbook.action, contentHash: logbook.contentHash, previousHash: logbook.previousHash, entryHash: logbook.entryHash })
      .from(logbook).where(and(eq(logbook.subjectKind, 'paper'), eq(logbook.subjectId, paper.number))).orderBy(asc(logbook.sequence)).all(),
  }
}

export function getPaperPage(context: Context, number: string): PaperPage {
  const paper = getPaperByNumber(context, number)
  return { ...describePaper(context, paper), checkLink: `/check/${paper.token}`, pdfReady: paper.pdfSha256 !== null }
}

/** A raw file that this very paper rests on. */
export async function getPaperFile(services: Services, paper: Paper, sha256: string): Promise<{ name: string; bytes: Uint8Array }> {
  const used = services.db.select({ name: measurementFiles.name }).from(measurementFiles).innerJoin(measurements, eq(measurements.id, measurementFiles.measurementId))
    .where(and(eq(measurements.lotId, paper.lotId), eq(measurementFiles.sha256, sha256))).get()
  const stated = used && parseRecord(paper.record).samples.some(sample => sample.files.some(file => file.sha256 === sha256))
  if (!stated) throw new DomainError('not-found', 'This certificate does not rest on such a file.')
  return { name: used.name, bytes: await services.files.get(sha256) }
}

/** One page of all papers. */
export function listPapers(context: Context, query: z.output<typeof paperListSchema>): PaperListAnswer {
  const { db } = context
  const pattern = `%${query.text.replaceAll(/[%_]/g, '')}%`
  const where = and(
    query.kind ? eq(papers.kind, query.kind) : undefined,
    query.state ? eq(papers.state, query.state) : undefined,
    query.text ? or(like(papers.number, pattern), like(lots.supplierLot, pattern), like(lots.number, pattern), like(suppliers.name, pattern), like(parts.number, pattern)) : undefined,
  )
  const column = { number: papers.number, supplier: suppliers.name, supplierLot: lots.supplierLot, kind: papers.kind, state: papers.state, issuedAt: papers.issuedAt }[query.sort]
  const rows = db.select({ paper: papers, lotNumber: lots.number, supplierLot: lots.supplierLot, supplier: suppliers.name, partNumber: parts.number }).from(papers)
    .innerJoin(lots, eq(lots.id, papers.lotId)).innerJoin(suppliers, eq(suppliers.id, lots.supplierId)).innerJoin(parts, eq(parts.id, lots.partId))
    .where(where).orderBy(query.order === 'falling' ? desc(column) : asc(column), desc(papers.id)).limit(PAGE_SIZE).offset((query.page - 1) * PAGE_SIZE).all()
  const total = db.select({ n: sql<number>`count(*)` }).from(papers).innerJoin(lots, eq(lots.id, papers.lotId)).innerJoin(suppliers, eq(suppliers.id, lots.supplierId)).innerJoin(parts, eq(parts.id, lots.partId)).where(where).get()!.n
  return {
    total, pageSize: PAGE_SIZE,
    rows: rows.map(({ paper, ...about }) => ({ ...about, number: paper.number, kind: paper.kind, state: paper.state, issuedAt: paper.issuedAt, pdfReady: paper.pdfSha256 !== null, checkLink: `/check/${paper.token}` })),
  }
}
