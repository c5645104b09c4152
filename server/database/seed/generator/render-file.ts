import type { ModelMotor } from './motor-model'
import type { SeededRandom } from './random'

/** How a rig writes its files. */
export type Dialect = 'plain' | 'semicolon' | 'tab-radian' | 'space-run' | 'counts-ounce' | 'gram-force' | 'unnamed'

export interface SweepInput {
  motor: ModelMotor
  serial: string
  dialect: Dialect
  /** Readings each way, over all turns. */
  rowsPerDirection: number
  /** Turns each way; one when left out. */
  turns?: number
  directions: 'both' | 'forward' | 'reverse'
  /** Standard deviation of a torque reading, N·m. */
  noiseNm: number
  /** Transducer's zero, N·m. */
  zeroNm: number
  /** What the zero wanders by from the first reading of the file to the last, N·m, evenly in time; none when left out. */
  driftNm?: number
  /** Viscous drag at the speed of the sweep, N·m; none when left out. */
  viscousNm?: number
  /** The angle sensor's disc sits off centre: at θ the sensor reads θ + ε·cos θ, ε in rad; none when left out. */
  angleSensorEccentricityRad?: number
  /** Temperature of the magnets, °C, and their remanence coefficient about the reference, 1/K: torque goes with its square. The plain dialect then has a column of it. */
  temperature?: { celsius: number; referenceCelsius: number; remanencePerKelvin: number }
  random: SeededRandom
}

export interface RenderedFile { name: string; bytes: Uint8Array }

const COUNTS = 16384
const OUNCE_INCH_NM = 0.00706155181422604
const GRAM_CM_NM = 9.80665e-5

const TURN = 2 * Math.PI

interface Reading { direction: 1 | -1; counts: number; torqueNm: number }

/** Turns the motor slowly, one or more turns each way, and writes what sensor and encoder (16 384 counts, read down to the last whole count) say. */
export function renderFile(input: SweepInput): RenderedFile {
  const readings = [
    ...(input.directions === 'reverse' ? [] : sweep(input, 1, 0)),
    ...(input.directions === 'forward' ? [] : sweep(input, -1, input.directions === 'both' ? 1 : 0)),
  ]
  const suffix = input.directions === 'both' ? '' : input.directions === 'forward' ? '_fwd' : '_rev'
  const { text, extension, latin1 } = WRITERS[input.dialect](readings, input)
  return { name: `${input.serial}${suffix}.${extension}`, bytes: new Uint8Array(Buffer.from(text, latin1 ? 'latin1' : 'utf8')) }
}

function sweep(input: SweepInput, direction: 1 | -1, sweepsBefore: number): Reading[] {
  const { motor, rowsPerDirection: rows, turns = 1, random } = input
  const driftPerSweep = (input.driftNm ?? 0) / (input.directions === 'both' ? 2 : 1)
  const [magnets, eccentricity] = [magnetFactor(input), input.angleSensorEccentricityRad ?? 0]
  return Array.from({ length: rows }, (_, index) => {
    const share = (index + 0.3 * random.uniform()) / rows
    const angle = TURN * turns * (direction === 1 ? share : 1 - share)
    const resistance = motor.resistanceNm(angle) + (input.viscousNm ?? 0)
    const torqueNm = input.zeroNm + driftPerSweep * (sweepsBefore + share) + magnets * motor.torqueNm(angle) + direction * resistance + input.noiseNm * random.gaussian()
    return { direction, counts: countsAt(angle + eccentricity * Math.cos(angle)), torqueNm }
  })
}

/** Whole counts within the turn. */
function countsAt(angleRad: number): number {
  const counts = Math.floor(angleRad / TURN * COUNTS) % COUNTS
  return counts < 0 ? counts + COUNTS : counts
}

/** What temperature leaves of the magnetic torque. */
function magnetFactor({ temperature }: SweepInput): number {
  return temperature ? (1 + temperature.remanencePerKelvin * (temperature.celsius - temperature.referenceCelsius)) ** 2 : 1
}

let degreeTexts: string[] | null = null

/** Degrees of a reading as text; there are only so many counts, so each is written once. */
function degrees(reading: Reading): string {
  degreeTexts ??= Array.from({ length: COUNTS }, (_, counts) => (360 * counts / COUNTS).toFixed(4))
  return degreeTexts[reading.counts]!
}
const word = (reading: Reading) => reading.direction === 1 ? 'fwd' : 'rev'
interface Written { text: string; extension: string; latin1?: boolean }

const WRITERS: Record<Dialect, (readings: Reading[], input: SweepInput) => Written> = {
  'plain': (readings, { temperature }) => {
    const [title, cell] = temperature ? [',temperature_degC', `,${temperature.celsius.toFixed(1)}`] : ['', '']
    return { extension: 'csv', text: lines([`direction,angle_deg,torque_mN.m${title}`, ...readings.map(row => `${word(row)},${degrees(row)},${(row.torqueNm * 1e3).toFixed(5)}${cell}`)]) }
  },
  'semicolon': (readings, input) => ({
    extension: 'csv', latin1: true,
    text: lines([`# motor ${input.serial}`, `# slow sweep, ${(input.turns ?? 1) === 1 ? 'one turn' : `${input.turns} turns`} each way`, 'direction;angle [°];torque [mNm]', ...readings.map(row => `${word(row)};${degrees(row).replace('.', ',')};${(row.torqueNm * 1e3).toFixed(5).replace('.', ',')}`)], '\r\n'),
  }),
  'tab-radian': readings => ({ extension: 'tsv', text: lines(['direction\tangle (rad)\ttorque (N.m)', ...readings.map(row => `${row.direction}\t${(2 * Math.PI * row.counts / COUNTS).toFixed(7)}\t${row.torqueNm.toFixed(8)}`)]) }),
  'space-run': readings => ({ extension: 'txt', text: lines(['angle_deg torque_mN.m', ...readings.map(row => `${degrees(row)} ${(row.torqueNm * 1e3).toFixed(5)}`)]) }),
  'counts-ounce': readings => ({ extension: 'csv', text: lines([`direction,angle_counts/${COUNTS},torque_ozf.in`, ...readings.map(row => `${word(row)},${row.counts},${(row.torqueNm / OUNCE_INCH_NM).toFixed(6)}`)]) }),
  'gram-force': readings => ({ extension: 'csv', text: lines(['direction,angle_deg,torque_gf.cm', ...readings.map(row => `${word(row)},${degrees(row)},${(row.torqueNm / GRAM_CM_NM).toFixed(4)}`)]) }),
  'unnamed': readings => ({ extension: 'csv', text: lines(['direction,angle_deg,torque', ...readings.map(row => `${word(row)},${degrees(row)},${(row.torqueNm * 1e3).toFixed(5)}`)]) }),
}

const lines = (rows: string[], end = '\n') => rows.join(end) + end
