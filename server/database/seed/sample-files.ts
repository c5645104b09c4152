import { spoil } from './generator/faults'
import { makeMotor } from './generator/motor-model'
import { makeRandom } from './generator/random'
import { renderFile } from './generator/render-file'
import type { Dialect, RenderedFile } from './generator/render-file'
import { serialOf, specOf } from './scenario/lots'
import type { DemoLot, WaitingLot } from './scenario/lots'
import { partOf } from './scenario/parts'

/** The file that a rig would write of the motor at a position of a demo lot; the same every time. */
export function sampleFile(lot: DemoLot, position: number, options: { dialect?: Dialect; directions?: 'both' | 'forward' | 'reverse'; serial?: string } = {}): RenderedFile {
  const serial = serialOf(lot, position)
  const part = partOf(lot.part)
  const motor = makeMotor(specOf(lot, position), makeRandom(`${lot.supplierLot}/${serial}/motor`))
  return renderFile({
    motor, serial: options.serial ?? serial, dialect: options.dialect ?? 'plain', rowsPerDirection: part.rowsPerDirection, directions: options.directions ?? 'both',
    noiseNm: 2e-4 * part.good.designPeakToPeakNm * 10, zeroNm: 3e-4 * part.ratedTorqueNm, random: makeRandom(`${lot.supplierLot}/${serial}/sweep`),
  })
}

/** Files of all drawn motors of a waiting lot, in the ways of writing and with the faults that the scenario gives it. */
export function waitingFiles(lot: WaitingLot, drawn: readonly { position: number; serial: string | null }[]): RenderedFile[] {
  return drawn.flatMap((sample, index): RenderedFile[] => {
    const dialect = lot.dialects[index % lot.dialects.length]!
    const serial = sample.serial ?? serialOf(lot, sample.position)
    const fault = lot.faults[index]
    if (fault) {
      const good = sampleFile(lot, sample.position, { dialect: 'plain', serial })
      return [{ ...spoil(good, fault), name: good.name.replace('.csv', '_first-try.csv') }, good]
    }
    if (lot.split) return (['forward', 'reverse'] as const).map(directions => sampleFile(lot, sample.position, { dialect, serial, directions }))
    return [sampleFile(lot, sample.position, { dialect, serial })]
  })
}
