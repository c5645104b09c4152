import { and, desc, eq, max } from 'drizzle-orm'
import { limitSheetLifecycle } from '#shared/compute/lifecycle/limit-sheet'
import type { LimitSheetAction } from '#shared/compute/lifecycle/limit-sheet'
import type { LimitSheetContent } from '#shared/compute/terms/judgement'
import { designOrder } from '#shared/compute/motor/design-order'
import type { Transaction } from '../../database/client'
import { limitSheets, parts } from '../../database/schema/parts'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { confirmPassword, recheckSigner } from '../people/confirm-password'

type Sheet = typeof limitSheets.$inferSelect

/** What a part's first draft starts from: level II, AQL 2.5 and 4.0 are usual for purchased motors; common practice, no source. */
const FIRST_DRAFT: LimitSheetContent = {
  rippleDefinition: 'peakToPeakOverRated', highestOrder: null,
  limits: [{ key: 'cogging.peakToPeak', lower: null, upper: 5e-3, unit: 'N·m', class: 'major' }],
  decisionRule: { kind: 'simple' }, sampling: { kind: 'attributes', level: 'II', aql: { major: '2.5', minor: '4.0' } },
  requires: { bothDirections: true, temperature: false }, compensation: null,
}

/**
 * Starts a new draft of a part's limits from its newest sheet.
 *
 * @throws DomainError `conflict` when a draft or a submitted sheet exists already.
 */
export function draftSheet(context: Context, partNumber: string): { id: number } {
  return context.db.transaction((tx) => {
    const part = tx.select().from(parts).where(eq(parts.number, partNumber)).get()
    if (!part) throw new DomainError('not-found', `There is no part ${partNumber}.`)
    const sheets = tx.select().from(limitSheets).where(eq(limitSheets.partId, part.id)).orderBy(desc(limitSheets.version)).all()
    const open = sheets.find(sheet => sheet.state === 'draft' || sheet.state === 'submitted')
    if (open) throw new DomainError('conflict', `Version ${open.version} is ${open.state === 'draft' ? 'a draft' : 'submitted for approval'} already. Work on that one.`, { link: `/limits/${part.number}` })
    const from = sheets.find(sheet => sheet.state === 'approved') ?? sheets[0]
    const version = (tx.select({ version: max(limitSheets.version) }).from(limitSheets).where(eq(limitSheets.partId, part.id)).get()?.version ?? 0) + 1
    const sheet = tx.insert(limitSheets).values({ partId: part.id, version, state: 'draft', content: from?.content ?? FIRST_DRAFT, authorId: context.actor.personId, createdAt: now(context) }).returning().get()
    log(context, tx, sheet, 'sheet.drafted')
    return { id: sheet.id }
  }, { behavior: 'immediate' })
}

/** Saves a draft. Its author becomes the one who saved last. */
export function saveDraft(context: Context, id: number, input: { content: LimitSheetContent; reason: string }): void {
  context.db.transaction((tx) => {
    const sheet = getSheet(tx, id)
    step(sheet, 'edit')
    requirePossible(tx, sheet, input.content)
    tx.update(limitSheets).set({ content: input.content, reason: input.reason, authorId: context.actor.personId }).where(eq(limitSheets.id, id)).run()
    log(context, tx, sheet, 'sheet.saved')
  }, { behavior: 'immediate' })
}

/** Hands a draft in for approval by someone else. */
export function submitSheet(context: Context, id: number): void {
  context.db.transaction((tx) => {
    const sheet = getSheet(tx, id)
    const state = step(sheet, 'submit')
    requirePossible(tx, sheet, sheet.content)
    if (sheet.reason === '') throw new DomainError('invalid-input', 'Say what changed and why before you submit.', { fields: [{ field: 'reason', message: 'A reason is needed.' }] })
    tx.update(limitSheets).set({ state, submittedAt: now(context) }).where(eq(limitSheets.id, id)).run()
    log(context, tx, sheet, 'sheet.submitted')
  }, { behavior: 'immediate' })
}

/** Sends a submitted sheet back to its author, with a reason. */
export function sendSheetBack(context: Context, id: number, reason: string): void {
  context.db.transaction((tx) => {
    const sheet = getSheet(tx, id)
    const state = step(sheet, 'send-back')
    tx.update(limitSheets).set({ state, submittedAt: null, approvalReason: reason }).where(eq(limitSheets.id, id)).run()
    log(context, tx, sheet, 'sheet.sent-back')
  }, { behavior: 'immediate' })
}

/**
 * Approves a submitted sheet by signature, as another person than its author, effective from a day on. Approved sheets never change; earlier ones stay in force for
 * the lots that were received under them.
 */
export async function approveSheet(context: Context, id: number, input: { password: string; reason: string; effectiveFrom: string }): Promise<void> {
  const passwordVersion = await confirmPassword(context, input.password)
  context.db.transaction((tx) => {
    recheckSigner(context, tx, passwordVersion)
    const sheet = getSheet(tx, id)
    const state = step(sheet, 'approve')
    if (sheet.authorId === context.actor.personId) throw new DomainError('forbidden', 'You wrote this sheet. Another quality engineer has to approve it.')
    const today = now(context).slice(0, 10)
    if (input.effectiveFrom < today) throw new DomainError('invalid-input', 'A sheet cannot take effect in the past: lots received then were judged by the earlier one.', { fields: [{ field: 'effectiveFrom', message: 'Today at the earliest.' }] })
    const effectiveFrom = input.effectiveFrom === today ? now(context) : `${input.effectiveFrom}T00:00:00.000Z`
    tx.update(limitSheets).set({ state, approvedById: context.actor.personId, approvedAt: now(context), approvalReason: input.reason, effectiveFrom }).where(eq(limitSheets.id, id)).run()
    log(context, tx, sheet, 'sheet.approved', { effectiveFrom })
  }, { behavior: 'immediate' })
}

/** Takes an approved sheet out of use by signature; lots received under it keep it. */
export async function retireSheet(context: Context, id: number, input: { password: string; reason: string }): Promise<void> {
  const passwordVersion = await confirmPassword(context, input.password)
  context.db.transaction((tx) => {
    recheckSigner(context, tx, passwordVersion)
    const sheet = getSheet(tx, id)
    const state = step(sheet, 'retire')
    tx.update(limitSheets).set({ state, retiredAt: now(context) }).where(eq(limitSheets.id, id)).run()
    log(context, tx, sheet, 'sheet.retired')
  }, { behavior: 'immediate' })
}

function getSheet(tx: Transaction, id: number): Sheet {
  const sheet = tx.select().from(limitSheets).where(eq(limitSheets.id, id)).get()
  if (!sheet) throw new DomainError('not-found', 'There is no such limit sheet.')
  return sheet
}

const STATE_WORDS = { draft: 'a draft', submitted: 'submitted for approval', approved: 'approved', retired: 'retired' } as const

function step(sheet: Sheet, action: LimitSheetAction) {
  if (!limitSheetLifecycle.transitions.some(row => row.from === sheet.state && row.action === action)) {
    throw new DomainError('conflict', `Version ${sheet.version} is ${STATE_WORDS[sheet.state]}; this cannot be done with it. Reload the page.`)
  }
  return limitSheetLifecycle.transition(sheet.state, action)
}

/** A sheet that no measurement could be judged by is refused with the reason. */
function requirePossible(tx: Transaction, sheet: Sheet, content: LimitSheetContent): void {
  const part = tx.select().from(parts).where(and(eq(parts.id, sheet.partId))).get()!
  const fault = (index: number, message: string) => new DomainError('invalid-input', message, { fields: [{ field: `limits.${index}.key`, message }] })
  const highest = content.highestOrder ?? Math.max(64, 3 * designOrder(part.design))
  content.limits.forEach((limit, index) => {
    if (limit.key === 'rippleRatio' && part.ratedTorqueNm === null && content.rippleDefinition.endsWith('OverRated')) throw fault(index, 'The part has no rated torque, so a ripple ratio of rated torque cannot be judged. Enter it with the part first.')
    const order = Number(/^order\.(\d+)$/.exec(limit.key)?.[1] ?? 0)
    if (order > highest) throw fault(index, `Order ${order} is above the highest order analysed for this part, ${highest}. Raise the highest order or leave the limit out.`)
  })
}

function log(context: Context, tx: Transaction, sheet: Sheet, action: string, content: Record<string, unknown> = {}): void {
  appendToLogbook(context, tx, { actorId: context.actor.personId, action, subjectKind: 'sheet', subjectId: sheet.id, content: { partId: sheet.partId, version: sheet.version, ...content } })
}
