import { describe, expect, it } from 'vitest'
import { spoil } from '../../server/database/seed/generator/faults'
import { makeMotor } from '../../server/database/seed/generator/motor-model'
import type { ModelMotor, MotorSpec } from '../../server/database/seed/generator/motor-model'
import { makeRandom } from '../../server/database/seed/generator/random'
import { renderFile } from '../../server/database/seed/generator/render-file'
import type { Dialect, SweepInput } from '../../server/database/seed/generator/render-file'
import { scenario } from '../../server/database/seed/scenario'
import { labelOf, serialOf, specOf } from '../../server/database/seed/scenario/lots'
import type { DemoLot } from '../../server/database/seed/scenario/lots'
import { partOf } from '../../server/database/seed/scenario/parts'
import type { Limit } from '#shared/compute/terms/judgement'

const WRIST: MotorSpec = { design: { kind: 'brushless', slots: 12, poles: 14 }, designPeakToPeakNm: 4e-3, rotorScatter: 0, statorScatter: 0, frictionNm: 1.5e-3 }
const make = (made: Partial<MotorSpec> = {}, seed: number | string = 1) => makeMotor({ ...WRIST, ...made }, makeRandom(seed))

/** Amplitude of one order by the plain sum over 2 000 equal steps. */
function amplitudeByDirectSum(value: (angleRad: number) => number, order: number, steps = 2000): number {
  let [re, im] = [0, 0]
  for (let step = 0; step < steps; step++) {
    const angle = 2 * Math.PI * step / steps
    re += value(angle) * Math.cos(order * angle)
    im += value(angle) * Math.sin(order * angle)
  }
  return 2 * Math.hypot(re, im) / steps
}

/** Orders above a millionth of the design's peak to peak, by direct sums. */
function ordersOf(motor: ModelMotor): number[] {
  return Array.from({ length: 252 }, (_, index) => index + 1).filter(order => amplitudeByDirectSum(motor.torqueNm, order) > 1e-6 * WRIST.designPeakToPeakNm)
}

describe('makeMotor', () => {
  it('has the harmonics that it states, found again by direct sums over the turn', () => {
    const motor = make({ rotorScatter: 0.03, statorScatter: 0.03 })
    const stated = new Map(motor.truth().harmonics.map(row => [row.order, row.amplitudeNm]))
    for (let order = 1; order <= 180; order++) expect(Math.abs(amplitudeByDirectSum(motor.torqueNm, order) - (stated.get(order) ?? 0)), `order ${order}`).toBeLessThan(2e-6 * WRIST.designPeakToPeakNm)
  })

  it('gives the sum of its harmonics at any angle, also between the points of its table and beyond one turn', () => {
    const motor = make({ rotorScatter: 0.03, statorScatter: 0.03 })
    for (const angle of [-7.001, -0.1, 0, 1e-5, 0.123456, 2.5, 6.2831, 6.2832, 40.4]) {
      const sum = motor.harmonics.reduce((total, row) => total + row.amplitudeNm * Math.cos(row.order * angle + row.phaseRad), 0)
      expect(Math.abs(motor.torqueNm(angle) - sum)).toBeLessThan(4e-6 * WRIST.designPeakToPeakNm)
    }
  })

  it('leaves only multiples of lcm(Q, 2p) and the stated peak to peak when all parts are alike', () => {
    const motor = make()
    expect(ordersOf(motor)).toEqual([84, 168])
    expect(motor.truth().peakToPeakNm).toBeCloseTo(4e-3, 7)
  })

  it('is the sum of what every slot does to every magnet, weighed by the gap at each, added up one by one', () => {
    const [slots, poles, standing, turning] = [9, 8, 0.1, 0.06]
    const edge = (x: number) => Array.from({ length: 144 }, (_, index) => index + 1).reduce((sum, order) => sum + order ** -0.65 * Math.exp(-2.04 * order / 72) * Math.sin(order * x), 0)
    const ring = (count: number, offset: number, odd: number) => Array.from({ length: count }, (_, index) => ({ angle: 2 * Math.PI * index / count, weight: (index === 2 ? 1 + odd : 1) * (1 - offset * Math.cos(2 * Math.PI * index / count)) ** -2 }))
    const oneByOne = (angle: number, [standingOffset, turningOffset, wide, weak]: number[]) => ring(slots, standingOffset!, wide!).reduce((sum, slot) => sum + ring(poles, turningOffset!, -weak!).reduce((inner, pole) => inner + slot.weight * pole.weight * edge(angle - slot.angle + pole.angle), 0), 0)
    // A turn of a perfect motor repeats 72 times; odd about zero, so the peak to peak is twice the peak.
    const scale = WRIST.designPeakToPeakNm / 2 / Math.max(...Array.from({ length: 200 }, (_, step) => oneByOne(Math.PI / 36 * step / 200, [0, 0, 0, 0])))
    const faults = { staticEccentricity: standing, dynamicEccentricity: turning, wideSlot: 0.2, weakMagnet: 0.15 }
    // The odd slot and the odd magnet are the third ones.
    const motor = makeMotor({ ...WRIST, ...faults, design: { kind: 'brushless', slots, poles } }, { ...makeRandom(1), integer: () => 2 })
    for (const angle of [0.01, 0.4, 1.1, 2.9, 4.4, 6.2]) expect(Math.abs(motor.torqueNm(angle) - scale * oneByOne(angle, [standing, turning, 0.2, 0.15])) / WRIST.designPeakToPeakNm, `at ${angle} rad`).toBeLessThan(1e-3)
  })

  it.each([['scatter of the magnets', { rotorScatter: 0.05 }], ['one weak magnet', { weakMagnet: 0.1 }]])('leaves only multiples of the slots Q with %s', (_, made) => {
    const orders = ordersOf(make(made))
    expect(orders).toContain(12)
    expect(orders.filter(order => order % 12 !== 0)).toEqual([])
  })

  it.each([['scatter of the slots', { statorScatter: 0.05 }], ['one wide slot', { wideSlot: 0.1 }], ['an oval bore', { ovality: 0.05 }]])('leaves only multiples of the poles 2p with %s', (_, made) => {
    const orders = ordersOf(make(made))
    expect(orders).toContain(14)
    expect(orders.filter(order => order % 14 !== 0)).toEqual([])
  })

  it('leaves other orders as well, weaker than either side, when magnets and slots are both unequal', () => {
    const motor = make({ weakMagnet: 0.1, wideSlot: 0.1 })
    const others = motor.harmonics.filter(row => row.order % 12 !== 0 && row.order % 14 !== 0).map(row => row.amplitudeNm)
    const of = (order: number) => motor.harmonics.find(row => row.order === order)!.amplitudeNm
    expect(others.length).toBeGreaterThan(50)
    expect(Math.max(...others)).toBeLessThan(Math.min(of(12), of(14)))
  })

  it.each([
    ['a claw-pole stepper of 12 pole pairs', { kind: 'claw-pole stepper' as const, polePairs: 12 }, 48, 24],
    ['a hybrid stepper of 50 teeth', { kind: 'hybrid stepper' as const, rotorTeeth: 50 }, 200, 50],
  ])('puts the design order of %s at four times its unit and imbalance below it', (_, design, designOrder, imbalance) => {
    const { harmonics } = make({ design, rotorScatter: 0.05, statorScatter: 0.05 })
    expect(harmonics.reduce((most, row) => row.amplitudeNm > most.amplitudeNm ? row : most).order).toBe(designOrder)
    expect(harmonics.map(row => row.order)).toContain(imbalance)
  })

  it('leaves only multiples of the poles with an offset that stands still, and next to nothing new where slots and poles share three equal sectors or more', () => {
    const orders = ordersOf(make({ design: { kind: 'brushless', slots: 9, poles: 8 }, staticEccentricity: 0.1 }))
    expect(orders).toContain(8)
    expect(orders.filter(order => order % 8 !== 0)).toEqual([])
    // 12 slots and 8 poles share four sectors: only the fourth power of the offset reaches an order that is not the design's.
    const sectors = make({ design: { kind: 'brushless', slots: 12, poles: 8 }, staticEccentricity: 0.05 }).truth().harmonics
    const [eight, design] = [8, 24].map(order => sectors.find(row => row.order === order)?.amplitudeNm ?? 0)
    expect(eight! / design!).toBeLessThan(1e-2)
  })

  it('leaves only multiples of the slots with an offset that turns with the rotor', () => {
    const orders = ordersOf(make({ design: { kind: 'brushless', slots: 9, poles: 8 }, dynamicEccentricity: 0.1 }))
    expect(orders).toContain(9)
    expect(orders.filter(order => order % 9 !== 0)).toEqual([])
  })

  it.each([-0.01, 1, Number.NaN])('refuses an offset of %s of the air gap', (staticEccentricity) => {
    expect(() => make({ staticEccentricity })).toThrow(RangeError)
  })

  it('accepts offsets of none and of just under the whole air gap', () => {
    expect(make({ staticEccentricity: 0 }).harmonics).toEqual(make().harmonics)
    expect(() => make({ staticEccentricity: 0.999 })).not.toThrow()
  })

  it('states a peak to peak that the sum of its harmonics reaches, to a hundred-thousandth', () => {
    const motor = make({ design: { kind: 'brushless', slots: 24, poles: 22 }, rotorScatter: 0.03, statorScatter: 0.03 })
    let [least, most] = [Infinity, -Infinity]
    for (let step = 0; step < 131_072; step++) {
      const angle = 2 * Math.PI * step / 131_072
      const value = motor.torqueNm(angle)
      if (value < least) least = value
      if (value > most) most = value
    }
    const sum = (angle: number) => motor.harmonics.reduce((total, row) => total + row.amplitudeNm * Math.cos(row.order * angle + row.phaseRad), 0)
    expect(Math.abs(motor.torqueNm(1.234) - sum(1.234)) / (most - least)).toBeLessThan(1e-5)
    expect(Math.abs(motor.truth().peakToPeakNm / (most - least) - 1)).toBeLessThan(2e-5)
  })

  it('adds hysteresis to friction in the mean, so that it cannot be told from it', () => {
    const without = make()
    const motor = make({ hysteresisNm: 4e-4 })
    const mean = Array.from({ length: 840 }, (_, step) => motor.resistanceNm(2 * Math.PI * step / 840)).reduce((sum, value) => sum + value, 0) / 840
    expect(mean).toBeCloseTo(without.frictionNm + 4e-4, 10)
    expect(motor.frictionNm).toBeCloseTo(without.frictionNm + 4e-4, 10)
  })
})

const sweep = (over: Partial<SweepInput> = {}) => renderFile({ motor: make(), serial: '041-1001', dialect: 'plain', rowsPerDirection: 400, directions: 'both', noiseNm: 0, zeroNm: 2e-4, random: makeRandom('sweep'), ...over })
const textOf = (file: { bytes: Uint8Array }, encoding: BufferEncoding = 'utf8') => Buffer.from(file.bytes).toString(encoding)
const rowsOf = (file: { bytes: Uint8Array }) => textOf(file).trimEnd().split('\n').slice(1).map(row => row.split(','))

describe('renderFile', () => {
  it('writes the same bytes from the same seed, and others from another', () => {
    const file = (seed: number | string) => textOf(sweep({ motor: make({ rotorScatter: 0.02 }, seed), noiseNm: 1e-5, random: makeRandom(seed) }))
    expect(file('041-1001')).toBe(file('041-1001'))
    expect(file(7)).toBe(file(7))
    expect(file('041-1002')).not.toBe(file('041-1001'))
  })

  it('has half the difference of the directions as friction and the zero as their mean', () => {
    const rows = rowsOf(sweep({ rowsPerDirection: 8000 }))
    const mean = (word: string) => rows.filter(row => row[0] === word).reduce((sum, row) => sum + Number(row[2]), 0) / 8000
    const motor = make()
    expect((mean('fwd') - mean('rev')) / 2).toBeCloseTo(motor.frictionNm * 1e3, 2)
    expect((mean('fwd') + mean('rev')) / 2).toBeCloseTo(0.2, 2)
  })

  it('reads the angle down to whole counts of 16 384, rising and then falling', () => {
    const counts = rowsOf(sweep({ dialect: 'counts-ounce' })).map(row => Number(row[1]))
    expect(counts.every(value => Number.isInteger(value) && value >= 0 && value < 16384)).toBe(true)
    expect(counts.slice(0, 400)).toEqual([...counts.slice(0, 400)].sort((a, b) => a - b))
    expect(counts.slice(400)).toEqual([...counts.slice(400)].sort((a, b) => b - a))
  })

  it('lets the zero wander evenly from the first reading to the last', () => {
    const torque = (driftNm: number) => rowsOf(sweep({ driftNm })).map(row => Number(row[2]))
    const [still, drifting] = [torque(0), torque(1e-3)]
    const added = drifting.map((value, index) => value - still[index]!)
    expect(added[0]).toBeCloseTo(0, 2)
    expect(added[400]).toBeCloseTo(0.5, 2)
    expect(added.at(-1)).toBeCloseTo(1, 2)
  })

  it.each<[Dialect, string, number]>([
    ['tab-radian', '\t', 1], ['gram-force', ',', 9.80665e-5], ['counts-ounce', ',', 0.0070615518], ['unnamed', ',', 1e-3],
  ])('writes the same torque in the unit of the dialect %s', (dialect, separator, unitNm) => {
    const plain = rowsOf(sweep()).map(row => Number(row[2]) * 1e-3)
    const torque = textOf(sweep({ dialect })).trimEnd().split('\n').slice(1).map(row => Number(row.split(separator)[2]) * unitNm)
    expect(torque).toHaveLength(800)
    torque.forEach((value, index) => expect(Math.abs(value - plain[index]!)).toBeLessThan(2e-8))
  })

  it('writes the semicolon dialect in Latin-1 with decimal commas, comment lines and CRLF', () => {
    const text = textOf(sweep({ dialect: 'semicolon' }), 'latin1')
    expect(text.split('\r\n').slice(0, 3)).toEqual(['# motor 041-1001', '# slow sweep, one turn each way', 'direction;angle [°];torque [mNm]'])
    expect(text.split('\r\n')[3]).toMatch(/^fwd;\d+,\d{4};-?\d+,\d{5}$/)
  })

  it.each<['forward' | 'reverse', string]>([['forward', '041-1001_fwd.csv'], ['reverse', '041-1001_rev.csv']])('names a file of the %s sweep alone for its direction', (directions, name) => {
    const file = sweep({ directions })
    expect(file.name).toBe(name)
    expect(rowsOf(file)).toHaveLength(400)
  })
})

/** How a plain reader takes each dialect: separator, lines of head, radians and newton metres a unit. */
const READERS: [Dialect, { separator: string; head: number; angleRad: number; torqueNm: number }][] = [
  ['plain', { separator: ',', head: 1, angleRad: Math.PI / 180, torqueNm: 1e-3 }],
  ['semicolon', { separator: ';', head: 3, angleRad: Math.PI / 180, torqueNm: 1e-3 }],
  ['tab-radian', { separator: '\t', head: 1, angleRad: 1, torqueNm: 1 }],
  ['space-run', { separator: ' ', head: 1, angleRad: Math.PI / 180, torqueNm: 1e-3 }],
  ['counts-ounce', { separator: ',', head: 1, angleRad: 2 * Math.PI / 16384, torqueNm: 0.00706155181422604 }],
  ['gram-force', { separator: ',', head: 1, angleRad: Math.PI / 180, torqueNm: 9.80665e-5 }],
  ['unnamed', { separator: ',', head: 1, angleRad: Math.PI / 180, torqueNm: 1e-3 }],
]
const HALF_COUNT = Math.PI / 16384

interface Row { angle: number; torque: number; direction: number }

/** Reads a file back; the first half rises, the second falls; half a count makes up for reading down. */
function readBack(file: { bytes: Uint8Array }, reader: typeof READERS[number][1]): Row[] {
  const cells = textOf(file, 'latin1').replaceAll('\r', '').trimEnd().split('\n').slice(reader.head).map(row => row.split(reader.separator).slice(-2).map(cell => Number(cell.replace(',', '.'))))
  return cells.map(([angle, torque], index) => ({ angle: angle! * reader.angleRad + HALF_COUNT, torque: torque! * reader.torqueNm, direction: index < cells.length / 2 ? 1 : -1 }))
}

/** Least squares on zero, friction, and cosine and sine of the orders 1…highest; found by repeated correction, as nearly even angles make the columns nearly orthogonal. */
function fit(rows: readonly Row[], highest: number): { zero: number; friction: number; re: Float64Array; im: Float64Array } {
  const found = { zero: 0, friction: 0, re: new Float64Array(highest + 1), im: new Float64Array(highest + 1) }
  const columns = rows.map(row => Array.from({ length: highest + 1 }, (_, order) => [Math.cos(order * row.angle), Math.sin(order * row.angle)] as const))
  for (let round = 0; round < 8; round++) {
    const rest = rows.map((row, index) => columns[index]!.reduce((sum, [cosine, sine], order) => order === 0 ? sum : sum - found.re[order]! * cosine - found.im[order]! * sine, row.torque - found.zero - found.friction * row.direction))
    found.zero += rest.reduce((sum, value) => sum + value, 0) / rows.length
    found.friction += rest.reduce((sum, value, index) => sum + value * rows[index]!.direction, 0) / rows.length
    for (let order = 1; order <= highest; order++) {
      found.re[order]! += 2 * rest.reduce((sum, value, index) => sum + value * columns[index]![order]![0], 0) / rows.length
      found.im[order]! += 2 * rest.reduce((sum, value, index) => sum + value * columns[index]![order]![1], 0) / rows.length
    }
  }
  return found
}

/** Standard error of a cosine's coefficient: the sensor's noise and what whole counts (count/√12, taken by the slope) add to it. */
function standardError(motor: ModelMotor, noiseNm: number, rows: number): number {
  const slope = Math.sqrt(motor.harmonics.reduce((sum, row) => sum + (row.order * row.amplitudeNm) ** 2 / 2, 0))
  return Math.hypot(noiseNm, slope * 2 * HALF_COUNT / Math.sqrt(12)) * Math.sqrt(2 / rows)
}

describe('a file read back by a plain reader and fitted by least squares', () => {
  const motor = make({ rotorScatter: 0.01, statorScatter: 0.01 })
  it.each(READERS)('gives amplitude and phase of every order within the noise, and zero and friction, in the dialect %s', (dialect, reader) => {
    const noiseNm = 8e-6
    const found = fit(readBack(sweep({ motor, dialect, noiseNm, rowsPerDirection: 1200 }), reader), 100)
    const error = standardError(motor, noiseNm, 2400)
    let squares = 0
    for (let order = 1; order <= 100; order++) {
      const stated = motor.harmonics.find(row => row.order === order)
      const [x, y] = stated ? [stated.amplitudeNm * Math.cos(stated.phaseRad), -stated.amplitudeNm * Math.sin(stated.phaseRad)] : [0, 0]
      squares += ((found.re[order]! - x) / error) ** 2 + ((found.im[order]! - y) / error) ** 2
      expect(Math.hypot(found.re[order]! - x, found.im[order]! - y) / error, `order ${order}`).toBeLessThan(5)
    }
    // χ² of 200 degrees of freedom, over 200: 1 ± 0.1; four deviations either way. Orders above 100, weak in this motor, stay in the rest.
    expect(squares / 200).toBeGreaterThan(0.6)
    expect(squares / 200).toBeLessThan(1.4)
    expect(Math.abs(found.zero - 2e-4)).toBeLessThan(5 * error)
    expect(Math.abs(found.friction - motor.frictionNm)).toBeLessThan(5 * error)
  })

  it('gives the same orders from three turns each way, within the turn', () => {
    const file = sweep({ motor, turns: 3, rowsPerDirection: 3600, dialect: 'counts-ounce' })
    const rows = readBack(file, READERS[4]![1])
    const counts = rowsOf(file).slice(0, 3600).map(row => Number(row[1]))
    expect(counts.filter((count, index) => index > 0 && count < counts[index - 1]!)).toHaveLength(2)
    const found = fit(rows, 90)
    const stated = motor.harmonics.find(row => row.order === 84)!
    expect(Math.abs(Math.hypot(found.re[84]!, found.im[84]!) / stated.amplitudeNm - 1)).toBeLessThan(2e-3)
  })

  it('shows sidebands of A·k·ε/2 at one above and one below the design order, whose phases close at 180°, with an eccentric angle sensor', () => {
    const perfect = make()
    const found = fit(readBack(sweep({ motor: perfect, angleSensorEccentricityRad: 2e-3, rowsPerDirection: 1200 }), READERS[0]![1]), 90)
    const [below, main, above] = [83, 84, 85].map(order => ({ amplitude: Math.hypot(found.re[order]!, found.im[order]!), phase: Math.atan2(-found.im[order]!, found.re[order]!) }))
    for (const side of [below!, above!]) expect(side.amplitude / main!.amplitude).toBeCloseTo(84 * 2e-3 / 2, 2)
    expect(Math.cos(below!.phase + above!.phase - 2 * main!.phase)).toBeLessThan(-0.99)
  })

  it('has torque smaller by the square of what remanence the heat leaves, friction the same, and a column of temperature', () => {
    const file = sweep({ motor, temperature: { celsius: 45, referenceCelsius: 20, remanencePerKelvin: -0.0011 }, rowsPerDirection: 1200 })
    expect(textOf(file).split('\n').slice(0, 2)).toEqual(['direction,angle_deg,torque_mN.m,temperature_degC', expect.stringMatching(/,45\.0$/)])
    const rows = rowsOf(file).map((row, index) => ({ angle: Number(row[1]) * Math.PI / 180 + HALF_COUNT, torque: Number(row[2]) * 1e-3, direction: index < 1200 ? 1 : -1 }))
    const found = fit(rows, 90)
    const stated = motor.harmonics.find(row => row.order === 84)!
    // 45 °C at −0.11 %/K corrects by 1.0574: (1 − 0.0011·25)^−2, a derivation.
    expect(stated.amplitudeNm / Math.hypot(found.re[84]!, found.im[84]!)).toBeCloseTo(1.0574, 2)
    expect(found.friction).toBeCloseTo(motor.frictionNm, 6)
  })

  it('adds viscous drag to friction', () => {
    const found = fit(readBack(sweep({ motor, viscousNm: 3e-4, rowsPerDirection: 1200 }), READERS[0]![1]), 90)
    expect(found.friction).toBeCloseTo(motor.frictionNm + 3e-4, 6)
  })
})

describe('spoil', () => {
  it.each(['text-in-a-number', 'not-a-number'] as const)('puts %s into the torque, also where a column of temperature follows', (fault) => {
    const torque = rowsOf(spoil(sweep({ temperature: { celsius: 21, referenceCelsius: 20, remanencePerKelvin: -0.001 } }), fault)).map(row => row[2])
    expect(torque.filter(cell => cell === '---' || cell === 'NaN')).toHaveLength(1)
  })

  it.each([['text-in-a-number', '---'], ['not-a-number', 'NaN']] as const)('puts one cell of %s into a file', (fault, cell) => {
    expect(rowsOf(spoil(sweep(), fault)).filter(row => row[2] === cell)).toHaveLength(1)
  })

  it('keeps half a turn only', () => {
    expect(Math.max(...rowsOf(spoil(sweep(), 'half-a-turn')).map(row => Number(row[1])))).toBeLessThan(180)
  })

  it('clips torque at one level that many readings reach', () => {
    const torque = rowsOf(spoil(sweep(), 'clipped')).map(row => Number(row[2]))
    const largest = Math.max(...torque)
    expect(torque.filter(value => value === largest).length).toBeGreaterThan(20)
  })
})

/** What the model says a characteristic is; null for one that only the engine computes. */
function trueValue(motor: ModelMotor, key: string, ratedTorqueNm: number): number | null {
  const order = /^order\.(\d+)$/.exec(key)?.[1]
  if (order) return motor.harmonics.find(row => row.order === Number(order))?.amplitudeNm ?? 0
  if (key === 'cogging.peakToPeak') return motor.truth().peakToPeakNm
  if (key === 'rippleRatio') return 100 * motor.truth().peakToPeakNm / ratedTorqueNm
  return key === 'friction.mean' ? motor.frictionNm : null
}

const limitsOf = (lot: DemoLot): Limit[] => {
  const { sheets } = partOf(lot.part)
  return (sheets.filter(sheet => sheet.daysAgo >= lot.daysAgo).at(-1) ?? sheets[0]!).content.limits
}
const motorOf = (lot: DemoLot, position: number) => makeMotor(specOf(lot, position), makeRandom(`${lot.supplierLot}/${serialOf(lot, position)}/motor`))

function fails(lot: DemoLot, position: number): boolean {
  const motor = motorOf(lot, position)
  return limitsOf(lot).some(limit => (trueValue(motor, limit.key, partOf(lot.part).ratedTorqueNm) ?? 0) > limit.upper!)
}

const failing = (lot: DemoLot) => Array.from({ length: 20 }, (_, index) => fails(lot, index + 1)).filter(Boolean).length

/** Part and running number of the lots that are made to fail. */
const MADE_TO_FAIL = /^(TV-\d+-05[45]|SR-\d+-070|AC-\d+-032|NS-\d+-054)$/

describe.each(['2026-06-01', '2026-11-30', '2027-02-28'])('scenario of %s', (day) => {
  const { past, today, parts, people, suppliers } = scenario(new Date(`${day}T12:00:00Z`), 'full')

  it('has sixty past lots within fourteen months, the oldest first, each of a part that its supplier delivers', () => {
    expect(past).toHaveLength(60)
    expect(new Set(past.map(lot => lot.supplierLot)).size).toBe(60)
    expect(past.map(lot => lot.daysAgo)).toEqual(past.map(lot => lot.daysAgo).sort((a, b) => b - a))
    expect(past[0]!.daysAgo).toBeLessThan(14 * 30.44)
    for (const lot of [...past, ...today]) expect(parts.find(part => part.number === lot.part)!.suppliers.map(row => row.code)).toContain(lot.supplier)
  })

  it('makes the five lots that shall be rejected fail with at least two of twenty motors', () => {
    const bad = past.filter(lot => MADE_TO_FAIL.test(lot.supplierLot))
    expect(bad).toHaveLength(5)
    // Re = 2 for code letter F, AQL 2.5: ISO 2859-1, table 2-A (from memory).
    for (const lot of bad) expect(failing(lot), lot.supplierLot).toBeGreaterThanOrEqual(2)
  })

  it('makes all other lots with at most one failing motor in twenty', () => {
    for (const lot of past.filter(each => !MADE_TO_FAIL.test(each.supplierLot))) expect(failing(lot), lot.supplierLot).toBeLessThanOrEqual(1)
  })

  it('makes ordinary motors of every part with 9 to 40 % between the worst of twenty and the limit of peak to peak', () => {
    for (const part of parts) {
      const limit = limitsOf({ part: part.number, daysAgo: 0 } as DemoLot).find(row => row.key === 'cogging.peakToPeak')!.upper!
      const worst = Math.max(...Array.from({ length: 20 }, (_, index) => makeMotor(part.good, makeRandom(`${day}/${part.number}/${index}`)).truth().peakToPeakNm))
      expect(worst / limit, part.number).toBeGreaterThan(0.6)
      expect(worst / limit, part.number).toBeLessThan(0.91)
    }
  })

  it('re-submits the rejected servo lot after sorting', () => {
    const again = past.find(lot => lot.resubmissionOf)!
    expect(past.find(lot => lot.supplierLot === again.resubmissionOf)!.supplierLot).toMatch(MADE_TO_FAIL)
    expect(failing(again)).toBe(0)
  })

  it('has two received lots and one at the gate with a label, contacts for each supplier and a person of each role', () => {
    expect(today.map(lot => lot.received)).toEqual([true, true, true, false])
    expect(labelOf(today[3]!, 'PO-1')).toBe(`[)>\u001E06\u001DPKF-4412-C\u001DQ400\u001D1T${today[3]!.supplierLot}\u001DVTUVALO\u001DKPO-1\u001E\u0004`)
    for (const { code } of suppliers) expect(people.filter(person => person.supplier === code)).toHaveLength(2)
    expect(new Set(people.map(person => person.role)).size).toBe(6)
  })
})

describe('scenario, small', () => {
  it('has six past lots, one of them made to fail', () => {
    const { past } = scenario(new Date('2026-06-01T12:00:00Z'), 'small')
    expect(past).toHaveLength(6)
    expect(past.filter(lot => MADE_TO_FAIL.test(lot.supplierLot))).toHaveLength(1)
  })
})
