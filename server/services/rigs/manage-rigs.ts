import { and, desc, eq, ne, sql } from 'drizzle-orm'
import { calibrationSchema, rigSchema } from '#shared/contracts/rigs'
import type { CalibrationInput, RigInput, RigPage } from '#shared/contracts/rigs'
import { lots } from '../../database/schema/lots'
import { measurements } from '../../database/schema/measurements'
import { people } from '../../database/schema/people'
import { calibrations, rigs } from '../../database/schema/rigs'
import type { Reader } from '../../database/client'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { listRigs } from './list-rigs'

function getRig(db: Pick<Reader, 'select'>, code: string) {
  const rig = db.select().from(rigs).where(eq(rigs.code, code)).get()
  if (!rig) throw new DomainError('not-found', `There is no rig ${code}.`)
  return rig
}

/** Adds a rig; it measures only after a calibration is entered. */
export function addRig(context: Context, input: RigInput): { code: string } {
  const rig = rigSchema.parse(input)
  return context.db.transaction((tx) => {
    if (tx.select({ id: rigs.id }).from(rigs).where(eq(rigs.code, rig.code)).get()) throw new DomainError('conflict', `Rig ${rig.code} exists already.`, { fields: [{ field: 'code', message: 'Exists already.' }] })
    tx.insert(rigs).values({ ...rig, createdAt: now(context) }).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'rig.added', subjectKind: 'rig', subjectId: rig.code, content: { properties: rig.properties } })
    return { code: rig.code }
  }, { behavior: 'immediate' })
}

/** Changes a rig's name, place and properties; measurements made before keep the figures they have. */
export function changeRig(context: Context, code: string, input: RigInput): { code: string } {
  const change = rigSchema.parse(input)
  return context.db.transaction((tx) => {
    const rig = getRig(tx, code)
    if (tx.select({ id: rigs.id }).from(rigs).where(and(eq(rigs.code, change.code), ne(rigs.id, rig.id))).get()) throw new DomainError('conflict', `Rig ${change.code} exists already.`, { fields: [{ field: 'code', message: 'Exists already.' }] })
    tx.update(rigs).set(change).where(eq(rigs.id, rig.id)).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'rig.changed', subjectKind: 'rig', subjectId: change.code, content: { properties: change.properties } })
    return { code: change.code }
  }, { behavior: 'immediate' })
}

/** Enters a calibration; the one performed last counts from then on. Rows are never changed. */
export function addCalibration(context: Context, code: string, input: CalibrationInput): void {
  const calibration = calibrationSchema.parse(input)
  context.db.transaction((tx) => {
    const rig = getRig(tx, code)
    if (calibration.performedOn > now(context).slice(0, 10)) throw new DomainError('invalid-input', 'The calibration lies in the future. Check the date.', { fields: [{ field: 'performedOn', message: 'Today at the latest.' }] })
    tx.insert(calibrations).values({ ...calibration, rigId: rig.id, enteredById: context.actor.personId, enteredAt: now(context) }).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'rig.calibrated', subjectKind: 'rig', subjectId: rig.code, content: { certificateNumber: calibration.certificateNumber, performedOn: calibration.performedOn, dueOn: calibration.dueOn } })
  }, { behavior: 'immediate' })
}

/** A rig with its calibrations and the lots measured on it. */
export function getRigPage(context: Context, code: string): RigPage {
  const { db } = context
  const rig = getRig(db, code)
  const touched = db.select({ number: lots.number, supplierLot: lots.supplierLot, motors: sql<number>`count(distinct ${measurements.sampleId})`, lastMeasuredAt: sql<string>`max(${measurements.measuredAt})` })
    .from(measurements).innerJoin(lots, eq(lots.id, measurements.lotId)).where(eq(measurements.rigId, rig.id)).groupBy(lots.id).orderBy(desc(sql`max(${measurements.measuredAt})`)).limit(50).all()
  const history = db.select({ row: calibrations, enteredBy: people.name }).from(calibrations).innerJoin(people, eq(people.id, calibrations.enteredById)).where(eq(calibrations.rigId, rig.id)).orderBy(desc(calibrations.performedOn), desc(calibrations.id)).all()
  const confirmedBy = rig.recipeConfirmedById === null ? null : db.select({ name: people.name }).from(people).where(eq(people.id, rig.recipeConfirmedById)).get()?.name ?? null
  return {
    ...listRigs(context).find(row => row.code === rig.code)!,
    properties: rig.properties, recipe: rig.recipe, recipeConfirmedBy: confirmedBy, recipeConfirmedAt: rig.recipeConfirmedAt, lots: touched,
    calibrations: history.map(({ row, enteredBy }) => ({
      id: row.id, certificateNumber: row.certificateNumber, laboratory: row.laboratory, performedOn: row.performedOn, dueOn: row.dueOn, torqueRelativeUncertainty: row.torqueRelativeUncertainty,
      torqueAbsoluteUncertaintyNm: row.torqueAbsoluteUncertaintyNm, remarks: row.remarks, enteredBy, enteredAt: row.enteredAt,
    })),
  }
}
