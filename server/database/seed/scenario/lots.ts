import type { Disposition } from '#shared/compute/lifecycle/lot'
import type { FileFault } from '../generator/faults'
import type { MotorSpec } from '../generator/motor-model'
import type { Dialect } from '../generator/render-file'
import { partOf } from './parts'

/** One lot of the demo: what came, and how its motors were made. */
export interface DemoLot {
  supplier: string
  part: string
  supplierLot: string
  quantity: number
  /** Days before today; 0: this morning. */
  daysAgo: number
  /** Deviation of this lot's motors from a good one. */
  made: Partial<MotorSpec>
  /** Every so many motors one is made worse; 0: none. */
  outlier?: { every: number; made: Partial<MotorSpec> }
  /** Supplier's lot that this one re-submits. */
  resubmissionOf?: string
  /** What became of it if rejected. */
  disposition?: Disposition
  story?: string
}

/** A lot that waits today, with what its files look like. */
export interface WaitingLot extends DemoLot {
  received: boolean
  serialsListed: boolean
  dialects: Dialect[]
  /** Forward and reverse in a file each. */
  split: boolean
  /** Faults put into the first files. */
  faults: FileFault[]
  title: string
}

const prefix: Record<string, string> = { TUVALO: 'TV', AMBREL: 'AC', NORRHAVEN: 'NS', SALTMARSH: 'SR' }
const QUANTITIES = [400, 320, 240, 480, 160, 360, 280]

/** Supplier's lot number: prefix, year and month of delivery, running number. */
function lotNumber(supplier: string, today: Date, daysAgo: number, running: number): string {
  const at = new Date(today.getTime() - daysAgo * 86_400_000)
  return `${prefix[supplier]}-${String(at.getUTCFullYear() % 100).padStart(2, '0')}${String(at.getUTCMonth() + 1).padStart(2, '0')}-${String(running).padStart(3, '0')}`
}

interface Series { supplier: string; part: string; count: number; first: number; last: number; running: number; made: (index: number, daysAgo: number) => Pick<DemoLot, 'made' | 'outlier' | 'story' | 'disposition'> }

/** The fourteen months before today, as five stories and quiet lots between them. */
const SERIES: readonly Series[] = [
  // Magnets drift: rotor scatter rises lot by lot until lots fail.
  { supplier: 'TUVALO', part: 'KF-4412-C', count: 15, first: 415, last: 20, running: 41, made: index => ({ made: { rotorScatter: 0.008 + 0.0016 * Math.max(0, index - 4) + (index >= 13 ? 0.028 : 0) }, story: 'magnet placement drifts', disposition: 'return-to-supplier' }) },
  { supplier: 'AMBREL', part: 'KF-4412-C', count: 10, first: 400, last: 40, running: 12, made: () => ({ made: { designPeakToPeakNm: 3.7e-3 } }) },
  // A new stamping tool, 200 days ago: the stator side steps up.
  { supplier: 'SALTMARSH', part: 'KF-4424-A', count: 12, first: 410, last: 12, running: 61, made: (index, daysAgo) => ({ made: { statorScatter: daysAgo < 200 ? (index === 9 ? 0.06 : 0.015) : 0.006 }, story: 'stator stamping changed', disposition: 'concession' }) },
  // Bad early, better after the corrective action of a rejection.
  { supplier: 'AMBREL', part: 'KF-3098-B', count: 9, first: 405, last: 25, running: 30, made: (index, daysAgo) => ({ made: { statorScatter: daysAgo > 300 ? (index === 2 ? 0.085 : 0.022) : 0.007 }, story: 'improves after corrective action', disposition: 'sort' }) },
  { supplier: 'NORRHAVEN', part: 'KF-1548-A', count: 7, first: 395, last: 30, running: 22, made: () => ({ made: {} }) },
  // Quiet, but for one lot whose rotor stacks differ in strength.
  { supplier: 'NORRHAVEN', part: 'KF-2350-A', count: 6, first: 380, last: 45, running: 51, made: index => index === 3 ? { made: { rotorScatter: 0.15 }, story: 'rotor stacks differ', disposition: 'return-to-supplier' } : { made: {} } },
]

/** About sixty past lots, the oldest first; in the small size a handful with one rejection. */
export function pastLots(today: Date, size: 'small' | 'full'): DemoLot[] {
  const all = SERIES.flatMap((series): DemoLot[] => Array.from({ length: series.count }, (_, index) => {
    const daysAgo = Math.round(series.first - (series.first - series.last) * index / (series.count - 1))
    return {
      supplier: series.supplier, part: series.part, supplierLot: lotNumber(series.supplier, today, daysAgo, series.running + index), quantity: QUANTITIES[(index * 3 + series.running) % QUANTITIES.length]!, daysAgo,
      ...series.made(index, daysAgo),
    }
  }))
  const bad = all.find(lot => lot.part === 'KF-3098-B' && (lot.made.statorScatter ?? 0) > 0.05)!
  const again: DemoLot = { ...bad, supplierLot: `${bad.supplierLot}-S`, quantity: bad.quantity - 60, daysAgo: bad.daysAgo - 14, made: { statorScatter: 0.008 }, resubmissionOf: bad.supplierLot, story: 're-submitted after sorting' }
  const sorted = [...all, again].sort((a, b) => b.daysAgo - a.daysAgo)
  if (size === 'full') return sorted
  const few = sorted.filter(lot => lot.part === 'KF-4412-C' && lot.supplier === 'AMBREL').slice(-4)
  const last = sorted.filter(lot => lot.supplier === 'TUVALO').at(-1)!
  return [...few, last, ...sorted.filter(lot => lot.supplier === 'NORRHAVEN').slice(-1)].map(lot => lot === last ? lot : { ...lot, quantity: 60 }).sort((a, b) => b.daysAgo - a.daysAgo)
}

/** Today's four: one drawn and waiting, one with files of all kinds and two bad ones, one with a file for each direction, one at the gate with its label. */
export function lotsToday(today: Date): WaitingLot[] {
  const common = { daysAgo: 0, serialsListed: true, split: false, dialects: ['plain'] as Dialect[], faults: [] as FileFault[] }
  return [
    { ...common, supplier: 'AMBREL', part: 'KF-4412-C', supplierLot: lotNumber('AMBREL', today, 0, 96), quantity: 160, made: { designPeakToPeakNm: 3.7e-3, rotorScatter: 0.006, statorScatter: 0.006 }, received: true, title: 'Wrist outrunners of Ambrel Coilworks, received this morning' },
    {
      ...common, supplier: 'AMBREL', part: 'KF-3098-B', supplierLot: lotNumber('AMBREL', today, 0, 97), quantity: 240, made: { statorScatter: 0.006, rotorScatter: 0.007 }, received: true, title: 'Shoulder servos, with files of all kinds',
      dialects: ['plain', 'semicolon', 'tab-radian', 'space-run', 'counts-ounce', 'gram-force', 'unnamed', 'plain'], faults: ['text-in-a-number', 'half-a-turn'],
    },
    { ...common, supplier: 'NORRHAVEN', part: 'KF-1548-A', supplierLot: lotNumber('NORRHAVEN', today, 0, 99), quantity: 90, made: {}, received: true, split: true, title: 'Latch steppers, a file for each direction' },
    { ...common, supplier: 'TUVALO', part: 'KF-4412-C', supplierLot: lotNumber('TUVALO', today, 0, 98), quantity: 400, made: { rotorScatter: 0.04 }, received: false, title: 'Wrist outrunners of Tuvalo Precision Drives, at the gate' },
  ]
}

/** Serial of the motor at a position of a lot. */
export function serialOf(lot: Pick<DemoLot, 'supplierLot'>, position: number): string {
  const digits = lot.supplierLot.replaceAll(/\D/g, '')
  return `${digits.slice(-3)}-${String(1000 + position)}`
}

/** How the motor at a position of a lot was made. */
export function specOf(lot: DemoLot, position: number): MotorSpec {
  const good = partOf(lot.part).good
  const worse = lot.outlier && lot.outlier.every > 0 && position % lot.outlier.every === 0 ? lot.outlier.made : {}
  return { ...good, ...lot.made, ...worse }
}

/** Label of a delivery by ISO/IEC 15434, format 06. */
export function labelOf(lot: DemoLot, orderNumber: string): string {
  const fields = [`P${lot.part}`, `Q${lot.quantity}`, `1T${lot.supplierLot}`, `V${lot.supplier}`, `K${orderNumber}`]
  return `[)>\u001E06\u001D${fields.join('\u001D')}\u001E\u0004`
}
