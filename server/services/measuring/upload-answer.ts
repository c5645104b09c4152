import { eq } from 'drizzle-orm'
import { formatQuantity } from '#shared/compute/judging/quantities'
import type { UploadAnswer } from '#shared/contracts/lots'
import type { Reader } from '../../database/client'
import { samples } from '../../database/schema/lots'
import type { uploads } from '../../database/schema/measurements';
import { measurements } from '../../database/schema/measurements'

const VERDICT_WORDS = { 'pass': 'conforms', 'conditional-pass': 'conforms, inside the guard band', 'conditional-fail': 'does not conform, inside the guard band', 'fail': 'does not conform' } as const

/** What became of an uploaded file, in the shape and words for people. */
export function answerOf(db: Pick<Reader, 'select'>, upload: typeof uploads.$inferSelect): UploadAnswer {
  const serial = upload.sampleId === null ? null : db.select({ serial: samples.serial }).from(samples).where(eq(samples.id, upload.sampleId)).get()?.serial ?? null
  const measurement = upload.measurementId === null ? null : db.select().from(measurements).where(eq(measurements.id, upload.measurementId)).get() ?? null
  return {
    id: upload.id, name: upload.name, state: upload.state, serial, verdict: measurement?.verdict ?? null, fault: upload.fault, recipe: upload.recipe,
    sentence: sentenceOf(upload, serial, measurement),
  }
}

function sentenceOf(upload: typeof uploads.$inferSelect, serial: string | null, measurement: typeof measurements.$inferSelect | null): string {
  if (upload.state === 'incomplete') return `Motor ${serial}: one direction is here. Upload the file of the other direction; it is judged when both are in.`
  if (upload.state === 'discarded') return 'Taken out of the tray; the file is kept.'
  if (!measurement) return upload.fault?.sentence ?? 'The file waits.'
  const failing = measurement.judgement.characteristics.find(row => row.verdict === 'fail' || row.verdict === 'conditional-fail')
  if (failing) return `Motor ${serial} does not conform. ${failing.reason}`
  if (measurement.verdict === null) {
    const open = measurement.judgement.characteristics.find(row => row.verdict === null)
    return `Motor ${serial} cannot be judged yet. ${open?.reason ?? ''}`.trim()
  }
  const ripple = measurement.result.characteristics.find(row => row.key === 'cogging.peakToPeak')
  const figure = ripple?.value == null ? '' : `, ${formatQuantity(ripple.value, ripple.unit).text} ${formatQuantity(ripple.value, ripple.unit).unit} peak to peak`
  return `Motor ${serial} ${VERDICT_WORDS[measurement.verdict]}${figure}.`
}
