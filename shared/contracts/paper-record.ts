import { z } from 'zod'
import type { CharacteristicVerdict, LimitSheetContent, LotVerdict, SamplingPlan, Verdict } from '../compute/terms/judgement'
import type { ColumnRecipe, FourierSeries, Method, OrderAmplitude, RigProperties, Warning } from '../compute/terms/measurement'
import type { MotorDesign } from '../compute/terms/motor'

const text = z.string()
const json = <T>() => z.custom<T>(value => typeof value === 'object' && value !== null, 'must be an object')

const fileSchema = z.object({ name: text, sha256: z.string().regex(/^[0-9a-f]{64}$/), size: z.number().int().min(0) })

const sampleSchema = z.object({
  drawOrder: z.number().int(),
  position: z.number().int(),
  serial: text.nullable(),
  /** null: not measured (a lot rejected before all were). */
  verdict: z.custom<Verdict | null>(value => value === null || typeof value === 'string'),
  attempts: z.number().int(),
  /** Number of the attempt that counts; null when not measured. */
  attempt: z.number().int().nullable(),
  measuredAt: text.nullable(),
  measuredBy: text.nullable(),
  rig: text.nullable(),
  /** Calibration certificate that covered this measurement; a rig may be calibrated anew within a lot. */
  calibration: text.nullable().optional(),
  engineVersion: text.nullable(),
  /** Columns as the rig's recipe named them; null: read from the file's own header. */
  recipe: json<ColumnRecipe>().nullable(),
  files: z.array(fileSchema),
  characteristics: z.array(json<CharacteristicVerdict>()),
  warnings: z.array(json<Warning>()),
  orders: z.array(json<OrderAmplitude>()),
  /** Cogging torque as drawn: coefficients rounded to six digits. */
  cogging: json<FourierSeries>().nullable(),
})

/** The certificate itself; the PDF is drawn from it and nothing else. */
export const paperRecordSchema = z.object({
  schema: z.literal('evenlot.paper/1'),
  number: text,
  kind: z.enum(['acceptance', 'rejection']),
  issuedAt: text,
  /** Zone in which the paper prints its times. */
  timeZone: text,
  buyer: text,
  supplier: z.object({ code: text, name: text, address: text }),
  part: z.object({ number: text, name: text, revision: text, design: json<MotorDesign>(), designOrder: z.number().int(), ratedTorqueNm: z.number().nullable() }),
  lot: z.object({ receipt: text, supplierLot: text, quantity: z.number().int(), orderNumber: text, receivedAt: text, receivedBy: text, resubmissionOf: text.nullable() }),
  plan: json<SamplingPlan>(),
  severityReason: text,
  draw: z.object({ seed: text, generator: text }),
  sheet: z.object({ version: z.number().int(), content: json<LimitSheetContent>(), author: text, approvedBy: text, approvedAt: text, effectiveFrom: text }),
  rigs: z.array(z.object({
    code: text, name: text, method: z.custom<Method>(value => typeof value === 'string'), properties: json<RigProperties>(),
    calibration: z.object({ certificateNumber: text, laboratory: text, performedOn: text, dueOn: text, torqueRelativeUncertainty: z.number(), torqueAbsoluteUncertaintyNm: z.number() }),
  })),
  samples: z.array(sampleSchema),
  lotVerdict: json<LotVerdict>(),
  explanation: z.array(text),
  decision: z.object({ outcome: z.enum(['accepted', 'rejected']), overruled: z.boolean(), reason: text, evidenceHash: text, signedBy: text, signedAt: text, meaning: text }),
  /** Head of the logbook when the paper was issued. */
  logbook: z.object({ sequence: z.number().int(), entryHash: text }),
  checkAddress: text,
})

export type PaperRecord = z.infer<typeof paperRecordSchema>
export type PaperSample = PaperRecord['samples'][number]
