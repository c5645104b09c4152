import { and, desc, eq, inArray } from 'drizzle-orm'
import { explainFailures } from '#shared/compute/judging/explain'
import { partRemarks } from '#shared/compute/judging/notes'
import { designOrder } from '#shared/compute/motor/design-order'
import { evaluateSeries } from '#shared/compute/torque/evaluate'
import type { LotPage, SampleTile } from '#shared/contracts/lots'
import type { Reader } from '../../database/client'
import { decisions, lots, lotSerials } from '../../database/schema/lots'
import { measurements, uploads } from '../../database/schema/measurements'
import { papers } from '../../database/schema/papers'
import { limitSheets, parts } from '../../database/schema/parts'
import { people, suppliers } from '../../database/schema/people'
import { nonconformances } from '../../database/schema/returns'
import { rigs } from '../../database/schema/rigs'
import type { Context } from '../context'
import { answerOf } from '../measuring/upload-answer'
import { gatherEvidence } from './evidence'
import type { Evidence } from './evidence'
import { getLot } from './find-lot'

/** Points of a small ring; enough for four a period of order 264 at the size it is drawn. */
const RING_POINTS = 1024

/** Everything that the Lot page shows. */
export function getLotPage(context: Context, number: string): LotPage {
  const lot = getLot(context, number)
  const { db } = context
  const about = db.select({ supplier: suppliers, part: parts, sheet: limitSheets, receivedBy: people.name }).from(lots)
    .innerJoin(suppliers, eq(suppliers.id, lots.supplierId)).innerJoin(parts, eq(parts.id, lots.partId))
    .innerJoin(limitSheets, eq(limitSheets.id, lots.sheetId)).innerJoin(people, eq(people.id, lots.receivedById)).where(eq(lots.id, lot.id)).get()!
  const evidence = gatherEvidence(db, lot)
  return {
    number: lot.number, supplierLot: lot.supplierLot, supplier: about.supplier.name, supplierCode: about.supplier.code,
    part: { number: about.part.number, name: about.part.name, revision: about.part.revision, design: about.part.design, designOrder: designOrder(about.part.design), ratedTorqueNm: about.part.ratedTorqueNm },
    quantity: lot.quantity, orderNumber: lot.orderNumber, remarks: context.actor.role === 'supplier' ? '' : lot.remarks, state: lot.state, receivedAt: lot.receivedAt,
    receivedBy: about.receivedBy, sheetVersion: about.sheet.version, severityReason: lot.severityReason, plan: lot.plan, drawSeed: lot.drawSeed, drawGenerator: lot.drawGenerator,
    serialsListed: db.select({ position: lotSerials.position }).from(lotSerials).where(eq(lotSerials.lotId, lot.id)).limit(1).get() !== undefined,
    resubmissionOf: lot.resubmissionOfId === null ? null : db.select({ number: lots.number }).from(lots).where(eq(lots.id, lot.resubmissionOfId)).get()?.number ?? null,
    limitPeakToPeakNm: about.sheet.content.limits.find(limit => limit.key === 'cogging.peakToPeak')?.upper ?? null,
    samples: tilesOf(db, lot.id, evidence),
    lotVerdict: evidence.lotVerdict,
    explanation: explainFailures(evidence.counted.flatMap(({ sample, measurement }) => measurement ? [{ serial: sample.serial ?? `position ${sample.position}`, verdict: measurement.judgement, orders: measurement.result.orders }] : [])),
    files: context.actor.role === 'supplier' ? [] : waitingFiles(db, lot.id),
    evidenceHash: evidence.hash,
    ...outcomeOf(db, lot.id),
  }
}

function tilesOf(db: Pick<Reader, 'select'>, lotId: number, evidence: Evidence): SampleTile[] {
  const attempts = new Map<number, number>()
  for (const row of db.select({ sampleId: measurements.sampleId }).from(measurements).where(eq(measurements.lotId, lotId)).all()) attempts.set(row.sampleId, (attempts.get(row.sampleId) ?? 0) + 1)
  const incomplete = new Set(db.select({ sampleId: uploads.sampleId }).from(uploads).where(and(eq(uploads.lotId, lotId), eq(uploads.state, 'incomplete'))).all().map(row => row.sampleId))
  return evidence.counted.map(({ sample, measurement }) => ({
    drawOrder: sample.drawOrder, position: sample.position, serial: sample.serial,
    state: measurement ? 'judged' : sample.serial === null ? 'to-bind' : incomplete.has(sample.id) ? 'incomplete' : 'to-measure',
    verdict: measurement?.verdict ?? null,
    peakToPeakNm: measurement?.result.characteristics.find(row => row.key === 'cogging.peakToPeak')?.value ?? null,
    ring: measurement ? Array.from(evaluateSeries(measurement.result.cogging, RING_POINTS), value => Number(value.toPrecision(4))) : null,
    nonconformingClasses: measurement?.judgement.nonconformingClasses ?? [],
    attempts: attempts.get(sample.id) ?? 0,
    warnings: partRemarks(measurement?.result.warnings ?? []).doubts.length,
  }))
}

/** Files that someone has to look at. One that was refused and judged later, as once its unit was named, waits no more. */
function waitingFiles(db: Pick<Reader, 'select'>, lotId: number): LotPage['files'] {
  const judged = new Set(db.select({ sha256: uploads.sha256 }).from(uploads).where(and(eq(uploads.lotId, lotId), eq(uploads.state, 'judged'))).all().map(row => row.sha256))
  return db.select({ upload: uploads, rig: rigs.code }).from(uploads).innerJoin(rigs, eq(rigs.id, uploads.rigId))
    .where(and(eq(uploads.lotId, lotId), inArray(uploads.state, ['tray', 'refused', 'incomplete']))).orderBy(desc(uploads.id)).limit(500).all()
    .filter(({ upload }) => upload.state !== 'refused' || !judged.has(upload.sha256))
    .map(({ upload, rig }) => ({ ...answerOf(db, upload), uploadedAt: upload.uploadedAt, rig }))
}

function outcomeOf(db: Pick<Reader, 'select'>, lotId: number): Pick<LotPage, 'decision' | 'paper' | 'nonconformance'> {
  const decision = db.select({ row: decisions, signedBy: people.name }).from(decisions).innerJoin(people, eq(people.id, decisions.signedById)).where(eq(decisions.lotId, lotId)).get()
  const paper = db.select().from(papers).where(eq(papers.lotId, lotId)).orderBy(desc(papers.id)).limit(1).get()
  const nonconformance = db.select({ number: nonconformances.number, state: nonconformances.state }).from(nonconformances).where(eq(nonconformances.lotId, lotId)).get()
  return {
    decision: decision ? { outcome: decision.row.outcome, overruled: decision.row.overruled, reason: decision.row.reason, signedBy: decision.signedBy, signedAt: decision.row.signedAt } : null,
    paper: paper ? { number: paper.number, state: paper.state, checkLink: `/check/${paper.token}`, pdfReady: paper.pdfSha256 !== null } : null,
    nonconformance: nonconformance ?? null,
  }
}
