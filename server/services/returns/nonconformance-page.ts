import { asc, desc, eq } from 'drizzle-orm'
import { lotLifecycle } from '#shared/compute/lifecycle/lot'
import type { LotState } from '#shared/compute/lifecycle/lot'
import { nonconformanceLifecycle } from '#shared/compute/lifecycle/nonconformance'
import { designOrder } from '#shared/compute/motor/design-order'
import type { EntryKind, NonconformanceEntry, NonconformancePage, NoticeView, ReturnsAction } from '#shared/contracts/returns'
import { decisions, lots } from '../../database/schema/lots'
import { papers } from '../../database/schema/papers'
import { limitSheets, parts } from '../../database/schema/parts'
import { people, suppliers } from '../../database/schema/people'
import { nonconformanceEntries, notices } from '../../database/schema/returns'
import type { Actor, Context } from '../context'
import { countedMeasurements } from '../lots/counted-measurements'
import { plantDay } from './answer-due'
import { failingMotors, likelyOrigins } from './failing-motors'
import { getNonconformance } from './find-nonconformance'
import type { Nonconformance } from './find-nonconformance'
import { isOverdue } from './list-nonconformances'

/** Everything that the page of a nonconformance shows, and what the person who looks may do. */
export function getNonconformancePage(context: Context, number: string): NonconformancePage {
  const found = getNonconformance(context, number)
  const { lot, part, sheet, supplier, decision } = context.db.select({ lot: lots, part: parts, sheet: limitSheets, supplier: suppliers.name, decision: decisions }).from(lots)
    .innerJoin(parts, eq(parts.id, lots.partId)).innerJoin(limitSheets, eq(limitSheets.id, lots.sheetId)).innerJoin(suppliers, eq(suppliers.id, lots.supplierId))
    .innerJoin(decisions, eq(decisions.lotId, lots.id)).where(eq(lots.id, found.lotId)).get()!
  const counted = countedMeasurements(context.db, lot.id)
  const { state, openedAt, answerDueOn, acknowledgedAt, closedAt } = found
  return {
    number, state, openedAt, answerDueOn, acknowledgedAt, closedAt, supplier,
    overdue: isOverdue(found, plantDay(context.clock(), context.settings.plantTimeZone)),
    acknowledgedBy: nameOf(context, found.acknowledgedById),
    lot: {
      number: lot.number, supplierLot: lot.supplierLot, quantity: lot.quantity, sampleSize: lot.plan.n, judged: decision.lotVerdict.judged, orderNumber: lot.orderNumber,
      state: lot.state, receivedAt: lot.receivedAt, verdictSentence: decision.lotVerdict.sentence,
    },
    part: { number: part.number, name: part.name, designOrder: designOrder(part.design) },
    sheetVersion: sheet.version, limitPeakToPeakNm: sheet.content.limits.find(limit => limit.key === 'cogging.peakToPeak')?.upper ?? null,
    decisionReason: decision.overruled ? decision.reason : '',
    failing: failingMotors(context.db, counted), explanation: likelyOrigins(counted),
    paper: paperOf(context, lot.id), disposition: dispositionOf(context, found),
    entries: entriesOf(context, found.id), notices: noticesOf(context, found),
    allowed: allowedActions(found, lot.state, context.actor.role),
  }
}

function nameOf({ db }: Context, personId: number | null): string | null {
  return personId === null ? null : db.select({ name: people.name }).from(people).where(eq(people.id, personId)).get()?.name ?? null
}

function paperOf({ db }: Context, lotId: number): NonconformancePage['paper'] {
  const paper = db.select().from(papers).where(eq(papers.lotId, lotId)).orderBy(desc(papers.id)).limit(1).get()
  return paper ? { number: paper.number, checkLink: `/check/${paper.token}`, pdfReady: paper.pdfSha256 !== null } : null
}

function dispositionOf(context: Context, found: Nonconformance): NonconformancePage['disposition'] {
  if (!found.disposition) return null
  return { kind: found.disposition, reason: found.dispositionReason ?? '', by: nameOf(context, found.dispositionById) ?? '', at: found.dispositionAt ?? found.openedAt }
}

function entriesOf({ db }: Context, nonconformanceId: number): NonconformanceEntry[] {
  return db.select({ row: nonconformanceEntries, by: people.name, role: people.role }).from(nonconformanceEntries).leftJoin(people, eq(people.id, nonconformanceEntries.byId))
    .where(eq(nonconformanceEntries.nonconformanceId, nonconformanceId)).orderBy(asc(nonconformanceEntries.id)).all()
    .map(({ row, by, role }) => ({ id: row.id, kind: row.kind as EntryKind, text: row.text, by, side: role === 'supplier' ? 'supplier' : 'plant', at: row.at }))
}

/** A supplier's contact sees the mails to its own company. */
function noticesOf({ db, actor }: Context, found: Nonconformance): NoticeView[] {
  return db.select({ row: notices, supplierId: people.supplierId, pdf: papers.pdfSha256 }).from(notices).leftJoin(people, eq(people.id, notices.recipientId)).leftJoin(papers, eq(papers.id, notices.paperId))
    .where(eq(notices.nonconformanceId, found.id)).orderBy(asc(notices.id)).all()
    .filter(({ supplierId }) => actor.role !== 'supplier' || supplierId === actor.supplierId)
    .map(({ row, pdf }) => ({
      id: row.id, kind: row.kind, subject: row.subject, recipientAddress: row.recipientAddress, state: row.state, attempts: row.attempts, nextAttemptAt: row.nextAttemptAt,
      lastError: actor.role === 'supplier' ? null : row.lastError, sentAt: row.sentAt, createdAt: row.createdAt, waitsForPaper: row.state === 'queued' && row.paperId !== null && pdf === null,
    }))
}

/** Read from the tables of the life cycles, so that buttons and services cannot differ. */
function allowedActions(found: Nonconformance, lotState: LotState, role: Actor['role']): ReturnsAction[] {
  const actions = nonconformanceLifecycle.allowedActions(found.state, role)
  // Whoever reads the page before the mail went out is notified thereby.
  const mayAcknowledge = actions.includes('acknowledge') || (found.state === 'open' && role === 'supplier')
  const may: Record<ReturnsAction, boolean> = {
    acknowledge: mayAcknowledge,
    answer: actions.includes('answer'),
    review: actions.includes('accept-answer') || actions.includes('send-back'),
    disposition: lotLifecycle.allowedActions(lotState, role).includes('disposition'),
    message: found.state !== 'closed' && (role === 'supplier' || role === 'engineer'),
    resend: role === 'engineer',
    close: actions.includes('close') && lotState === 'dispositioned',
  }
  return (Object.keys(may) as ReturnsAction[]).filter(action => may[action])
}
