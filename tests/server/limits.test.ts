import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { limitSheets, parts } from '../../server/database/schema/parts'
import { freezeBase } from '../../server/services/drift/freeze-base'
import { getDrift } from '../../server/services/drift/drift-chart'
import { receiveLot } from '../../server/services/lots/receive-lot'
import { changePart } from '../../server/services/parts/manage-parts'
import { getPartPage } from '../../server/services/parts/part-pages'
import { approveSheet, draftSheet, retireSheet, saveDraft, sendSheetBack, submitSheet } from '../../server/services/parts/sheet-life'
import { getSheetInForce } from '../../server/services/parts/sheet-in-force'
import { addCalibration, addRig, getRigPage } from '../../server/services/rigs/manage-rigs'
import { addPlant, as, delivery, openTestServices, PASSWORD, SHEET } from './support/services'

function opened() {
  const { services, setTime } = openTestServices()
  const plant = addPlant(services)
  return { services, setTime, ...plant, author: as(services, plant.engineer), approver: as(services, plant.secondEngineer), inspecting: as(services, plant.inspector) }
}
const tighter = { ...SHEET, limits: SHEET.limits.map(limit => limit.key === 'order.12' ? { ...limit, upper: 0.4e-3 } : limit) }
const signature = { password: PASSWORD, reason: 'agreed', effectiveFrom: '2026-12-01' }

describe('a limit sheet', () => {
  it('goes from draft to force by two people; lots received before keep theirs', async () => {
    const { services, setTime, author, approver, inspecting, part } = opened()
    const before = receiveLot(inspecting, delivery(20, 'TV-before'))
    const { id } = draftSheet(author, 'KF-4412-C')
    saveDraft(author, id, { content: tighter, reason: 'felt at the handle' })
    submitSheet(author, id)
    await expect(approveSheet(author, id, signature)).rejects.toMatchObject({ code: 'forbidden' })
    await approveSheet(approver, id, signature)
    setTime('2026-12-01T09:00:00.000Z')
    expect(getSheetInForce(services.db, part, '2026-12-01T09:00:00.000Z').version).toBe(2)
    expect(getSheetInForce(services.db, part, '2026-12-01T07:59:59.000Z').version).toBe(1)
    expect(before.number).toBe('26-0001')
    const page = getPartPage(author, 'KF-4412-C')
    expect(page.sheets.map(sheet => [sheet.version, sheet.inForce])).toEqual([[2, true], [1, false]])
    expect(page.sheets[0]!.changes).toEqual([expect.stringMatching(/^Order 12: at most 600.* → at most 400/)])
  })

  it('is sent back with a reason, and is then a draft again', () => {
    const { author, approver, services } = opened()
    const { id } = draftSheet(author, 'KF-4412-C')
    saveDraft(author, id, { content: tighter, reason: 'tighter' })
    submitSheet(author, id)
    expect(() => saveDraft(author, id, { content: SHEET, reason: 'x' })).toThrow(/submitted for approval/)
    sendSheetBack(approver, id, 'too tight')
    expect(services.db.select().from(limitSheets).where(eq(limitSheets.id, id)).get()).toMatchObject({ state: 'draft', approvalReason: 'too tight' })
  })

  it('cannot be changed once approved, nor retired without the password', async () => {
    const { author, services, sheet } = opened()
    expect(() => saveDraft(author, sheet.id, { content: tighter, reason: 'quietly' })).toThrow(/is approved/)
    await expect(retireSheet(author, sheet.id, { password: 'wrong', reason: 'old' })).rejects.toMatchObject({ code: 'wrong-password' })
    expect(services.db.select().from(limitSheets).get()!.content).toEqual(SHEET)
  })

  it('takes no effect in the past, and has one draft at a time', async () => {
    const { author, approver } = opened()
    const { id } = draftSheet(author, 'KF-4412-C')
    expect(() => draftSheet(author, 'KF-4412-C')).toThrow(/a draft already/)
    expect(() => submitSheet(author, id)).toThrow(/what changed and why/)
    saveDraft(author, id, { content: tighter, reason: 'tighter' })
    submitSheet(author, id)
    await expect(approveSheet(approver, id, { ...signature, effectiveFrom: '2026-11-30' })).rejects.toMatchObject({ details: { fields: [{ field: 'effectiveFrom' }] } })
  })

  it('is refused when no measurement could be judged by it', () => {
    const { author, services } = opened()
    const { id } = draftSheet(author, 'KF-4412-C')
    const order = { key: 'order.253', lower: null, upper: 1e-3, unit: 'N·m' as const, class: 'major' as const }
    // 12 slots and 14 poles: design order 84, so 252 is the highest order analysed.
    expect(() => saveDraft(author, id, { content: { ...SHEET, limits: [order] }, reason: 'x' })).toThrow(/above the highest order analysed for this part, 252/)
    saveDraft(author, id, { content: { ...SHEET, limits: [{ ...order, key: 'order.252' }] }, reason: 'x' })
    services.db.update(parts).set({ ratedTorqueNm: null }).run()
    expect(() => saveDraft(author, id, { content: SHEET, reason: 'x' })).toThrow(/no rated torque/)
  })
})

describe('a part', () => {
  it('keeps slots and poles once lots were received, but takes another name', () => {
    const { author, inspecting } = opened()
    const input = { number: 'KF-4412-C', name: 'Wrist outrunner', revision: 'C', design: { kind: 'brushless' as const, slots: 12, poles: 14 }, ratedTorqueNm: 0.1, suppliers: [{ code: 'TUVALO' }] }
    receiveLot(inspecting, delivery(20))
    expect(() => changePart(author, 'KF-4412-C', { ...input, design: { ...input.design, poles: 16 } })).toThrow(/they cannot change/)
    changePart(author, 'KF-4412-C', input)
    expect(getPartPage(author, 'KF-4412-C').name).toBe('Wrist outrunner')
  })
})

describe('a rig', () => {
  it('measures only with a calibration on record', () => {
    const { author } = opened()
    addRig(author, { code: 'tr-9', name: 'Rig 9', method: 'torque-sensor', properties: { rangeNm: 1, torqueResolutionNm: 0, torqueRelativeUncertainty: 0, torqueAbsoluteUncertaintyNm: 0, angleResolutionRad: 0, bandwidthHz: null } })
    expect(getRigPage(author, 'TR-9')).toMatchObject({ usable: false, calibrations: [] })
    const calibration = { certificateNumber: 'C-1', laboratory: 'L', performedOn: '2026-11-01', dueOn: '2027-11-01', torqueRelativeUncertainty: 0.001, torqueAbsoluteUncertaintyNm: 1e-6 }
    expect(() => addCalibration(author, 'TR-9', { ...calibration, performedOn: '2026-12-02' })).toThrow(/in the future/)
    expect(() => addCalibration(author, 'TR-9', { ...calibration, dueOn: '2026-11-01' })).toThrow()
    addCalibration(author, 'TR-9', calibration)
    expect(getRigPage(author, 'TR-9')).toMatchObject({ usable: true, dueOn: '2027-11-01' })
  })
})

describe('a base period', () => {
  it('is frozen with a version; a supplier’s contact sees its own charts only', () => {
    const { services, author, contact, inspecting } = opened()
    receiveLot(inspecting, delivery(20))
    const base = { supplier: 'TUVALO', part: 'KF-4412-C', key: 'cogging.peakToPeak', fromDate: '2026-01-01', toDate: '2026-06-30', reason: 'quiet half year' }
    expect([freezeBase(author, base).version, freezeBase(author, base).version]).toEqual([1, 2])
    expect(() => freezeBase(author, { ...base, key: 'order.x' })).toThrow(/no such characteristic/)
    expect(getDrift(as(services, contact), { supplier: '', part: '', key: '' }).choices).toMatchObject([{ supplier: 'TUVALO' }])
    expect(getDrift(as(services, { ...contact, supplierId: 999 }), { supplier: 'TUVALO', part: 'KF-4412-C', key: '' })).toEqual({ choices: [], keys: [], chart: null })
  })
})
