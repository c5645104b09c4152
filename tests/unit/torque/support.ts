import { readFileSync } from 'node:fs'
import { gunzipSync } from 'node:zlib'
import { analyse } from '#shared/compute/torque/analyse'
import type { AnalysisSettings, FourierSeries, MapResult, RigProperties } from '#shared/compute/terms/measurement'
import type { MotorDesign } from '#shared/compute/terms/motor'

export const RIG: RigProperties = {
  rangeNm: 1, torqueResolutionNm: 1e-8, torqueRelativeUncertainty: 0.002, torqueAbsoluteUncertaintyNm: 1e-6, angleResolutionRad: 1e-4, bandwidthHz: null,
}

export const OUTRUNNER: MotorDesign = { kind: 'brushless', slots: 12, poles: 14 }

export function settingsWith(changes: Partial<AnalysisSettings> = {}): AnalysisSettings {
  return {
    method: 'torque-sensor', design: OUTRUNNER, ratedTorqueNm: 0.1, highestOrder: null, ordersNamed: [], rippleDefinition: 'peakToPeakOverRated', compensation: null,
    recipe: null, rig: RIG, ...changes,
  }
}

export interface MapReference {
  design: MotorDesign
  ratedTorqueNm: number
  countsPerTurn: number
  truth: {
    peakToPeakMilliNm: number
    rmsMilliNm: number
    frictionMeanMilliNm: number | null
    orders: { order: number; amplitudeMilliNm: number; phaseDeg: number }[]
  }
  rippleRatioPercent: Record<string, number>
}

/** A sample map with exact answers: synthetic, from a physical model. */
export function readMap(name: string): { bytes: Uint8Array; reference: MapReference } {
  const place = (ending: string) => new URL(`../../reference/maps/${name}${ending}`, import.meta.url)
  return { bytes: new Uint8Array(gunzipSync(readFileSync(place('.csv.gz')))), reference: JSON.parse(readFileSync(place('.json'), 'utf8')) }
}

/** Seeded uniform numbers 0…1 (mulberry32) and standard normal ones. */
export function randomSource(seed: number) {
  let state = seed
  const uniform = () => {
    state = (state + 0x6D2B79F5) | 0
    let t = Math.imul(state ^ (state >>> 15), 1 | state)
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
  return { uniform, normal: () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform()) }
}

export interface BenchSetup {
  /** order → [amplitude mN·m, phase in degrees]. */
  orders: Record<number, [number, number]>
  frictionMilliNm: number
  zeroMilliNm: number
  noiseMilliNm: number
  samples: number
  turns: number
  directions: ('fwd' | 'rev')[]
  directionColumn: boolean
  timeColumn: boolean
  /** Seconds a turn. */
  secondsATurn: number
  seed: number
  /** Changes the torque, mN·m, of a row. */
  distort: (torque: number, row: number, angleDeg: number) => number
  /** Changes the angle written, degrees. */
  readAngle: (angleDeg: number) => number
}

export const BENCH: BenchSetup = {
  orders: { 84: [3, -90], 12: [0.4, 30], 14: [0.3, -60] }, frictionMilliNm: 1.5, zeroMilliNm: 0, noiseMilliNm: 0.01, samples: 2400, turns: 1, directions: ['fwd', 'rev'],
  directionColumn: true, timeColumn: false, secondsATurn: 60, seed: 1, distort: (torque) => torque, readAngle: (angle) => angle,
}

/** Rows as a bench would write them. */
export function benchRows(changes: Partial<BenchSetup> = {}): string[] {
  const setup = { ...BENCH, ...changes }
  const { normal } = randomSource(setup.seed)
  const rows: string[] = [[...(setup.directionColumn ? ['direction'] : []), ...(setup.timeColumn ? ['time_s'] : []), 'angle_deg', 'torque_mNm'].join(',')]
  let row = 0
  for (const direction of setup.directions) {
    const count = Math.round(setup.samples * setup.turns)
    for (let step = 0; step < count; step++, row++) {
      const angle = ((direction === 'fwd' ? step : count - step) * 360) / setup.samples
      const sign = direction === 'fwd' ? 1 : -1
      let torque = setup.zeroMilliNm + sign * setup.frictionMilliNm + setup.noiseMilliNm * normal()
      for (const [order, [amplitude, phase]] of Object.entries(setup.orders)) torque += amplitude * Math.cos(((Number(order) * angle + phase) * Math.PI) / 180)
      const time = ((row * setup.secondsATurn) / setup.samples).toFixed(5)
      const cells = [...(setup.directionColumn ? [direction] : []), ...(setup.timeColumn ? [time] : []), setup.readAngle(angle).toFixed(6), setup.distort(torque, row, angle).toFixed(7)]
      rows.push(cells.join(','))
    }
  }
  return rows
}

export const bytesOf = (text: string | string[]) => new TextEncoder().encode(Array.isArray(text) ? `${text.join('\n')}\n` : text)

export const bench = (changes: Partial<BenchSetup> = {}) => bytesOf(benchRows(changes))

/** The figures of a file; throws the fault's sentence when there are none. */
export function figuresOf(bytes: Uint8Array, settings: AnalysisSettings = settingsWith()): MapResult {
  const outcome = analyse([{ name: 'map.csv', bytes }], settings)
  if (!outcome.ok) throw new Error(`${outcome.fault.code}: ${outcome.fault.sentence}`)
  return outcome.result
}

export function faultOf(bytes: Uint8Array, settings: AnalysisSettings = settingsWith()) {
  const outcome = analyse([{ name: 'map.csv', bytes }], settings)
  if (outcome.ok) throw new Error('the file was analysed')
  return outcome.fault
}

export function characteristic(result: MapResult, key: string) {
  const found = result.characteristics.find((candidate) => candidate.key === key)
  if (!found) throw new Error(`no characteristic ${key}`)
  return found
}

export const warningCodes = (result: MapResult) => result.warnings.map(({ code }) => code)

export function amplitude(series: FourierSeries, order: number): number {
  return Math.hypot(series.cosNm[order - 1]!, series.sinNm[order - 1]!)
}
