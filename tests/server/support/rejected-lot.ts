import { createHash, randomBytes } from 'node:crypto'
import { expect } from 'vitest'
import type { CharacteristicVerdict, MotorVerdict } from '#shared/compute/terms/judgement'
import type { MapResult } from '#shared/compute/terms/measurement'
import { decisions, lots, samples } from '../../../server/database/schema/lots'
import { measurementFiles, measurements, rawFiles } from '../../../server/database/schema/measurements'
import { papers, signingKeys } from '../../../server/database/schema/papers'
import { calibrations } from '../../../server/database/schema/rigs'
import type { Services } from '../../../server/services/context'
import { openNonconformance } from '../../../server/services/returns/open-nonconformance'
import type { addPlant } from './services'

type Plant = ReturnType<typeof addPlant>

/** A judged motor: cogging of 6.83 mN·m against 5.4 mN·m when it fails, with order 14 strong; 4.10 mN·m otherwise. */
function figures(failing: boolean): { result: MapResult; judgement: MotorVerdict } {
  const value = failing ? 6.83e-3 : 4.1e-3
  const reason = failing ? '6.83 mN·m is above the limit 5.40 mN·m by 1.43 mN·m.' : '4.10 mN·m is below the limit 5.40 mN·m by 1.30 mN·m.'
  const row: CharacteristicVerdict = { key: 'cogging.peakToPeak', value, expandedUncertainty: 0.05e-3, lower: null, upper: 5.4e-3, unit: 'N·m', class: 'major', verdict: failing ? 'fail' : 'pass', probabilityOfConformity: failing ? 0 : 1, reason }
  const amplitudeNm = failing ? 2.4e-3 : 0.3e-3
  const result: MapResult = {
    engineVersion: 'test', method: 'torque-sensor', rows: 4000, turns: 2, directions: 'both', highestOrder: 84, zeroNm: 0,
    cogging: { meanNm: 0, cosNm: Array.from({ length: 84 }, (_, index) => index === 13 ? amplitudeNm : 0), sinNm: Array.from({ length: 84 }, () => 0) }, friction: null,
    orders: [{ order: 14, amplitudeNm, phaseDeg: 0, expandedUncertaintyNm: 0.01e-3, significant: true, origins: ['statorSide'], reason: 'a multiple of the poles' }],
    characteristics: [{ key: 'cogging.peakToPeak', value, unit: 'N·m', expandedUncertainty: 0.05e-3 }], warnings: [], recipe: { version: 1, columns: [] },
  }
  return { result, judgement: { verdict: failing ? 'fail' : 'pass', characteristics: [row], nonconformingClasses: failing ? ['major'] : [] } }
}

/** A measured lot with three conforming and two nonconforming motors, decided as rejected, with a certificate whose PDF is drawn or not, and the nonconformance opened by the service. */
export async function rejectLot(services: Services, plant: Plant, details: { supplierLot?: string; supplierId?: number; pdf?: Uint8Array | null } = {}) {
  const at = services.clock().toISOString()
  const supplierLot = details.supplierLot ?? 'TV-2611-083'
  const number = `26-${randomBytes(3).toString('hex')}`
  const file = await services.files.put(Buffer.from(`angle,torque\n${number}`))
  const pdfSha256 = details.pdf ? await services.files.put(details.pdf) : null
  return services.db.transaction((tx) => {
    const sentence = '2 of 5 motors are nonconforming; rejected on 2.'
    const lot = tx.insert(lots).values({
      number, supplierId: details.supplierId ?? plant.supplier.id, partId: plant.part.id, supplierLot, quantity: 1200, orderNumber: 'PO-7731', state: 'rejected', sheetId: plant.sheet.id, severity: 'normal', severityReason: 'first lots',
      plan: { lotSize: 1200, scheme: { kind: 'fixed', n: 5 }, severity: 'normal', codeLetter: null, n: 5, classes: [{ class: 'major', aql: null, n: 5, ac: 1, re: 2 }], sentence: 'Draw 5 of 1 200.' },
      drawSeed: '00', drawGenerator: 'test', receivedById: plant.inspector.personId, receivedAt: at, decidedAt: at,
    }).returning().get()
    tx.insert(rawFiles).values({ sha256: file, size: 20, storedAt: at }).run()
    const calibration = tx.select().from(calibrations).get()!
    for (let drawOrder = 1; drawOrder <= 5; drawOrder++) {
      const { result, judgement } = figures(drawOrder > 3)
      const sample = tx.insert(samples).values({ lotId: lot.id, drawOrder, position: drawOrder * 7, serial: `71-000${drawOrder}` }).returning().get()
      const measurement = tx.insert(measurements).values({
        lotId: lot.id, sampleId: sample.id, attempt: 1, method: 'torque-sensor', rigId: plant.rig.id, calibrationId: calibration.id, sheetId: plant.sheet.id, engineVersion: 'test',
        result, verdict: judgement.verdict, judgement, measuredById: plant.inspector.personId, measuredAt: at,
      }).returning().get()
      tx.insert(measurementFiles).values({ measurementId: measurement.id, ordinal: 0, sha256: file, name: `${sample.serial}.csv` }).run()
    }
    const decision = tx.insert(decisions).values({
      lotId: lot.id, outcome: 'rejected', overruled: false, lotVerdict: { outcome: 'reject', complete: true, judged: 5, classes: [], sentence, returnToNormal: false }, evidenceHash: 'a'.repeat(64),
      signedById: plant.inspector.personId, signedAt: at,
    }).returning().get()
    tx.insert(signingKeys).values({ id: 'test', publicKeyPem: 'test', createdAt: at }).onConflictDoNothing().run()
    const paper = tx.insert(papers).values({
      number: `C-${number}`, kind: 'rejection', lotId: lot.id, decisionId: decision.id, token: createHash('md5').update(number).digest('hex'), record: '{}', recordSha256: 'b'.repeat(64), signature: 'c', keyId: 'test',
      state: 'issued', issuedById: plant.inspector.personId, issuedAt: at, pdfSha256, pdfDrawnAt: pdfSha256 ? at : null,
    }).returning().get()
    const opened = openNonconformance(services, tx, { actorId: plant.inspector.personId, lotId: lot.id, paperId: paper.id })
    expect(opened.number).toMatch(/^N-2026-\d{4}$/)
    return { lot, paper, decision, file, ...opened }
  })
}
