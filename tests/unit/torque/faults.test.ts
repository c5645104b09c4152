import { describe, expect, it } from 'vitest'
import { analyse } from '#shared/compute/torque/analyse'
import { bench, benchRows, bytesOf, faultOf, figuresOf, RIG, settingsWith, warningCodes } from './support'

const replaceRow = (line: number, cells: string) => {
  const rows = benchRows()
  rows[line - 1] = cells
  return bytesOf(rows)
}

describe('analyse refuses a file with line, sentence and remedy', () => {
  it.each([
    ['a word in a number column', replaceRow(101, 'fwd,abc,1'), 'not-numeric', 101],
    ['an empty cell', replaceRow(50, 'fwd,,1'), 'not-numeric', 50],
    ['NaN', replaceRow(77, 'fwd,11.25,NaN'), 'not-finite', 77],
    ['infinity', replaceRow(78, 'fwd,11.4,-inf'), 'not-finite', 78],
    ['a number too large for a double', replaceRow(79, 'fwd,11.55,1e999'), 'not-finite', 79],
    ['a row cut off', replaceRow(200, 'fwd,29.7'), 'row-too-short', 200],
    ['a direction that is no word for one', replaceRow(30, 'sideways,4.2,1'), 'direction-unknown', 30],
    ['torque beyond the rig\'s range', replaceRow(500, 'fwd,74.7,1001'), 'beyond-range', 500],
    ['an angle of a billion turns', replaceRow(500, 'fwd,1e13,1'), 'angle-too-large', 500],
  ])('%s', (_, bytes, code, line) => {
    const fault = faultOf(bytes)
    expect(fault).toMatchObject({ code, line })
    expect(fault.sentence).toMatch(/^[A-Z"].*\.$/)
    expect(fault.remedy).toMatch(/^[A-Z].*\.$/)
  })

  it('accepts torque exactly at the rig\'s range', () => {
    expect(faultOf(replaceRow(500, 'fwd,74.7,1000.0001')).code).toBe('beyond-range')
    expect(() => figuresOf(replaceRow(500, 'fwd,74.7,1000'))).not.toThrow()
  })

  it('an empty file, and one of a header alone', () => {
    expect(faultOf(bytesOf('')).code).toBe('empty-file')
    expect(faultOf(bytesOf(' \n\r\n')).code).toBe('empty-file')
    expect(faultOf(bytesOf('angle_deg,torque_mNm\n')).code).toBe('not-a-table')
  })

  it('a file that is no table', () => {
    expect(faultOf(Uint8Array.from({ length: 3000 }, (_, index) => (index * 7) % 256)).code).toBe('not-a-table')
    expect(faultOf(bytesOf('Dear colleague,\nthe motor is fine.\n')).code).toBe('not-a-table')
  })

  it('a file without a torque column', () => {
    const outcome = analyse([{ name: 'a.csv', bytes: bytesOf('angle_deg,time_s\n0,0\n1,1\n') }], settingsWith())
    expect(outcome).toMatchObject({ ok: false, fault: { code: 'missing-column', sentence: 'No column was recognised as a torque.' } })
  })

  it('a unit that the header does not name, with the guess made so far', () => {
    const outcome = analyse([{ name: 'a.csv', bytes: bytesOf('angle_deg,torque\n0,0\n1,1\n') }], settingsWith())
    expect(outcome).toMatchObject({ ok: false, fault: { code: 'unit-not-named', line: 1 }, recipe: { columns: [{ role: 'angle', unit: 'deg' }, { role: 'torque', unit: null }] } })
  })

  it('a time that runs backwards, but not one that stands still', () => {
    const rows = benchRows({ timeColumn: true })
    const cells = rows[300]!.split(',')
    rows[300] = [cells[0], rows[299]!.split(',')[1], ...cells.slice(2)].join(',')
    expect(() => figuresOf(bytesOf(rows))).not.toThrow()
    rows[300] = [cells[0], '0.1', ...cells.slice(2)].join(',')
    expect(faultOf(bytesOf(rows))).toMatchObject({ code: 'time-backwards', line: 301 })
  })
})

describe('analyse refuses a turn that is not covered', () => {
  const cut = (keep: (angle: number) => boolean) => {
    const [header, ...rows] = benchRows({ samples: 3600 })
    return bytesOf([header!, ...rows.filter((row) => keep(Number(row.split(',')[1])))])
  }
  /** A quarter of the period of order 84 is 1.0714°. */
  it('a gap just above a quarter period, not one just below', () => {
    expect(() => figuresOf(cut((angle) => angle < 100 || angle > 100.85))).not.toThrow()
    expect(faultOf(cut((angle) => angle < 100 || angle > 100.95))).toMatchObject({ code: 'gap-too-wide', line: 1001 })
  })

  it('less than one turn', () => {
    expect(faultOf(cut((angle) => angle < 350)).code).toBe('less-than-one-turn')
    expect(faultOf(bytesOf(benchRows().slice(0, 1500))).code).toBe('less-than-one-turn')
    expect(faultOf(bytesOf(['angle_deg,torque_mNm', ...Array.from({ length: 100 }, (_, index) => `10,${index}`)])).code).toBe('less-than-one-turn')
  })

  it('seven readings a period of the design order, not eight', () => {
    expect(faultOf(bench({ samples: 84 * 7 })).code).toBe('too-few-samples')
    expect(() => figuresOf(bench({ samples: 84 * 8 }))).not.toThrow()
  })

  it('seven readings a period of the highest order that a limit names', () => {
    expect(() => figuresOf(bench({ samples: 84 * 16 }), settingsWith({ ordersNamed: [168] }))).not.toThrow()
    expect(faultOf(bench({ samples: 84 * 16 }), settingsWith({ ordersNamed: [169] })).code).toBe('too-few-samples')
  })
})

describe('analyse refuses a bad sensor', () => {
  it('torque clipped at its extreme', () => {
    expect(faultOf(bench({ noiseMilliNm: 0.01, distort: (torque) => Math.min(torque, 3.5) }))).toMatchObject({ code: 'clipped' })
    expect(faultOf(bench({ noiseMilliNm: 0.01, distort: (torque) => Math.max(torque, -3.5) }))).toMatchObject({ code: 'clipped' })
  })

  it.each([0.5, 0.2, 0.1, 0.02, 0.001])('does not take peaks rounded to steps of %f mN·m for clipped ones', (step) => {
    for (const noiseMilliNm of [0, 0.01, 0.1]) {
      expect(() => figuresOf(bench({ noiseMilliNm, samples: 7200, orders: { 84: [3, -90] }, distort: (torque) => Math.round(torque / step) * step })), `noise ${noiseMilliNm}`).not.toThrow()
    }
  })

  it('a sensor stuck over two periods', () => {
    expect(faultOf(bench({ distort: (torque, row) => (row > 600 && row < 700 ? 1.234 : torque) }))).toMatchObject({ code: 'stuck-sensor', line: 603 })
    expect(faultOf(bench({ distort: () => 0 })).code).toBe('stuck-sensor')
  })

  it('more than 0.5 % of spikes; fewer are left out and counted', () => {
    const spiky = (count: number) => bench({ distort: (torque, row) => (row % 100 === 50 && row < 100 * count ? torque + 25 : torque) })
    const few = figuresOf(spiky(24))
    expect(few.warnings).toContainEqual({ code: 'spikes-left-out', sentence: '24 isolated spikes were left out.' })
    expect(few.cogging.sinNm[83]! * 1e3).toBeCloseTo(3, 2)
    expect(faultOf(spiky(25))).toMatchObject({ code: 'too-many-spikes', line: 52 })
  })
})

describe('analyse joins the files of one motor', () => {
  const [header, ...rows] = benchRows({ directionColumn: false })
  const forward = { name: 'M17-forward.csv', bytes: bytesOf([header!, ...rows.slice(0, 2400)]) }
  const reverse = { name: 'M17-reverse.csv', bytes: bytesOf([header!, ...rows.slice(2400)]) }

  it('gives from a forward and a reverse file what one file with both gives', () => {
    const joined = analyse([forward, reverse], settingsWith())
    const single = figuresOf(bytesOf([header!, ...rows]))
    expect(joined.ok && joined.result.cogging.sinNm[83]).toBeCloseTo(single.cogging.sinNm[83]!, 7)
    expect(joined.ok && joined.result.friction!.meanNm).toBeCloseTo(single.friction!.meanNm, 7)
    expect(single.directions).toBe('both')
  })

  it('names the file in a fault', () => {
    const broken = { ...reverse, bytes: bytesOf([header!, '0,1', 'x,1']) }
    const outcome = analyse([forward, broken], settingsWith())
    expect(outcome).toMatchObject({ ok: false, fault: { line: 3, sentence: expect.stringMatching(/^M17-reverse\.csv: /) } })
  })

  it('warns and states no friction when one direction only was measured', () => {
    const outcome = analyse([reverse], settingsWith())
    expect(outcome).toMatchObject({ ok: true, result: { directions: 'reverse', friction: null } })
    expect(outcome.ok && warningCodes(outcome.result)).toContain('one-direction-only')
  })
})

describe('analyse warns', () => {
  it('of a linear drift, and removes it from friction and cogging', () => {
    const drifting = figuresOf(bench({ distort: (torque, row) => torque + (2 * row) / 4800, noiseMilliNm: 0.005, samples: 2400 }))
    expect(warningCodes(drifting)).toContain('drift')
    expect(drifting.friction!.meanNm * 1e3).toBeCloseTo(1.5, 1)
    expect(warningCodes(figuresOf(bench()))).not.toContain('drift')
  })

  it('of a drift over several turns, measured on their time', () => {
    const drifting = figuresOf(bench({ turns: 3, timeColumn: true, distort: (torque, row) => torque + (1 * row) / 14400 }))
    expect(drifting.warnings.find(({ code }) => code === 'drift')!.sentence).toContain('1.00 mN·m')
    expect(drifting.friction!.meanNm * 1e3).toBeCloseTo(1.5, 2)
  })

  it('of values repeated in runs', () => {
    let held = 0
    expect(warningCodes(figuresOf(bench({ samples: 7200, distort: (torque, row) => (row % 4 === 0 ? (held = torque) : held) })))).toContain('repeated-values')
    expect(warningCodes(figuresOf(bench({ samples: 7200 })))).not.toContain('repeated-values')
  })

  it('when the highest order is lowered to four readings a period', () => {
    const result = figuresOf(bench({ samples: 800 }))
    expect(result.highestOrder).toBe(200)
    expect(warningCodes(result)).toContain('highest-order-lowered')
    expect(figuresOf(bench({ samples: 1008 })).highestOrder).toBe(252)
  })

  it('when the rig\'s bandwidth is less than ten times order × speed', () => {
    const at = (bandwidthHz: number) => warningCodes(figuresOf(bench({ timeColumn: true, secondsATurn: 60 }), settingsWith({ rig: { ...RIG, bandwidthHz } })))
    // Order 84 at 1 turn a minute passes at 1.4 Hz.
    expect(at(13.9)).toContain('bandwidth')
    expect(at(14.1)).not.toContain('bandwidth')
  })

  it('when friction comes out negative', () => {
    expect(warningCodes(figuresOf(bench({ frictionMilliNm: -1.5 })))).toContain('friction-negative')
  })

  it('when the direction column goes against the angle, and follows the angle', () => {
    const [header, ...rows] = benchRows()
    const turned = bytesOf([header!, ...rows.map((row) => (row.startsWith('fwd') ? row.replace('fwd', 'cw') : row.replace('rev', 'ccw')).replace(/,([\d.]+),/, (_, angle: string) => `,${-Number(angle)},`))])
    const result = figuresOf(turned)
    expect(warningCodes(result)).toContain('direction-turned')
    expect(result.friction!.meanNm).toBeLessThan(0)
  })
})

describe('analyse checks its settings', () => {
  const files = [{ name: 'a.csv', bytes: bench() }]
  it.each([
    ['no file', [], {}],
    ['half a slot', files, { design: { kind: 'brushless', slots: 12.5, poles: 14 } as const }],
    ['an odd number of poles', files, { design: { kind: 'brushless', slots: 12, poles: 13 } as const }],
    ['order 0', files, { ordersNamed: [0] }],
    ['a highest order of one and a half', files, { highestOrder: 1.5 }],
    ['rated torque 0', files, { ratedTorqueNm: 0 }],
    ['a negative resolution', files, { rig: { ...RIG, torqueResolutionNm: -1 } }],
    ['one table entry', files, { compensation: { entries: 1, stepNm: 0 } }],
  ])('throws a RangeError for %s', (_, given, changes) => {
    expect(() => analyse(given, settingsWith(changes))).toThrow(RangeError)
  })

  it('gives a fault, not figures, for a method that it does not know yet', () => {
    const outcome = analyse([{ name: 'a.csv', bytes: bytesOf('angle_deg,current_A\n0,1\n1,2\n') }], settingsWith({ method: 'hold' }))
    expect(outcome).toMatchObject({ ok: false, fault: { code: 'method-not-supported' } })
  })
})
