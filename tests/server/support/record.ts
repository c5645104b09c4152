import { explainFailures } from '#shared/compute/judging/explain'
import { judgeMotor } from '#shared/compute/judging/motor-verdict'
import { originOfOrder } from '#shared/compute/motor/origins'
import { DRAW_GENERATOR } from '#shared/compute/sampling/draw'
import { judgeLot } from '#shared/compute/sampling/lot-verdict'
import { makePlan } from '#shared/compute/sampling/plan'
import { evaluateSeries } from '#shared/compute/torque/evaluate'
import type { Limit, LimitSheetContent, SamplingScheme } from '#shared/compute/terms/judgement'
import type { Characteristic, OrderAmplitude } from '#shared/compute/terms/measurement'
import type { PaperRecord, PaperSample } from '#shared/contracts/paper-record'

const DESIGN = { kind: 'brushless', slots: 12, poles: 14 } as const
const RATED_NM = 0.1
const HIGHEST = 252

const LIMITS: Limit[] = [
  { key: 'cogging.peakToPeak', lower: null, upper: 5.4e-3, unit: 'N·m', class: 'major' },
  { key: 'rippleRatio', lower: null, upper: 5.4, unit: '%', class: 'major' },
  { key: 'order.12', lower: null, upper: 0.6e-3, unit: 'N·m', class: 'major' },
  { key: 'order.24', lower: null, upper: 0.6e-3, unit: 'N·m', class: 'minor' },
  { key: 'group.statorSide', lower: null, upper: 0.4e-3, unit: 'N·m', class: 'minor' },
  { key: 'friction.mean', lower: 0.5e-3, upper: 2.5e-3, unit: 'N·m', class: 'minor' },
  { key: 'afterCompensation.reduction', lower: 80, upper: null, unit: '%', class: 'minor' },
]

export interface RecordOptions {
  samples: number
  /** How many of them have one weak magnet. */
  failing: number
  /** How many of the seven limits the sheet has. */
  limits?: number
  change?: (record: PaperRecord) => PaperRecord
}

/** Figures between 0 and 1 that look irregular and are the same every time. */
const scatter = (seed: number): number => (Math.sin(seed * 12.9898) * 43758.5453) % 1 / 2 + 0.5

const RIG = {
  code: 'R1', name: 'Slow sweep bench', method: 'torque-sensor' as const,
  properties: { rangeNm: 0.2, torqueResolutionNm: 1e-6, torqueRelativeUncertainty: 0.002, torqueAbsoluteUncertaintyNm: 2e-5, angleResolutionRad: 7.7e-4, bandwidthHz: 50 },
  calibration: { certificateNumber: 'CAL-26-0417', laboratory: 'Harrow Torque Laboratory', performedOn: '2026-05-11', dueOn: '2027-05-11', torqueRelativeUncertainty: 0.002, torqueAbsoluteUncertaintyNm: 2e-5 },
}

function sample(index: number, weak: boolean, content: LimitSheetContent): PaperSample {
  const amplitudes = new Map([[84, 1.7e-3 + 0.3e-3 * scatter(index)], [168, 0.2e-3 + 0.05e-3 * scatter(index + 0.3)], [12, (weak ? 0.8e-3 : 0.1e-3) + 0.05e-3 * scatter(index + 0.5)], [24, (weak ? 0.62e-3 : 0.08e-3) + 0.04e-3 * scatter(index + 0.7)], [36, weak ? 0.3e-3 : 0.02e-3], [14, 0.08e-3]])
  const series = { meanNm: 0, cosNm: Array.from({ length: HIGHEST }, (_, at) => amplitudes.get(at + 1) ?? 0), sinNm: Array.from({ length: HIGHEST }, () => 0) }
  const values = evaluateSeries(series, 4096)
  const peakToPeak = Math.max(...values) - Math.min(...values)
  const characteristics: Characteristic[] = [
    { key: 'cogging.peakToPeak', value: peakToPeak, unit: 'N·m', expandedUncertainty: 0.05e-3 }, { key: 'rippleRatio', value: 100 * peakToPeak / RATED_NM, unit: '%', expandedUncertainty: 0.05 },
    { key: 'order.12', value: amplitudes.get(12)!, unit: 'N·m', expandedUncertainty: 0.01e-3 }, { key: 'order.24', value: amplitudes.get(24)!, unit: 'N·m', expandedUncertainty: 0.01e-3 },
    { key: 'group.statorSide', value: 0.06e-3, unit: 'N·m', expandedUncertainty: 0.01e-3 }, { key: 'friction.mean', value: 1.4e-3 + 0.2e-3 * scatter(index + 0.9), unit: 'N·m', expandedUncertainty: 0.03e-3 },
    { key: 'afterCompensation.reduction', value: 91.2, unit: '%', expandedUncertainty: 0.8 },
  ]
  const orders = [...amplitudes].sort(([a], [b]) => a - b).map(([order, amplitudeNm]): OrderAmplitude => ({ order, amplitudeNm, phaseDeg: 0, expandedUncertaintyNm: 0.01e-3, significant: true, ...originOfOrder(order, DESIGN) }))
  const judged = judgeMotor({ content, characteristics })
  const serial = `71-${4401 + index}`
  return {
    drawOrder: index + 1, position: 7 + 6 * index, serial, verdict: judged.verdict, attempts: 1, attempt: 1, measuredAt: '2026-11-17T09:42:00.000Z', measuredBy: 'Ines Falkenrath', rig: 'R1', engineVersion: '1.0.0', recipe: null,
    files: [{ name: `${serial}.csv`, sha256: (index + 1).toString(16).padStart(64, '0'), size: 91_000 }],
    characteristics: judged.characteristics, warnings: [], orders, cogging: series,
  }
}

/** A record with invented figures, judged by the real rules: 12 slots and 14 poles, some motors with one weak magnet. */
export function buildRecord({ samples: count, failing, limits = LIMITS.length, change = record => record }: RecordOptions): PaperRecord {
  const sampling: SamplingScheme = { kind: 'fixed', n: count }
  const content: LimitSheetContent = { rippleDefinition: 'peakToPeakOverRated', highestOrder: null, limits: LIMITS.slice(0, limits), decisionRule: { kind: 'simple' }, sampling, requires: { bothDirections: true, temperature: false }, compensation: { entries: 1024, stepNm: 1e-4 } }
  const plan = makePlan({ lotSize: 6 * count, scheme: sampling, severity: 'normal', limited: ['major', 'minor'] })
  const samples = Array.from({ length: count }, (_, index) => sample(index, index % 7 === 3 && Math.floor(index / 7) < failing, content))
  const verdicts = samples.map(row => judgeMotor({ content, characteristics: row.characteristics.map(each => ({ ...each })) }))
  const lotVerdict = judgeLot({ plan, motors: verdicts })
  const accepted = lotVerdict.outcome === 'accept'
  return change({
    schema: 'evenlot.paper/1', number: 'P-2026-000318', kind: accepted ? 'acceptance' : 'rejection', issuedAt: '2026-11-17T13:05:21.000Z', timeZone: 'Europe/Berlin', buyer: 'Kestrel Fold Robotics',
    supplier: { code: 'TV', name: 'Tovell Antriebe', address: 'Hafenstraße 14, 9400 Rorschach' },
    part: { number: 'KF-M42-12', name: 'Joint motor 42', revision: 'C', design: DESIGN, designOrder: 84, ratedTorqueNm: RATED_NM },
    lot: { receipt: '26-000412', supplierLot: 'TV-2611-083', quantity: 6 * count, orderNumber: 'PO-77310', receivedAt: '2026-11-16T07:12:00.000Z', receivedBy: 'Mika Oduya', resubmissionOf: null },
    plan, severityReason: 'Normal inspection: the last five lots of this supplier and part were accepted.', draw: { seed: '9f3a6c0e51d2b874', generator: DRAW_GENERATOR },
    sheet: { version: 3, content, author: 'Noor Castellan', approvedBy: 'Emil Brandt', approvedAt: '2026-09-02T08:30:00.000Z', effectiveFrom: '2026-09-02T08:30:00.000Z' },
    rigs: [RIG], samples, lotVerdict, explanation: explainFailures(samples.map((row, index) => ({ serial: row.serial!, verdict: verdicts[index]!, orders: row.orders }))),
    decision: { outcome: accepted ? 'accepted' : 'rejected', overruled: false, reason: '', evidenceHash: 'a'.repeat(64), signedBy: 'Ines Falkenrath', signedAt: '2026-11-17T13:05:20.000Z', meaning: 'I have looked at the figures stated here and decide this lot by the plan and the limit sheet named.' },
    logbook: { sequence: 4127, entryHash: 'b'.repeat(64) }, checkAddress: 'https://evenlot.kestrelfold.example/check/6f1d0b8a93e24c57a1b06d3f8e92c410',
  })
}
