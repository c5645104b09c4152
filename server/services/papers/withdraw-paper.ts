import { eq } from 'drizzle-orm'
import { paperLifecycle } from '#shared/compute/lifecycle/paper'
import { papers } from '../../database/schema/papers'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { confirmPassword, recheckSigner } from '../people/confirm-password'
import { getPaperByNumber } from './find-paper'

/** Withdraws a paper by signature, with a reason; the check page says so in its first line. The paper itself stays. */
export async function withdrawPaper(context: Context, number: string, input: { password: string; reason: string }): Promise<void> {
  const passwordVersion = await confirmPassword(context, input.password)
  context.db.transaction((tx) => {
    recheckSigner(context, tx, passwordVersion)
    const paper = getPaperByNumber(context, number)
    if (paper.state !== 'issued') throw new DomainError('conflict', `Paper ${number} is ${paper.state} already.`)
    tx.update(papers).set({ state: paperLifecycle.transition(paper.state, 'withdraw'), endedAt: now(context), endedById: context.actor.personId, endedReason: input.reason }).where(eq(papers.id, paper.id)).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'paper.withdrawn', subjectKind: 'paper', subjectId: number })
  }, { behavior: 'immediate' })
}
