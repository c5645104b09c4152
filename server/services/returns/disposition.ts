import { eq } from 'drizzle-orm'
import { lotLifecycle } from '#shared/compute/lifecycle/lot'
import type { Disposition } from '#shared/compute/lifecycle/lot'
import { dispositionSchema } from '#shared/contracts/returns'
import type { DispositionInput } from '#shared/contracts/returns'
import { lots } from '../../database/schema/lots'
import { nonconformances } from '../../database/schema/returns'
import type { Transaction } from '../../database/client'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { writeUpdateNotices } from '../notices/update-notices'
import { confirmPassword, recheckSigner } from '../people/confirm-password'
import { getNonconformance } from './find-nonconformance'
import type { Nonconformance } from './find-nonconformance'
import { writeEntry } from './write-entry'

/** What is decided about the lot, for both sides. */
const SENTENCES: Record<Disposition, string> = {
  'return-to-supplier': 'Return to the supplier: the whole lot goes back.',
  'sort': 'Sort all: every motor of the lot is measured and the nonconforming ones are taken out.',
  'rework': 'Rework: the lot is put right and measured again.',
  'concession': 'Concession: the lot is used, although it does not meet the plan.',
  'scrap': 'Scrap: the whole lot is destroyed.',
}

/**
 * The engineer decides what happens to the rejected lot, with a reason. A concession is acceptance against the plan and is signed with the password.
 *
 * @throws DomainError `not-found`; `wrong-password` for a concession; `conflict` when the lot is not on hold.
 */
export async function decideDisposition(context: Context, number: string, input: DispositionInput): Promise<void> {
  const { disposition, reason, password } = dispositionSchema.parse(input)
  const signed = disposition === 'concession'
  if (signed && password === '') throw new DomainError('wrong-password', 'A concession is signed. Type your password; nothing was changed.', { fields: [{ field: 'password', message: 'Type your password to sign.' }] })
  const passwordVersion = signed ? await confirmPassword(context, password) : null
  context.db.transaction((tx) => {
    if (passwordVersion !== null) recheckSigner(context, tx, passwordVersion)
    const found = getNonconformance({ db: tx, actor: context.actor }, number)
    moveLot(tx, found)
    tx.update(nonconformances).set({ disposition, dispositionReason: reason, dispositionById: context.actor.personId, dispositionAt: now(context) }).where(eq(nonconformances.id, found.id)).run()
    writeEntry(context, tx, { nonconformanceId: found.id, kind: 'disposition', text: `${SENTENCES[disposition]}\n${reason}`, byId: context.actor.personId })
    writeUpdateNotices(context, tx, found, { to: 'supplier', headline: 'what happens to the lot is decided', paragraphs: [SENTENCES[disposition], reason] })
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'nonconformance.disposition', subjectKind: 'nonconformance', subjectId: number, content: { disposition, signed } })
  }, { behavior: 'immediate' })
  context.wake('outbox')
}

function moveLot(tx: Transaction, { lotId, number }: Nonconformance): void {
  const lot = tx.select().from(lots).where(eq(lots.id, lotId)).get()!
  if (lot.state !== 'on-hold') throw new DomainError('conflict', `The disposition of lot ${lot.supplierLot} is decided already. Nothing was changed; load the page again.`, { link: `/returns/${number}` })
  tx.update(lots).set({ state: lotLifecycle.transition(lot.state, 'disposition') }).where(eq(lots.id, lotId)).run()
}
