import { describe, expect, it } from 'vitest'
import { parseDirection } from '#shared/compute/intake/direction'
import { readTable } from '#shared/compute/intake/read-table'
import { guessRecipe } from '#shared/compute/intake/recipe'
import type { ColumnRecipe } from '#shared/compute/terms/measurement'

const utf8 = (text: string) => new TextEncoder().encode(text)
const latin1 = (text: string) => Uint8Array.from(text, (character) => character.charCodeAt(0))
const utf16 = (text: string) => Uint8Array.from([0xFF, 0xFE, ...[...text].flatMap((character) => [character.charCodeAt(0) & 255, character.charCodeAt(0) >> 8])])

/** Degrees and mN·m of a file. */
function read(bytes: Uint8Array, recipe: ColumnRecipe | null = null) {
  const outcome = readTable(bytes, recipe, 'torque-sensor')
  if (!outcome.ok) throw new Error(`${outcome.fault.code}: ${outcome.fault.sentence}`)
  const { columns, lines, direction } = outcome.table
  const round = (values: Float64Array, scale: number) => Array.from(values, (value) => Math.round(value * scale * 1e6) / 1e6)
  return { angle: round(columns.angle!, 180 / Math.PI), torque: round(columns.torque!, 1e3), lines: [...lines], direction: direction && [...direction], recipe: outcome.recipe, columns }
}

const EXPECTED = { angle: [0, 0.5, 1], torque: [1.25, -2.5, 3] }

describe('readTable reads one table in every dialect', () => {
  it.each([
    ['commas', utf8('angle_deg,torque_mNm\n0,1.25\n0.5,-2.5\n1,3\n')],
    ['semicolons and decimal commas', utf8('Winkel [°];Drehmoment [mN·m]\n0,0;1,25\n0,5;-2,5\n1,0;3,0\n')],
    ['tabs', utf8('angle_deg\ttorque_mNm\n0\t1.25\n0.5\t-2.5\n1\t3\n')],
    ['tabs and decimal commas', utf8('angle_deg\ttorque_mNm\n0,0\t1,25\n0,5\t-2,5\n1,0\t3,0\n')],
    ['spaces in columns', utf8('  angle_deg   torque_mNm\n    0.0      1.25\n    0.5     -2.50\n    1.0      3.00\n')],
    ['spaces and decimal commas', utf8('angle_deg torque_mNm\n0,0 1,25\n0,5 -2,5\n1,0 3,0\n')],
    ['commas followed by blanks', utf8('angle_deg, torque_mNm\n0, 1.25\n0.5, -2.5\n1, 3\n')],
    ['a byte order mark and CR LF', utf8('\uFEFFangle_deg,torque_mNm\r\n0,1.25\r\n0.5,-2.5\r\n1,3\r\n')],
    ['Latin-1', latin1('Winkel [°];Moment [mN·m]\n0;1.25\n0.5;-2.5\n1;3\n')],
    ['UTF-16', utf16('angle_deg,torque_mNm\n0,1.25\n0.5,-2.5\n1,3\n')],
    ['lone CR', utf8('angle_deg,torque_mNm\r0,1.25\r0.5,-2.5\r1,3\r')],
    ['no line end at the end', utf8('angle_deg,torque_mNm\n0,1.25\n0.5,-2.5\n1,3')],
    ['quoted cells', utf8('"angle_deg","torque_mNm"\n"0","1.25"\n"0.5","-2.5"\n"1","3"\n')],
    ['quoted decimal commas between commas', utf8('"angle_deg";"torque_mNm"\n"0,0";"1,25"\n"0,5";"-2,5"\n"1,0";"3,0"\n')],
    ['empty trailing columns', utf8('angle_deg,torque_mNm,,\n0,1.25,,\n0.5,-2.5,,\n1,3,,\n')],
    ['comments and blank lines', utf8('# rig 4\nangle_deg,torque_mNm\n0,1.25\n# pause\n\n0.5,-2.5\n1,3\n')],
    ['a commented header', utf8('# angle_deg,torque_mNm\n0,1.25\n0.5,-2.5\n1,3\n')],
    ['a free preamble', utf8('Bench 2\nSerial;12345\nDate;2024-03-01\n\nangle_deg;torque_mNm\n0;1.25\n0.5;-2.5\n1;3\n')],
    ['a line of units', utf8('angle;torque\ndeg;mN·m\n0;1.25\n0.5;-2.5\n1;3\n')],
    ['sep=', utf8('sep=;\nangle_deg;torque_mNm\n0;1.25\n0.5;-2.5\n1;3\n')],
    ['further columns, one of them text', utf8('note,angle_deg,temp_C,torque_mNm\na1,0,21.5,1.25\n"b,2",0.5,21.5,-2.5\nc,1,21.6,3\n')],
    ['other units', utf8('angle_rad,torque_Nm\n0,0.00125\n0.008726646259971648,-0.0025\n0.017453292519943295,0.003\n')],
    ['counts', utf8('position [counts/720],torque (µN·m)\n0,1250\n1,-2500\n2,3000\n')],
  ])('%s', (_, bytes) => {
    expect(read(bytes)).toMatchObject(EXPECTED)
  })

  it('keeps the line of each row across preamble, comments and blank lines', () => {
    expect(read(utf8('# rig 4\nangle_deg,torque_mNm\n0,1.25\n# pause\n\n0.5,-2.5\n1,3\n')).lines).toEqual([3, 6, 7])
  })

  it('reads directions by their words', () => {
    expect(read(utf8('direction,angle_deg,torque_mNm\nfwd,0,1\nForward,1,1\n+1,2,1\nrev,2,1\n-1,1,1\n')).direction).toEqual([1, 1, 1, -1, -1])
  })

  it('tells a bad row of a long file by its line', () => {
    const rows = Array.from({ length: 5000 }, (_, index) => `${index / 10},${index % 7}`)
    rows[4321] = '432.1,7;'
    expect(readTable(utf8(`angle_deg,torque_mNm\n${rows.join('\n')}\n`), null, 'torque-sensor')).toMatchObject({ ok: false, fault: { code: 'not-numeric', line: 4323 } })
  })

  it('takes the first row for bad, not for a header, when a header stands above it', () => {
    expect(readTable(utf8('angle_deg,torque_mNm\nabc,1\n1,2\n2,3\n'), null, 'torque-sensor')).toMatchObject({ ok: false, fault: { code: 'not-numeric', line: 2 } })
  })
})

describe('guessRecipe', () => {
  const columnsOf = (text: string) => {
    const guess = guessRecipe(utf8(text), 'torque-sensor')
    return guess.ok ? guess.recipe.columns.map(({ role, index, unit }) => [role, index, unit]) : guess.fault.code
  }

  it('takes the angle that the shaft had over the one commanded', () => {
    expect(columnsOf('commanded angle [deg],measured angle [deg],torque [mNm]\n0,0.01,1\n1,1.01,2\n')).toEqual([['angle', 1, 'deg'], ['torque', 2, 'mN·m']])
    expect(columnsOf('angle_deg,angle_set_deg,torque_mNm\n0,0.01,1\n1,1.01,2\n')).toEqual([['angle', 0, 'deg'], ['torque', 2, 'mN·m']])
  })

  it('gives null, never a guess, for a unit that the header does not name', () => {
    const guess = guessRecipe(utf8('angle,torque_mNm\n0,1\n1,2\n'), 'torque-sensor')
    expect(guess).toMatchObject({ ok: true, recipe: { version: 0, columns: [{ role: 'angle', unit: null }, { role: 'torque', unit: 'mN·m' }] }, open: { code: 'unit-not-named' } })
    expect(guess.ok && guess.open!.remedy).toContain('counts/N')
  })

  it('takes a file without header for angle and torque in that order, units unknown', () => {
    expect(columnsOf('0,1\n1,2\n2,3\n')).toEqual([['angle', 0, null], ['torque', 1, null]])
  })

  it('has nothing open when all is named, and shows header and first rows', () => {
    const guess = guessRecipe(utf8('direction;angle_deg;torque_mNm\nfwd;0,5;1\nrev;0;2\n'), 'torque-sensor')
    expect(guess).toMatchObject({ ok: true, open: null, header: ['direction', 'angle_deg', 'torque_mNm'], sample: [['fwd', '0,5', '1'], ['rev', '0', '2']] })
  })

  it('leaves out columns that the method does not use', () => {
    expect(columnsOf('time_s,angle_deg,speed_rpm,torque_mNm\n0,0,1,1\n1,1,1,2\n')).toEqual([['time', 0, 's'], ['angle', 1, 'deg'], ['torque', 3, 'mN·m']])
  })

  it('guesses hold and spin files for those methods', () => {
    const hold = guessRecipe(utf8('direction,position_counts/8192,duty_counts/2000,v_bus_V\nfwd,-1,2,23.981\nrev,7,3,24.024\n'), 'hold')
    expect(hold.ok && hold.recipe.columns.map(({ role, unit }) => [role, unit])).toEqual([['direction', ''], ['angle', 'counts/8192'], ['duty', 'counts/2000'], ['bus', 'V']])
    const spin = guessRecipe(utf8('run,time_s,position_counts\nfwd,0.000000,0\nfwd,0.000250,36\n'), 'spin')
    expect(spin.ok && spin.recipe.columns.map(({ role, unit }) => [role, unit])).toEqual([['direction', ''], ['time', 's'], ['angle', null]])
  })
})

describe('a given recipe', () => {
  const recipe: ColumnRecipe = { version: 2, columns: [{ role: 'angle', header: 'pos', index: 0, unit: 'counts/720' }, { role: 'torque', header: 'sig', index: 1, unit: 'µN·m' }] }

  it('finds its columns by their headers wherever they stand', () => {
    expect(read(utf8('pos,sig\n0,1250\n1,-2500\n2,3000\n'), recipe)).toMatchObject(EXPECTED)
    expect(read(utf8('no,Sig,Pos\n9,1250,0\n9,-2500,1\n9,3000,2\n'), recipe)).toMatchObject(EXPECTED)
  })

  it('refuses a file without one of its columns', () => {
    expect(readTable(utf8('pos,signal\n0,1\n1,2\n'), recipe, 'torque-sensor')).toMatchObject({ ok: false, fault: { code: 'missing-column', line: 1 } })
  })

  it('reads files without header by place', () => {
    const placed: ColumnRecipe = { version: 1, columns: [{ role: 'torque', header: null, index: 0, unit: 'mN·m' }, { role: 'angle', header: null, index: 2, unit: 'deg' }] }
    expect(read(utf8('1.25;9;0\n-2.5;9;0.5\n3;9;1\n'), placed)).toMatchObject(EXPECTED)
    expect(readTable(utf8('1;2\n3;4\n'), placed, 'torque-sensor')).toMatchObject({ ok: false, fault: { code: 'missing-column' } })
  })

  it('refuses a unit that is none of its role\'s', () => {
    const wrong: ColumnRecipe = { version: 1, columns: [{ role: 'angle', header: 'pos', index: 0, unit: 'mN·m' }, { role: 'torque', header: 'sig', index: 1, unit: 'mN·m' }] }
    expect(readTable(utf8('pos,sig\n0,1\n'), wrong, 'torque-sensor')).toMatchObject({ ok: false, fault: { code: 'unit-unknown' } })
  })
})

describe('parseDirection', () => {
  it('knows words of both directions and no other', () => {
    for (const word of ['fwd', 'FORWARD', '+1', '1', 'up', 'cw', ' "fwd" ']) expect(parseDirection(word), word).toBe(1)
    for (const word of ['rev', 'Reverse', '-1', 'down', 'ccw', 'bwd', '−1']) expect(parseDirection(word), word).toBe(-1)
    for (const word of ['', 'sideways', '2', 'forwardish']) expect(parseDirection(word), word).toBeNull()
  })
})
