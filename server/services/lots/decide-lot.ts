import { eq } from 'drizzle-orm'
import { lotLifecycle } from '#shared/compute/lifecycle/lot'
import { decisionSchema } from '#shared/contracts/lots'
import type { Decision, DecisionAnswer } from '#shared/contracts/lots'
import type { Transaction } from '../../database/client'
import { decisions, lots } from '../../database/schema/lots'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { issuePaper } from '../papers/issue-paper'
import { confirmPassword, recheckSigner } from '../people/confirm-password'
import { openNonconformance } from '../returns/open-nonconformance'
import { gatherEvidence } from './evidence'
import type { Evidence } from './evidence'
import { getLot } from './find-lot'

/**
 * Signs the decision of a lot. The outcome is computed from the plan; the person signs it with the password. One transaction writes the decision, the paper
 * with its number and record, for a rejection the nonconformance and its mail, and the logbook entries.
 *
 * A person may reject against a computed acceptance, with a reason; never accept against a computed rejection. A lot may be rejected before all
 * motors are measured, once the rejection number is reached.
 *
 * @throws DomainError `wrong-password`; `evidence-changed` when figures came in since the page was shown; `conflict` when decided already or not decidable
 *   that way.
 */
export async function decideLot(context: Context, number: string, input: Decision): Promise<DecisionAnswer> {
  const decision = decisionSchema.parse(input)
  const passwordVersion = await confirmPassword(context, decision.password)
  const paper = context.db.transaction((tx) => {
    recheckSigner(context, tx, passwordVersion)
    const lot = getLot({ db: tx, actor: context.actor }, number)
    const evidence = gatherEvidence(tx, lot)
    const overruled = checkDecidable(lot, evidence, decision)
    const written = writeDecision(context, tx, lot, evidence, decision, overruled)
    const paper = issuePaper(context, tx, { actorId: context.actor.personId, lotId: lot.id, decisionId: written.id, kind: decision.outcome === 'accepted' ? 'acceptance' : 'rejection' })
    if (decision.outcome === 'rejected') openNonconformance(context, tx, { actorId: context.actor.personId, lotId: lot.id, paperId: paper.id })
    return paper
  }, { behavior: 'immediate' })
  context.wake('papers')
  return { outcome: decision.outcome, paperNumber: paper.number, checkLink: `/check/${paper.token}` }
}

/** @returns whether the person overrules a computed acceptance. */
function checkDecidable(lot: typeof lots.$inferSelect, evidence: Evidence, decision: { outcome: 'accepted' | 'rejected'; evidenceHash: string; reason: string }): boolean {
  if (lot.decidedAt) throw new DomainError('conflict', `Lot ${lot.supplierLot} is decided already. Nothing was signed.`, { link: `/lots/${lot.number}` })
  if (evidence.hash !== decision.evidenceHash) throw new DomainError('evidence-changed', 'Figures changed since this page was shown. Nothing was signed; look at the lot again, then sign.')
  const computed = evidence.lotVerdict.outcome
  if (decision.outcome === 'accepted') {
    if (computed === 'reject') throw new DomainError('conflict', 'The plan rejects this lot; it cannot be accepted by signature. A concession by a quality engineer is the way, after the rejection.')
    if (computed === 'open') throw new DomainError('conflict', `The lot cannot be accepted yet. ${evidence.lotVerdict.sentence}`)
    return false
  }
  if (computed === 'reject') return false
  if (computed === 'open') throw new DomainError('conflict', `The lot cannot be rejected yet. ${evidence.lotVerdict.sentence}`)
  if (decision.reason === '') throw new DomainError('conflict', 'The plan accepts this lot. Give the reason for rejecting it all the same.', { fields: [{ field: 'reason', message: 'A reason is needed.' }] })
  return true
}

function writeDecision(context: Context, tx: Transaction, lot: typeof lots.$inferSelect, evidence: Evidence, decision: { outcome: 'accepted' | 'rejected'; reason: string }, overruled: boolean) {
  const at = now(context)
  const written = tx.insert(decisions).values({
    lotId: lot.id, outcome: decision.outcome, overruled, reason: decision.reason, lotVerdict: evidence.lotVerdict, evidenceHash: evidence.hash,
    signedById: context.actor.personId, signedAt: at,
  }).returning().get()
  tx.update(lots).set({ state: lotLifecycle.transition(lot.state, decision.outcome === 'accepted' ? 'accept' : 'reject'), decidedAt: at }).where(eq(lots.id, lot.id)).run()
  appendToLogbook(context, tx, {
    actorId: context.actor.personId, action: `lot.${decision.outcome}`, subjectKind: 'lot', subjectId: lot.number,
    content: { decisionId: written.id, evidenceHash: evidence.hash, overruled, judged: evidence.lotVerdict.judged, classes: evidence.lotVerdict.classes },
  })
  return written
}
