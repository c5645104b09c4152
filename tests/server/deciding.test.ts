import { asc, eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { decisions, lots, samples } from '../../server/database/schema/lots'
import { logbook } from '../../server/database/schema/logbook'
import { papers } from '../../server/database/schema/papers'
import { nonconformances, notices } from '../../server/database/schema/returns'
import { makeMotor } from '../../server/database/seed/generator/motor-model'
import { makeRandom } from '../../server/database/seed/generator/random'
import { renderFile } from '../../server/database/seed/generator/render-file'
import { sha256Hex } from '../../server/files/store'
import { verifySignature } from '../../server/papers/keys'
import { checkLogbook } from '../../server/services/logbook/check-logbook'
import { decideLot } from '../../server/services/lots/decide-lot'
import { gatherEvidence } from '../../server/services/lots/evidence'
import { getLot } from '../../server/services/lots/find-lot'
import { receiveLot } from '../../server/services/lots/receive-lot'
import { severityOfNextLot } from '../../server/services/lots/severity'
import { recordUpload } from '../../server/services/measuring/record-upload'
import { addPlant, as, delivery, openTestServices, OUTRUNNER, PASSWORD } from './support/services'

/** Level II, 51 to 90 motors: letter E, n = 13; AQL 2.5: accept on 1, reject on 2 (MIL-STD-105E, table II-A). */
const QUANTITY = 60

function opened() {
  const { services, woken } = openTestServices()
  const people = addPlant(services)
  return { services, woken, ...people, inspecting: as(services, people.inspector) }
}

/** Receives a lot and measures so many motors of it, the first ones bad. */
async function measured(plant: ReturnType<typeof opened>, bad: number, supplierLot: string, count = Infinity) {
  const { inspecting, services } = plant
  const { number } = receiveLot(inspecting, delivery(QUANTITY, supplierLot))
  const lot = getLot(inspecting, number)
  const drawn = services.db.select().from(samples).where(eq(samples.lotId, lot.id)).orderBy(asc(samples.drawOrder)).all().slice(0, count)
  for (const [index, sample] of drawn.entries()) {
    const motor = makeMotor({ design: OUTRUNNER, designPeakToPeakNm: index < bad ? 9e-3 : 3.5e-3, rotorScatter: 0.004, statorScatter: 0.004, frictionNm: 1.5e-3 }, makeRandom(`${supplierLot}${index}`))
    const made = renderFile({ motor, serial: sample.serial!, dialect: 'plain', rowsPerDirection: 2100, directions: 'both', noiseNm: 5e-6, zeroNm: 0, random: makeRandom(`${supplierLot}${index}s`) })
    await recordUpload(inspecting, { lotNumber: number, rigCode: 'TR-2', reason: '', ...made })
  }
  const evidence = () => gatherEvidence(services.db, getLot(inspecting, number))
  const sign = (outcome: 'accepted' | 'rejected', more: { password?: string; reason?: string; evidenceHash?: string } = {}) =>
    decideLot(inspecting, number, { password: PASSWORD, outcome, evidenceHash: evidence().hash, reason: '', ...more })
  return { number, lot, evidence, sign, state: () => getLot(inspecting, number).state }
}

describe('decideLot', () => {
  it('accepts at the acceptance number: one nonconforming of thirteen', async () => {
    const plant = opened()
    const lot = await measured(plant, 1, 'TV-A')
    expect(lot.state()).toBe('ready')
    const answer = await lot.sign('accepted')
    expect(answer).toMatchObject({ outcome: 'accepted', paperNumber: 'P-2026-000001' })
    expect(lot.state()).toBe('accepted')
    expect(plant.services.db.select().from(nonconformances).all()).toHaveLength(0)
    expect(plant.woken).toContain('papers')
    const paper = plant.services.db.select().from(papers).get()!
    expect(sha256Hex(paper.record)).toBe(paper.recordSha256)
    expect(verifySignature(Buffer.from(paper.record), paper.signature, plant.services.signer.publicKeyPem)).toBe(true)
    expect(checkLogbook(plant.services.db).ok).toBe(true)
  })

  it('rejects at the rejection number, before all motors are measured, and never accepts then', async () => {
    const plant = opened()
    const lot = await measured(plant, 2, 'TV-B', 5)
    expect(lot.evidence().lotVerdict).toMatchObject({ outcome: 'reject', complete: false })
    await expect(lot.sign('accepted')).rejects.toMatchObject({ code: 'conflict' })
    await lot.sign('rejected')
    expect(lot.state()).toBe('on-hold')
    expect(plant.services.db.select().from(nonconformances).all()).toMatchObject([{ number: 'N-2026-0001', state: 'open' }])
    expect(plant.services.db.select().from(notices).all()).toMatchObject([{ recipientAddress: 'quality@tuvalo.example', state: 'queued' }])
  })

  it('decides nothing while the plan is open', async () => {
    const lot = await measured(opened(), 1, 'TV-C', 5)
    await expect(lot.sign('accepted')).rejects.toThrow(/cannot be accepted yet/)
    await expect(lot.sign('rejected', { reason: 'in a hurry' })).rejects.toThrow(/cannot be rejected yet/)
    expect(lot.state()).toBe('measuring')
  })

  it('signs nothing with a wrong password, nor on figures that have changed since they were shown', async () => {
    const plant = opened()
    const lot = await measured(plant, 0, 'TV-D')
    await expect(lot.sign('accepted', { password: 'something else' })).rejects.toMatchObject({ code: 'wrong-password' })
    await expect(lot.sign('accepted', { evidenceHash: '0'.repeat(64) })).rejects.toMatchObject({ code: 'evidence-changed' })
    expect(plant.services.db.select().from(decisions).all()).toHaveLength(0)
    expect(lot.state()).toBe('ready')
  })

  it('lets a person overrule towards rejection only, with a reason, once', async () => {
    const plant = opened()
    const lot = await measured(plant, 0, 'TV-E')
    await expect(lot.sign('rejected')).rejects.toMatchObject({ details: { fields: [{ field: 'reason' }] } })
    await lot.sign('rejected', { reason: 'water in the box' })
    expect(plant.services.db.select().from(decisions).get()).toMatchObject({ outcome: 'rejected', overruled: true, reason: 'water in the box' })
    await expect(lot.sign('rejected', { reason: 'again' })).rejects.toMatchObject({ code: 'conflict' })
  })

  it('writes all of it or nothing: when the mail cannot be written, no decision, number, paper or logbook entry stands', async () => {
    const plant = opened()
    const { services } = plant
    const lot = await measured(plant, 2, 'TV-F', 4)
    const entries = services.db.select().from(logbook).all().length
    services.db.$client.exec('CREATE TRIGGER no_mail BEFORE INSERT ON notices BEGIN SELECT RAISE(ABORT, \'no mail\'); END')
    await expect(lot.sign('rejected')).rejects.toThrow()
    expect([decisions, papers, nonconformances].map(table => services.db.select().from(table).all().length)).toEqual([0, 0, 0])
    expect(services.db.select().from(logbook).all()).toHaveLength(entries)
    expect(lot.state()).toBe('ready')
    services.db.$client.exec('DROP TRIGGER no_mail')
    // The number that was taken back is given out again: no gap.
    expect((await lot.sign('rejected')).paperNumber).toBe('P-2026-000001')
  })

  it('makes the next lot tightened after two of five are rejected', async () => {
    const plant = opened()
    const key = { supplierId: plant.supplier.id, partId: plant.part.id }
    for (const supplierLot of ['TV-G', 'TV-H']) {
      expect(severityOfNextLot(plant.services.db, key).severity).toBe('normal')
      await (await measured(plant, 2, supplierLot, 3)).sign('rejected')
    }
    expect(severityOfNextLot(plant.services.db, key).severity).toBe('tightened')
    receiveLot(plant.inspecting, delivery(QUANTITY, 'TV-I'))
    expect(plant.services.db.select().from(lots).where(eq(lots.supplierLot, 'TV-I')).get()).toMatchObject({ severity: 'tightened', plan: { severity: 'tightened' } })
  })
})
