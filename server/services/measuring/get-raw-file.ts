import { eq } from 'drizzle-orm'
import { lots } from '../../database/schema/lots'
import { measurementFiles, measurements, uploads } from '../../database/schema/measurements'
import type { Context } from '../context'
import { DomainError } from '../domain-error'

/**
 * A raw file as it came. A supplier's contact gets files of its own lots' measurements only; all else is answered as if it did not exist.
 */
export async function getRawFile(context: Context, sha256: string): Promise<{ name: string; bytes: Uint8Array }> {
  const used = context.db.select({ name: measurementFiles.name, supplierId: lots.supplierId }).from(measurementFiles)
    .innerJoin(measurements, eq(measurements.id, measurementFiles.measurementId)).innerJoin(lots, eq(lots.id, measurements.lotId)).where(eq(measurementFiles.sha256, sha256)).all()
  const { role, supplierId } = context.actor
  const found = role === 'supplier' ? used.find(row => row.supplierId === supplierId) : used[0] ?? context.db.select({ name: uploads.name }).from(uploads).where(eq(uploads.sha256, sha256)).get()
  if (!found) throw new DomainError('not-found', 'There is no such file.')
  return { name: found.name, bytes: await context.files.get(sha256) }
}
