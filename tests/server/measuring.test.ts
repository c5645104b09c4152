import { asc, eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import type { ColumnRecipe } from '#shared/compute/terms/measurement'
import { lots, samples } from '../../server/database/schema/lots'
import { measurementFiles, measurements, uploads } from '../../server/database/schema/measurements'
import { calibrations } from '../../server/database/schema/rigs'
import { spoil } from '../../server/database/seed/generator/faults'
import { makeMotor } from '../../server/database/seed/generator/motor-model'
import { makeRandom } from '../../server/database/seed/generator/random'
import { renderFile } from '../../server/database/seed/generator/render-file'
import type { Dialect } from '../../server/database/seed/generator/render-file'
import { receiveLot } from '../../server/services/lots/receive-lot'
import { assignUpload } from '../../server/services/measuring/tray'
import { recordUpload } from '../../server/services/measuring/record-upload'
import { voidMeasurement } from '../../server/services/measuring/void-measurement'
import { confirmRecipe } from '../../server/services/rigs/confirm-recipe'
import { addPlant, as, delivery, openTestServices, OUTRUNNER } from './support/services'

function file(serial: string, options: { dialect?: Dialect; directions?: 'both' | 'forward' | 'reverse'; scatter?: number; seed?: string } = {}) {
  const motor = makeMotor({ design: OUTRUNNER, designPeakToPeakNm: 3.9e-3, rotorScatter: options.scatter ?? 0.005, statorScatter: 0.005, frictionNm: 1.5e-3 }, makeRandom(`${serial}${options.seed ?? ''}`))
  return renderFile({ motor, serial, dialect: options.dialect ?? 'plain', rowsPerDirection: 2400, directions: options.directions ?? 'both', noiseNm: 8e-6, zeroNm: 2e-5, random: makeRandom(`sweep ${serial}${options.seed ?? ''}`) })
}

function received(quantity = 20) {
  const { services } = openTestServices()
  const people = addPlant(services)
  const inspecting = as(services, people.inspector)
  const { number } = receiveLot(inspecting, delivery(quantity))
  const drawn = services.db.select().from(samples).orderBy(asc(samples.drawOrder)).all()
  const upload = (made: { name: string; bytes: Uint8Array }, reason = '') => recordUpload(inspecting, { lotNumber: number, rigCode: 'TR-2', reason, ...made })
  return { services, ...people, inspecting, number, drawn, serial: drawn[0]!.serial!, upload, state: () => services.db.select().from(lots).get()!.state }
}

describe('recordUpload', () => {
  it('judges a file with both directions, keeps figures and file, and moves the lot on', async () => {
    const { services, serial, upload, state } = received()
    const answer = await upload(file(serial))
    expect(answer).toMatchObject({ state: 'judged', serial, verdict: 'pass' })
    expect(answer.sentence).toMatch(/conforms, \d\.\d\d mN·m peak to peak/)
    expect(state()).toBe('measuring')
    expect(services.db.select().from(measurementFiles).all()).toHaveLength(1)
  })

  it('joins a forward and a reverse file into one measurement', async () => {
    const { services, serial, upload } = received()
    const first = await upload(file(serial, { directions: 'forward' }))
    expect(first).toMatchObject({ state: 'incomplete', verdict: null })
    expect(services.db.select().from(measurements).all()).toHaveLength(0)
    expect(await upload(file(serial, { directions: 'reverse' }))).toMatchObject({ state: 'judged', verdict: 'pass' })
    expect(services.db.select().from(measurements).all()).toMatchObject([{ attempt: 1 }])
    expect(services.db.select().from(measurementFiles).all()).toHaveLength(2)
    expect(services.db.select().from(uploads).all().map(row => row.state)).toEqual(['judged', 'judged'])
  })

  it('puts a file that names no drawn motor into the tray, from where a person assigns it', async () => {
    const { inspecting, serial, upload } = received()
    const answer = await upload({ ...file(serial), name: 'map-of-this-morning.csv' })
    expect(answer).toMatchObject({ state: 'tray', serial: null })
    expect(await assignUpload(inspecting, { id: answer.id, serial, reason: '' })).toMatchObject({ state: 'judged', serial, verdict: 'pass' })
    await expect(assignUpload(inspecting, { id: answer.id, serial, reason: '' })).rejects.toMatchObject({ code: 'conflict' })
  })

  it('says that a motor of the lot was not drawn', async () => {
    const { drawn, upload } = received(400)
    const other = Array.from({ length: 400 }, (_, index) => index + 1).find(position => !drawn.some(row => row.position === position))!
    expect((await upload(file(`71-${String(other).padStart(4, '0')}`))).sentence).toMatch(/was not drawn/)
  })

  it('keeps a file that cannot be judged with code, line and remedy; the good one then counts', async () => {
    const { services, serial, upload } = received()
    const refused = await upload(spoil(file(serial), 'text-in-a-number'))
    expect(refused).toMatchObject({ state: 'refused', verdict: null, fault: { code: 'not-numeric' } })
    expect(refused.fault!.line).toBeGreaterThan(1)
    expect(refused.fault!.remedy.length).toBeGreaterThan(10)
    expect(await upload(file(serial))).toMatchObject({ state: 'judged' })
    expect(services.db.select().from(uploads).all().map(row => row.state)).toEqual(['refused', 'judged'])
  })

  it('asks for a unit that the header does not name, once for the rig', async () => {
    const { inspecting, drawn, upload } = received()
    const asked = await upload(file(drawn[0]!.serial!, { dialect: 'unnamed' }))
    expect(asked).toMatchObject({ state: 'refused', fault: { code: 'unit-not-named' } })
    const recipe: ColumnRecipe = { ...asked.recipe!, columns: asked.recipe!.columns.map(column => ({ ...column, unit: column.unit ?? 'mN·m' })) }
    expect(() => confirmRecipe(inspecting, 'TR-2', asked.recipe!)).toThrow(/still open/)
    confirmRecipe(inspecting, 'TR-2', recipe)
    expect(await upload(file(drawn[0]!.serial!, { dialect: 'unnamed' }))).toMatchObject({ state: 'judged', verdict: 'pass' })
    expect(await upload(file(drawn[1]!.serial!, { dialect: 'unnamed' }))).toMatchObject({ state: 'judged', verdict: 'pass' })
    // A header that names its unit is read by it, whatever the rig's answer was.
    expect(await upload(file(drawn[2]!.serial!, { dialect: 'counts-ounce' }))).toMatchObject({ state: 'judged', verdict: 'pass' })
  })

  it('answers the same file again as the first time and doubles nothing', async () => {
    const { services, serial, upload } = received()
    const first = await upload(file(serial))
    expect(await upload(file(serial))).toEqual(first)
    expect(services.db.select().from(measurements).all()).toHaveLength(1)
  })

  it('refuses the very file of another motor', async () => {
    const { drawn, upload } = received()
    const made = file(drawn[0]!.serial!)
    await upload(made)
    expect(await upload({ ...made, name: `${drawn[1]!.serial}.csv` })).toMatchObject({ state: 'refused', fault: { code: 'file-of-another-motor' } })
  })

  it('wants a reason for measuring again; the first valid attempt counts until it is voided', async () => {
    const { services, engineer, serial, upload } = received()
    await upload(file(serial))
    const again = file(serial, { scatter: 0.09, seed: 'again' })
    await expect(upload(again)).rejects.toMatchObject({ code: 'conflict', details: { fields: [{ field: 'reason' }] } })
    await upload(again, 'coupling was loose')
    const [first, second] = services.db.select().from(measurements).orderBy(asc(measurements.attempt)).all()
    expect(second).toMatchObject({ attempt: 2, reason: 'coupling was loose' })
    voidMeasurement(as(services, engineer), { id: first!.id, reason: 'coupling was loose' })
    expect(services.db.select().from(measurements).where(eq(measurements.id, first!.id)).get()).toMatchObject({ voidReason: 'coupling was loose' })
    expect(() => voidMeasurement(as(services, engineer), { id: first!.id, reason: 'twice' })).toThrow(/void already/)
  })

  it('takes nothing from a rig whose calibration ended yesterday, and takes it on its last day', async () => {
    const { services, serial, upload } = received()
    services.db.update(calibrations).set({ dueOn: '2026-11-30' }).run()
    await expect(upload(file(serial))).rejects.toMatchObject({ code: 'refused' })
    expect(services.db.select().from(uploads).all()).toHaveLength(0)
    services.db.update(calibrations).set({ dueOn: '2026-12-01' }).run()
    expect(await upload(file(serial))).toMatchObject({ state: 'judged' })
  })

  it.each(['semicolon', 'tab-radian', 'space-run', 'counts-ounce', 'gram-force'] as const)('reads the same figure from a %s file', async (dialect) => {
    const { services, serial, upload } = received()
    await upload(file(serial, { dialect }))
    const value = services.db.select().from(measurements).get()!.result.characteristics.find(row => row.key === 'cogging.peakToPeak')!.value!
    const truth = makeMotor({ design: OUTRUNNER, designPeakToPeakNm: 3.9e-3, rotorScatter: 0.005, statorScatter: 0.005, frictionNm: 1.5e-3 }, makeRandom(serial)).truth().peakToPeakNm
    expect(Math.abs(value / truth - 1)).toBeLessThan(0.015)
  })
})
