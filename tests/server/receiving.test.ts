import { asc, eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { drawSample } from '#shared/compute/sampling/draw'
import { lots, samples } from '../../server/database/schema/lots'
import { limitSheets } from '../../server/database/schema/parts'
import { receiveLot } from '../../server/services/lots/receive-lot'
import { scan } from '../../server/services/lots/scan'
import { addPlant, as, delivery, openTestServices } from './support/services'

function plant() {
  const { services } = openTestServices()
  const people = addPlant(services)
  return { services, ...people, inspecting: as(services, people.inspector) }
}

describe('receiveLot', () => {
  it('stores the plan, and a sample that anyone can draw again from the stored seed', () => {
    const { services, inspecting } = plant()
    const { number } = receiveLot(inspecting, delivery(400))
    const lot = services.db.select().from(lots).where(eq(lots.number, number)).get()!
    const drawn = services.db.select().from(samples).where(eq(samples.lotId, lot.id)).orderBy(asc(samples.drawOrder)).all()
    // Level II, 281 to 500: letter H, n = 50 (MIL-STD-105E, tables I and II-A).
    expect(lot.plan).toMatchObject({ codeLetter: 'H', n: 50, severity: 'normal' })
    expect(drawn.map(row => row.position)).toEqual(drawSample({ lotSize: 400, n: 50, seed: lot.drawSeed }))
    expect(drawn.every(row => row.serial === `71-${String(row.position).padStart(4, '0')}`)).toBe(true)
    expect(lot).toMatchObject({ number: '26-0001', state: 'drawn' })
  })

  it('leaves positions without serials when the delivery lists none', () => {
    const { services, inspecting } = plant()
    receiveLot(inspecting, { ...delivery(20), serials: [] })
    expect(services.db.select().from(samples).all().every(row => row.serial === null)).toBe(true)
  })

  it('refuses a second receipt of a lot and leads to the first', () => {
    const { services, inspecting } = plant()
    const { number } = receiveLot(inspecting, delivery(20))
    expect(() => receiveLot(inspecting, delivery(20))).toThrow(expect.objectContaining({ code: 'conflict', details: expect.objectContaining({ link: `/lots/${number}` }) }))
    expect(services.db.select().from(lots).all()).toHaveLength(1)
  })

  it.each([
    ['one serial too few', { serials: Array.from({ length: 19 }, (_, index) => `s${index}`) }, 'serials'],
    ['a serial twice', { serials: Array.from({ length: 20 }, (_, index) => `s${Math.min(index, 18)}`) }, 'serials'],
    ['an unknown supplier', { supplierCode: 'NOBODY' }, 'supplierCode'],
    ['an unknown part', { partNumber: 'KF-0000' }, 'partNumber'],
    ['a re-submission of nothing', { resubmissionOf: '25-0001' }, 'resubmissionOf'],
  ])('refuses %s, naming the field, and writes nothing', (_, wrong, field) => {
    const { services, inspecting } = plant()
    expect(() => receiveLot(inspecting, { ...delivery(20), ...wrong })).toThrow(expect.objectContaining({ code: 'invalid-input', details: expect.objectContaining({ fields: [expect.objectContaining({ field })] }) }))
    expect(services.db.select().from(lots).all()).toHaveLength(0)
    expect(receiveLot(inspecting, delivery(20)).number).toBe('26-0001')
  })

  it('refuses a part without an approved sheet', () => {
    const { services, inspecting, sheet } = plant()
    services.db.update(limitSheets).set({ state: 'draft' }).where(eq(limitSheets.id, sheet.id)).run()
    expect(() => receiveLot(inspecting, delivery(20))).toThrow(/no approved limit sheet/)
  })
})

describe('scan', () => {
  it('opens a known lot, motor and rig by their own numbers', () => {
    const { services, inspecting } = plant()
    const { number } = receiveLot(inspecting, delivery(20))
    const serial = services.db.select().from(samples).get()!.serial!
    expect(scan(inspecting, 'TV-2611-083')).toMatchObject({ kind: 'open', link: `/lots/${number}` })
    expect(scan(inspecting, number)).toMatchObject({ kind: 'open', link: `/lots/${number}` })
    expect(scan(inspecting, serial)).toMatchObject({ kind: 'open', link: `/lots/${number}/motors/${serial}` })
    expect(scan(inspecting, 'tr-2')).toMatchObject({ kind: 'open', link: '/rigs/TR-2' })
  })

  it('fills the receiving form from a label of an unknown delivery, by our part number or the supplier’s', () => {
    const { inspecting } = plant()
    const form = { supplierCode: 'TUVALO', partNumber: 'KF-4412-C', supplierLot: 'TV-1', quantity: 40, orderNumber: 'PO-7' }
    expect(scan(inspecting, '[)>\u001E06\u001DPKF-4412-C\u001DQ40\u001D1TTV-1\u001DVTUVALO\u001DKPO-7\u001E\u0004')).toMatchObject({ kind: 'receive', form })
    expect(scan(inspecting, '[)>\u001E06\u001D1PTV-OR-1214\u001DQ40\u001D1TTV-1\u001DVTUVALO\u001DKPO-7\u001E\u0004')).toMatchObject({ kind: 'receive', form })
  })

  it('asks when a text fits two things', () => {
    const { inspecting } = plant()
    receiveLot(inspecting, delivery(2, 'TR-2'))
    expect(scan(inspecting, 'TR-2')).toMatchObject({ kind: 'choose', choices: [{ link: '/lots/26-0001' }, { link: '/rigs/TR-2' }] })
  })
})
