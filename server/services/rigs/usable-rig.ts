import { and, desc, eq, lte } from 'drizzle-orm'
import { calibrations, rigs } from '../../database/schema/rigs'
import type { Reader } from '../../database/client'
import { DomainError } from '../domain-error'

/**
 * A rig with the calibration that covers the given day.
 *
 * @param at ISO 8601 time of the measurement.
 * @throws DomainError `invalid-input` for an unknown rig, `refused` when its calibration is missing or out of date.
 */
export function getUsableRig(db: Pick<Reader, 'select'>, code: string, at: string) {
  const rig = db.select().from(rigs).where(eq(rigs.code, code)).get()
  if (!rig) throw new DomainError('invalid-input', `There is no rig ${code}. Choose the rig that measured.`, { fields: [{ field: 'rig', message: 'Unknown rig.' }] })
  const day = at.slice(0, 10)
  const calibration = db.select().from(calibrations).where(and(eq(calibrations.rigId, rig.id), lte(calibrations.performedOn, day))).orderBy(desc(calibrations.performedOn), desc(calibrations.id)).limit(1).get()
  if (!calibration) throw new DomainError('refused', `Rig ${code} has no calibration on record. The file was not taken; enter the calibration under Rigs or measure on another rig.`)
  if (calibration.dueOn < day) {
    throw new DomainError('refused', `The calibration of rig ${code} ended on ${calibration.dueOn}. The file was not taken; use another rig, or have this one calibrated and entered under Rigs.`)
  }
  return { rig, calibration }
}
