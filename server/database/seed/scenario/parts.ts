import type { Limit, LimitSheetContent, NonconformityClass } from '#shared/compute/terms/judgement'
import type { MotorDesign } from '#shared/compute/terms/motor'
import type { MotorSpec } from '../generator/motor-model'

export interface DemoPart {
  number: string
  name: string
  revision: string
  design: MotorDesign
  ratedTorqueNm: number
  rowsPerDirection: number
  suppliers: { code: string; supplierPartNumber: string; unitPrice: number }[]
  /** Limit sheets in order; the last one is in force today. */
  sheets: { content: LimitSheetContent; reason: string; daysAgo: number }[]
  /** A motor as it should be. */
  good: MotorSpec
}

const upper = (key: string, milli: number, grade: NonconformityClass = 'major'): Limit => ({ key, lower: null, upper: milli / 1000, unit: 'N·m', class: grade })
const percent = (key: string, value: number): Limit => ({ key, lower: null, upper: value, unit: '%', class: 'major' })

const sheet = (limits: Limit[], extra: Partial<LimitSheetContent> = {}): LimitSheetContent => ({
  rippleDefinition: 'peakToPeakOverRated', highestOrder: null, limits, decisionRule: { kind: 'simple' }, sampling: { kind: 'attributes', level: 'I', aql: { major: '2.5', minor: '4.0' } },
  requires: { bothDirections: true, temperature: false }, compensation: { entries: 1024, stepNm: 5e-5 }, ...extra,
})

const WRIST = [upper('cogging.peakToPeak', 5.4), percent('rippleRatio', 5.4), upper('friction.mean', 2.5, 'minor'), upper('order.12', 0.6), upper('order.24', 0.6), upper('group.statorSide', 0.5, 'minor'), upper('afterCompensation.peakToPeak', 0.9, 'minor')]

/** The five motors of the arm: two outrunners, a servo, a claw-pole and a hybrid stepper. */
export const PARTS: readonly DemoPart[] = [
  {
    number: 'KF-4412-C', name: 'Wrist outrunner 12/14', revision: 'C', design: { kind: 'brushless', slots: 12, poles: 14 }, ratedTorqueNm: 0.1, rowsPerDirection: 2400,
    suppliers: [{ code: 'TUVALO', supplierPartNumber: 'TV-OR-1214', unitPrice: 14.2 }, { code: 'AMBREL', supplierPartNumber: 'AC44-12', unitPrice: 19.8 }],
    sheets: [
      { content: sheet(WRIST.map(row => row.key === 'order.24' ? { ...row, upper: 0.9e-3 } : row)), reason: 'First limits after the joint trials', daysAgo: 440 },
      { content: sheet(WRIST), reason: 'Order 24 tightened: felt at the handle at slow speed', daysAgo: 250 },
    ],
    good: { design: { kind: 'brushless', slots: 12, poles: 14 }, designPeakToPeakNm: 3.9e-3, rotorScatter: 0.009, statorScatter: 0.008, frictionNm: 1.5e-3 },
  },
  {
    number: 'KF-4424-A', name: 'Elbow outrunner 24/22', revision: 'A', design: { kind: 'brushless', slots: 24, poles: 22 }, ratedTorqueNm: 0.35, rowsPerDirection: 2700,
    suppliers: [{ code: 'SALTMARSH', supplierPartNumber: 'SR-2422-B', unitPrice: 31.5 }],
    sheets: [{ content: sheet([upper('cogging.peakToPeak', 9), percent('rippleRatio', 2.6), upper('friction.mean', 6, 'minor'), upper('order.22', 1.1), upper('group.rotorSide', 1.2)], { highestOrder: 264 }), reason: 'First limits', daysAgo: 440 }],
    good: { design: { kind: 'brushless', slots: 24, poles: 22 }, designPeakToPeakNm: 5.2e-3, rotorScatter: 0.007, statorScatter: 0.006, frictionNm: 4e-3 },
  },
  {
    number: 'KF-3098-B', name: 'Shoulder servo 9/8', revision: 'B', design: { kind: 'brushless', slots: 9, poles: 8 }, ratedTorqueNm: 0.2, rowsPerDirection: 2200,
    suppliers: [{ code: 'AMBREL', supplierPartNumber: 'AC30-98', unitPrice: 42 }],
    sheets: [{ content: sheet([upper('cogging.peakToPeak', 6.5), percent('rippleRatio', 3.3), upper('friction.mean', 4, 'minor'), upper('order.9', 0.9), upper('order.8', 0.9)], { decisionRule: { kind: 'guard-band', ratio: 1 } }), reason: 'First limits', daysAgo: 440 }],
    good: { design: { kind: 'brushless', slots: 9, poles: 8 }, designPeakToPeakNm: 3.2e-3, rotorScatter: 0.01, statorScatter: 0.01, frictionNm: 2.5e-3 },
  },
  {
    number: 'KF-1548-A', name: 'Latch stepper, claw pole, 48 steps', revision: 'A', design: { kind: 'claw-pole stepper', polePairs: 12 }, ratedTorqueNm: 0.03, rowsPerDirection: 1600,
    suppliers: [{ code: 'NORRHAVEN', supplierPartNumber: 'NS-15-48', unitPrice: 3.1 }],
    sheets: [{ content: sheet([upper('cogging.peakToPeak', 7), upper('friction.mean', 2, 'minor'), upper('order.24', 0.5)], { compensation: null }), reason: 'First limits', daysAgo: 440 }],
    good: { design: { kind: 'claw-pole stepper', polePairs: 12 }, designPeakToPeakNm: 5.4e-3, rotorScatter: 0.03, statorScatter: 0.02, frictionNm: 1.1e-3 },
  },
  {
    number: 'KF-2350-A', name: 'Base hybrid stepper, 200 steps', revision: 'A', design: { kind: 'hybrid stepper', rotorTeeth: 50 }, ratedTorqueNm: 0.4, rowsPerDirection: 3600,
    suppliers: [{ code: 'NORRHAVEN', supplierPartNumber: 'NS-23-200', unitPrice: 11.6 }],
    sheets: [{ content: sheet([upper('cogging.peakToPeak', 30), upper('friction.mean', 9, 'minor'), upper('order.50', 1.4), upper('order.100', 1.4)], { highestOrder: 400, compensation: null }), reason: 'First limits', daysAgo: 440 }],
    good: { design: { kind: 'hybrid stepper', rotorTeeth: 50 }, designPeakToPeakNm: 24e-3, rotorScatter: 0.015, statorScatter: 0.012, frictionNm: 5e-3 },
  },
]

export const partOf = (number: string): DemoPart => {
  const part = PARTS.find(each => each.number === number)
  if (!part) throw new RangeError(`partOf: there is no demo part ${number}`)
  return part
}
