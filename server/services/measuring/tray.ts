import { eq } from 'drizzle-orm'
import type { UploadAnswer } from '#shared/contracts/lots'
import { lots } from '../../database/schema/lots'
import { uploads } from '../../database/schema/measurements'
import { rigs } from '../../database/schema/rigs'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { recordUpload } from './record-upload'

function getWaiting(context: Context, id: number) {
  const found = context.db.select({ upload: uploads, lotNumber: lots.number, rigCode: rigs.code }).from(uploads).innerJoin(lots, eq(lots.id, uploads.lotId)).innerJoin(rigs, eq(rigs.id, uploads.rigId)).where(eq(uploads.id, id)).get()
  if (!found) throw new DomainError('not-found', 'There is no such file.')
  if (!['tray', 'refused', 'incomplete'].includes(found.upload.state)) throw new DomainError('conflict', `The file ${found.upload.name} no longer waits; reload the page.`)
  return found
}

/** Says which motor a waiting file belongs to, and judges it. The entry in the tray is closed, the file stays. */
export async function assignUpload(context: Context, input: { id: number; serial: string; reason: string }): Promise<UploadAnswer> {
  const { upload, lotNumber, rigCode } = getWaiting(context, input.id)
  const bytes = await context.files.get(upload.sha256)
  const answer = await recordUpload(context, { lotNumber, name: upload.name, rigCode, bytes, reason: input.reason, serial: input.serial })
  if (answer.state !== 'tray') closeEntry(context, upload.id, 'upload.assigned')
  return answer
}

/** Takes a waiting file off the list; the file itself is kept. */
export function discardUpload(context: Context, input: { id: number; reason: string }): void {
  const { upload } = getWaiting(context, input.id)
  closeEntry(context, upload.id, 'upload.discarded')
}

function closeEntry(context: Context, id: number, action: 'upload.assigned' | 'upload.discarded'): void {
  context.db.transaction((tx) => {
    tx.update(uploads).set({ state: 'discarded' }).where(eq(uploads.id, id)).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action, subjectKind: 'upload', subjectId: id })
  }, { behavior: 'immediate' })
}
