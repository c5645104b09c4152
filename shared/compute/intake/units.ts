import type { ColumnRole } from '../terms/measurement'

const POUND_KG = 0.45359237
const GRAVITY = 9.80665
const INCH_M = 0.0254
const TURN_RAD = 2 * Math.PI

/** SI size of one unit, and the spellings by which it is known once `plainSpelling` has been applied. */
interface UnitEntry {
  unit: string
  scale: number
  spellings: string[]
}

const entry = (unit: string, scale: number, ...spellings: string[]): UnitEntry => ({ unit, scale, spellings })

const TIME = [
  entry('s', 1, 's', 'sec', 'secs', 'second', 'seconds'),
  entry('ms', 1e-3, 'ms', 'msec', 'millisecond', 'milliseconds'),
  entry('µs', 1e-6, 'us', 'usec', 'microsecond', 'microseconds'),
]
const VOLTAGE = [entry('V', 1, 'v', 'volt', 'volts'), entry('mV', 1e-3, 'mv', 'millivolt', 'millivolts')]

const UNITS: Record<ColumnRole, UnitEntry[]> = {
  angle: [
    entry('deg', TURN_RAD / 360, 'deg', '°', 'degree', 'degrees', 'º', 'degs'),
    entry('rad', 1, 'rad', 'rads', 'radian', 'radians'),
    entry('turn', TURN_RAD, 'turn', 'turns', 'rev', 'revs', 'revolution', 'revolutions'),
  ],
  torque: [
    entry('N·m', 1, 'nm', 'newtonmetre', 'newtonmetres', 'newtonmeter', 'newtonmeters'),
    entry('mN·m', 1e-3, 'mnm', 'millinewtonmetre', 'millinewtonmetres', 'millinewtonmeter', 'millinewtonmeters'),
    entry('µN·m', 1e-6, 'unm', 'micronewtonmetre', 'micronewtonmetres', 'micronewtonmeter', 'micronewtonmeters'),
    entry('N·cm', 1e-2, 'ncm', 'cnm'),
    entry('ozf·in', (POUND_KG / 16) * GRAVITY * INCH_M, 'ozfin', 'ozin', 'inozf', 'inoz', 'ouncefinch', 'ounceinch'),
    entry('gf·cm', 1e-3 * GRAVITY * 1e-2, 'gfcm', 'gcm', 'cmgf', 'pcm'),
    entry('kgf·cm', GRAVITY * 1e-2, 'kgfcm', 'kgcm', 'cmkgf', 'kpcm'),
  ],
  current: [
    entry('A', 1, 'a', 'amp', 'amps', 'ampere', 'amperes'),
    entry('mA', 1e-3, 'ma', 'milliamp', 'milliamps', 'milliampere', 'milliamperes'),
  ],
  voltage: VOLTAGE,
  bus: VOLTAGE,
  duty: [entry('1', 1, '1', 'ratio', 'fraction'), entry('%', 0.01, '%', 'percent', 'pct')],
  time: TIME,
  speed: [
    entry('rad/s', 1, 'rad/s', 'rads', 'radpersecond'),
    entry('deg/s', TURN_RAD / 360, 'deg/s', '°/s', 'degpersecond'),
    entry('rpm', TURN_RAD / 60, 'rpm', '1/min', 'min1', 'rev/min', 'u/min', 'turn/min'),
    entry('turn/s', TURN_RAD, 'turn/s', 'rev/s', '1/s', 'hz', 'rps'),
  ],
  temperature: [entry('°C', 1, '°c', 'c', 'degc', 'celsius', 'ºc')],
  direction: [],
}

/** Only these can be given in counts of a full scale. */
const COUNTED: ReadonlySet<ColumnRole> = new Set<ColumnRole>(['angle', 'duty'])
const COUNTS = /^(?:counts?|cts?|cnts?|ticks?|lsb|inc|increments?|steps?)(?:\/|of|per(?:turn|rev)?=?|=)?(\d{1,10})?(?:\/?(?:turn|rev))?$/
const COUNTS_PER_TURN = /^(\d{1,10})(?:counts?|cts?|ticks?|inc|increments?)?(?:\/?(?:turn|rev)|cpr|ppr)?$/

/** One spelling for the many: no dots, stars, hyphens, spaces, brackets; one micro sign; lower case. */
function plainSpelling(text: string): string {
  return text
    .replace(/[\u00B5\u03BC]/g, 'u')
    .replace(/[\u00B7\u22C5\u2022\u2219\u00D7.*\-\u2010\u2011\u2212\s_^[\](){}"']/g, '')
    .toLowerCase()
}

/**
 * Reads a unit as people write it (`mN.m`, `[mN·m]`, `mNm`, `(deg)`, `°`, `counts/8192`).
 *
 * @param role - what the column holds
 * @param text - the unit's text, with or without brackets
 * @returns the name in the unit table, or null when the table has no such unit. `counts` without a number
 *   per turn is null as well: the number has to be asked.
 */
export function parseUnit(role: ColumnRole, text: string): string | null {
  if (role === 'direction') return ''
  // Mega differs from milli by its case alone; no small motor needs it, so it is asked rather than guessed.
  if (/^\W*M[NAVs]/.test(text)) return null
  const plain = plainSpelling(text)
  if (plain === '' && role !== 'duty') return null
  const found = UNITS[role].find((candidate) => candidate.spellings.includes(plain))
  if (found) return found.unit
  if (!COUNTED.has(role)) return null
  const number = COUNTS.exec(plain)?.[1] ?? (/[a-z]/.test(plain) ? COUNTS_PER_TURN.exec(plain)?.[1] : undefined)
  return number && Number(number) > 0 ? `counts/${Number(number)}` : null
}

/**
 * Size of a unit in SI (rad, N·m, A, V, s, rad/s; °C for temperature).
 *
 * @param role - what the column holds
 * @param unit - name in the unit table, as `parseUnit` gives it; `counts/8192` is 8192 counts a turn (of full scale for duty)
 * @returns SI value of one unit
 * @throws RangeError when the table has no such unit
 */
export function unitScale(role: ColumnRole, unit: string): number {
  if (role === 'direction') return 1
  const counts = /^counts\/(\d{1,10})$/.exec(unit)
  if (counts && COUNTED.has(role) && Number(counts[1]) > 0) return (role === 'angle' ? TURN_RAD : 1) / Number(counts[1])
  const found = UNITS[role].find((candidate) => candidate.unit === unit)
  if (!found) throw new RangeError(`unitScale: unit of ${role} must be one of ${unitNames(role).join(', ')}, not "${unit}"`)
  return found.scale
}

/**
 * Names of the units that a column may have, for a person to choose from.
 *
 * @param role - what the column holds
 * @returns the names in the unit table; `counts/N` stands for any whole number N
 */
export function unitNames(role: ColumnRole): string[] {
  const names = UNITS[role].map((candidate) => candidate.unit)
  return COUNTED.has(role) ? [...names, 'counts/N'] : names
}

/** Parts of a header cell in which its unit may stand, the likeliest first. */
function unitPlaces(header: string): string[] {
  const bracket = /[[({]([^\])}]*)[\])}]/.exec(header)?.[1]
  const slash = /\s\/\s*(.+)$|^[^\s/]+\/(.+)$/.exec(header)
  const words = header.trim().split(/[\s_,:]+/)
  const places = [bracket, slash?.[1] ?? slash?.[2], words.slice(-2).join(' '), words.at(-1)]
  if (header.includes('°')) places.push(/°[CF]?(\/s)?/.exec(header)?.[0])
  return places.filter((place): place is string => Boolean(place))
}

/**
 * Finds the unit that a header cell names: `angle_deg`, `Torque [mN·m]`, `Angle / deg`, `position_counts/8192`.
 *
 * @param role - what the column holds
 * @param header - text of the header cell
 * @returns the name in the unit table, or null when the header names none
 */
export function unitInHeader(role: ColumnRole, header: string): string | null {
  for (const place of unitPlaces(header)) {
    // A header that is one bare word ("t", "a") is a name, never a unit.
    if (place === header.trim()) continue
    const unit = parseUnit(role, place)
    if (unit !== null) return unit
  }
  return null
}
