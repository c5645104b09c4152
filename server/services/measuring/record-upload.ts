import { and, eq, isNull, ne } from 'drizzle-orm'
import { matchSerial } from '#shared/compute/intake/label/match-serial'
import { judgeMotor } from '#shared/compute/judging/motor-verdict'
import type { AnalysisOutcome, Fault } from '#shared/compute/terms/measurement'
import type { UploadAnswer } from '#shared/contracts/lots'
import { lots, lotSerials, samples } from '../../database/schema/lots'
import { measurementFiles, measurements, rawFiles, uploads } from '../../database/schema/measurements'
import { limitSheets, parts } from '../../database/schema/parts'
import type { Reader } from '../../database/client'
import { sha256Hex } from '../../files/store'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { getLot } from '../lots/find-lot'
import { appendToLogbook } from '../logbook/append'
import { getUsableRig } from '../rigs/usable-rig'
import { analysisSettings } from './analysis-settings'
import { storeMeasurement } from './store-measurement'
import { answerOf } from './upload-answer'

export interface UploadInput {
  lotNumber: string
  name: string
  rigCode: string
  bytes: Uint8Array
  /** Why the motor is measured again. */
  reason: string
  /** Set when a person, not the file name, says which motor it is. */
  serial?: string
}

type Lot = typeof lots.$inferSelect
type Sample = typeof samples.$inferSelect
type UsableRig = ReturnType<typeof getUsableRig>

/** States of a lot in which measurements are taken. */
const MEASURABLE: readonly Lot['state'][] = ['received', 'drawn', 'measuring', 'ready']

/**
 * Takes one file of a lot: stores it under its hash, finds its motor by the serial in the name, analyses and judges it, and writes what became of it.
 * A file that cannot be judged is kept with its fault; one that fits no motor of the sample waits in the lot's tray.
 *
 * @throws DomainError `not-found` lot; `refused` rig out of date; `conflict` when the lot is decided, or the motor has a measurement and no reason is given.
 */
export async function recordUpload(context: Context, input: UploadInput): Promise<UploadAnswer> {
  const lot = getLot(context, input.lotNumber)
  if (!MEASURABLE.includes(lot.state)) throw new DomainError('conflict', `Lot ${lot.supplierLot} is decided; no more files are taken. The file ${input.name} was not kept.`)
  const usable = getUsableRig(context.db, input.rigCode, now(context))
  const found = findSample(context.db, lot, input.serial ?? input.name)
  if ('sample' in found) {
    const repeated = findRepeat(context.db, found.sample, input)
    if (repeated) return answerOf(context.db, repeated)
  }
  const sha256 = await keep(context, input.bytes)
  if (!('sample' in found)) return putInTray(context, lot, usable, input, sha256, found.sentence)
  const stranger = fileOfAnotherMotor(context.db, sha256, found.sample)
  if (stranger) return refuse(context, lot, found.sample, usable, input, sha256, { ok: false, fault: stranger })
  return measure(context, lot, found.sample, usable, input, sha256)
}

async function keep(context: Context, bytes: Uint8Array): Promise<string> {
  const sha256 = await context.files.put(bytes)
  context.db.insert(rawFiles).values({ sha256, size: bytes.length, storedAt: now(context) }).onConflictDoNothing().run()
  return sha256
}

/** The drawn motor that a file name (or a typed serial) names, or why there is none. */
function findSample(db: Pick<Reader, 'select'>, lot: Lot, name: string): { sample: Sample } | { sentence: string } {
  const drawn = db.select().from(samples).where(eq(samples.lotId, lot.id)).all()
  const bound = drawn.filter((row): row is Sample & { serial: string } => row.serial !== null)
  const match = matchSerial(name, bound.map(row => row.serial))
  if (match && 'serial' in match) return { sample: bound.find(row => row.serial === match.serial)! }
  if (match) return { sentence: `The name fits ${match.ambiguous.join(' and ')}. Say which motor it is.` }
  const listed = db.select({ serial: lotSerials.serial }).from(lotSerials).where(eq(lotSerials.lotId, lot.id)).all().map(row => row.serial)
  const notDrawn = matchSerial(name, listed)
  if (notDrawn && 'serial' in notDrawn) return { sentence: `Motor ${notDrawn.serial} is in this lot but was not drawn for the sample. Measure the drawn ones; the file waits in the tray.` }
  return { sentence: 'No motor of this sample has a serial that stands in the file name. Say which motor it is, or take the file out.' }
}

/** The same file handed in again for the same motor: answered as the first time, nothing is doubled. */
function findRepeat(db: Pick<Reader, 'select'>, sample: Sample, input: UploadInput) {
  const taken = db.select({ upload: uploads }).from(uploads)
    .innerJoin(measurements, and(eq(measurements.id, uploads.measurementId), isNull(measurements.voidedAt)))
    .where(and(eq(uploads.sampleId, sample.id), eq(uploads.state, 'judged'))).all()
  if (taken.length === 0) return null
  const same = taken.find(row => row.upload.sha256 === sha256Hex(input.bytes))
  if (same) return same.upload
  if (input.reason === '') throw new DomainError('conflict', `Motor ${sample.serial} has a measurement already. Say why it is measured again; every attempt is kept.`, { fields: [{ field: 'reason', message: 'A reason is needed.' }] })
  return null
}

function fileOfAnotherMotor(db: Pick<Reader, 'select'>, sha256: string, sample: Sample): Fault | null {
  const other = db.select({ serial: samples.serial }).from(measurementFiles)
    .innerJoin(measurements, eq(measurements.id, measurementFiles.measurementId))
    .innerJoin(samples, eq(samples.id, measurements.sampleId))
    .where(and(eq(measurementFiles.sha256, sha256), ne(samples.id, sample.id))).get()
  return other
    ? { code: 'file-of-another-motor', line: null, sentence: `This very file was already judged as motor ${other.serial}.`, remedy: `Measure motor ${sample.serial} itself and upload that file.` }
    : null
}

function putInTray(context: Context, lot: Lot, usable: UsableRig, input: UploadInput, sha256: string, sentence: string): UploadAnswer {
  const fault: Fault = { code: 'no-such-motor', line: null, sentence, remedy: 'Assign it to a drawn motor, or discard it.' }
  return writeUpload(context, { lot, sampleId: null, usable, input, sha256, state: 'tray', fault })
}

function refuse(context: Context, lot: Lot, sample: Sample, usable: UsableRig, input: UploadInput, sha256: string, outcome: Extract<AnalysisOutcome, { ok: false }>): UploadAnswer {
  return writeUpload(context, { lot, sampleId: sample.id, usable, input, sha256, state: 'refused', fault: outcome.fault, recipe: outcome.recipe ?? null })
}

function writeUpload(context: Context, row: {
  lot: Lot; sampleId: number | null; usable: UsableRig; input: UploadInput; sha256: string
  state: 'tray' | 'refused' | 'incomplete'; fault: Fault | null; recipe?: typeof uploads.$inferInsert['recipe']
}): UploadAnswer {
  const upload = context.db.transaction((tx) => {
    const written = tx.insert(uploads).values({
      lotId: row.lot.id, sampleId: row.sampleId, name: row.input.name, sha256: row.sha256, rigId: row.usable.rig.id, state: row.state, fault: row.fault,
      recipe: row.recipe ?? null, uploadedById: context.actor.personId, uploadedAt: now(context),
    }).returning().get()
    appendToLogbook(context, tx, {
      actorId: context.actor.personId, action: `upload.${row.state}`, subjectKind: 'upload', subjectId: written.id,
      content: { lot: row.lot.number, sha256: row.sha256, rigId: row.usable.rig.id, sampleId: row.sampleId, fault: row.fault?.code ?? null },
    })
    return written
  }, { behavior: 'immediate' })
  return answerOf(context.db, upload)
}

async function measure(context: Context, lot: Lot, sample: Sample, usable: UsableRig, input: UploadInput, sha256: string): Promise<UploadAnswer> {
  const { part, sheet } = context.db.select({ part: parts, sheet: limitSheets }).from(lots)
    .innerJoin(parts, eq(parts.id, lots.partId)).innerJoin(limitSheets, eq(limitSheets.id, lots.sheetId)).where(eq(lots.id, lot.id)).get()!
  const analyse = (files: { name: string; bytes: Uint8Array }[]) => analyseByHeaderOrRecipe(context, files, { part, content: sheet.content, ...usable })
  const own = { name: input.name, sha256, bytes: input.bytes }
  let files = [own]
  let outcome = await analyse(files)
  const waiting = outcome.ok && outcome.result.directions === 'both' ? null : findOtherDirection(context.db, sample, usable.rig.id, sha256)
  if (waiting) {
    const joined = [{ name: waiting.name, sha256: waiting.sha256, bytes: await context.files.get(waiting.sha256) }, own]
    const together = await analyse(joined)
    if (together.ok && together.result.directions === 'both') {
      files = joined
      outcome = together
    }
  }
  if (!outcome.ok) return refuse(context, lot, sample, usable, input, sha256, outcome)
  if (sheet.content.requires.bothDirections && outcome.result.directions !== 'both') {
    return writeUpload(context, { lot, sampleId: sample.id, usable, input, sha256, state: 'incomplete', fault: null })
  }
  const judgement = judgeMotor({ content: sheet.content, characteristics: outcome.result.characteristics })
  return storeMeasurement(context, { lot, sample, sheetId: sheet.id, usable, input, files, result: outcome.result, judgement, joins: files.length > 1 ? waiting : null })
}

/** A file whose header names its units is read by its header; the rig's recipe answers what the header leaves open. */
async function analyseByHeaderOrRecipe(context: Context, files: { name: string; bytes: Uint8Array }[], about: Omit<Parameters<typeof analysisSettings>[0], 'recipe'> & UsableRig): Promise<AnalysisOutcome> {
  const byHeader = await context.analyse(files, analysisSettings({ ...about, recipe: null }))
  if (byHeader.ok || byHeader.fault.code !== 'unit-not-named' || !about.rig.recipe) return byHeader
  return context.analyse(files, analysisSettings({ ...about, recipe: about.rig.recipe }))
}

function findOtherDirection(db: Pick<Reader, 'select'>, sample: Sample, rigId: number, sha256: string) {
  return db.select().from(uploads).where(and(eq(uploads.sampleId, sample.id), eq(uploads.rigId, rigId), eq(uploads.state, 'incomplete'), ne(uploads.sha256, sha256))).get() ?? null
}
