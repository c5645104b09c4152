import { describe, expect, it } from 'vitest'
import { estimateFromTorqueSensor } from '#shared/compute/torque/torque-sensor'
import { characteristicsOf } from '#shared/compute/torque/characteristics'
import { evaluateSeries } from '#shared/compute/torque/evaluate'
import { expandedNm } from '#shared/compute/torque/uncertainty'
import { tabulateOrders } from '#shared/compute/torque/orders'
import type { Readings } from '#shared/compute/torque/readings'
import type { FourierSeries, RigProperties } from '#shared/compute/terms/measurement'
import { randomSource, RIG, settingsWith } from './support'

const SAMPLES = 1200
const ORDERS = [12, 14, 24, 28, 36, 84, 168]

interface Motor {
  series: FourierSeries
  friction: number
}

function randomMotor(uniform: () => number): Motor {
  const series: FourierSeries = { meanNm: 0, cosNm: new Array<number>(252).fill(0), sinNm: new Array<number>(252).fill(0) }
  for (const order of ORDERS) {
    const amplitude = (order === 84 ? 2e-3 : 4e-4) * (0.5 + uniform())
    const phase = 2 * Math.PI * uniform()
    series.cosNm[order - 1] = amplitude * Math.cos(phase)
    series.sinNm[order - 1] = -amplitude * Math.sin(phase)
  }
  return { series, friction: 1e-3 * (1 + uniform()) }
}

/** Readings of a motor on a rig whose scale and noise are drawn anew. */
function measure(motor: Motor, rig: RigProperties, noiseNm: number, turns: number, { uniform, normal }: ReturnType<typeof randomSource>): Readings {
  const gain = 1 + rig.torqueRelativeUncertainty * normal()
  const rows = 2 * turns * SAMPLES
  const table = evaluateSeries(motor.series, SAMPLES)
  const readings: Readings = {
    rows, angleRad: new Float64Array(rows), torqueNm: new Float64Array(rows), timeS: null, direction: new Int8Array(rows), lines: new Uint32Array(rows), starts: [0, rows], names: ['simulated'],
  }
  const zero = 1e-3 * (uniform() - 0.5)
  for (let row = 0; row < rows; row++) {
    const forward = row < rows / 2
    const step = forward ? row % SAMPLES : SAMPLES - 1 - (row % SAMPLES)
    readings.angleRad[row] = (2 * Math.PI * step) / SAMPLES
    readings.direction![row] = forward ? 1 : -1
    const exact = gain * (table[step]! + (forward ? motor.friction : -motor.friction)) + zero + noiseNm * normal()
    readings.torqueNm[row] = Math.round(exact / rig.torqueResolutionNm) * rig.torqueResolutionNm
  }
  return readings
}

/** Share of motors whose truth lies within value ± U. */
function coverage(rig: RigProperties, noiseNm: number, turns: number, motors: number, seed: number): Record<string, number> {
  const random = randomSource(seed)
  const inside: Record<string, number> = {}
  const settings = settingsWith({ rig, highestOrder: 180, ordersNamed: [12, 84] })
  for (let count = 0; count < motors; count++) {
    const motor = randomMotor(random.uniform)
    const estimated = estimateFromTorqueSensor(measure(motor, rig, noiseNm, turns, random), settings)
    if (!estimated.ok) throw new Error(estimated.fault.sentence)
    const found = characteristicsOf(estimated.estimate, tabulateOrders(estimated.estimate, settings), settings)
    const exact = evaluateSeries(motor.series, 10_080)
    const amplitude = (order: number) => Math.hypot(motor.series.cosNm[order - 1]!, motor.series.sinNm[order - 1]!)
    const truth: Record<string, number> = {
      'cogging.peakToPeak': Math.max(...exact) - Math.min(...exact), 'cogging.rms': Math.sqrt(ORDERS.reduce((sum, order) => sum + amplitude(order) ** 2, 0) / 2),
      'friction.mean': motor.friction, 'order.12': amplitude(12), 'order.84': amplitude(84),
    }
    for (const [key, value] of Object.entries(truth)) {
      const figure = found.find((candidate) => candidate.key === key)!
      if (Math.abs(figure.value! - value) <= figure.expandedUncertainty!) inside[key] = (inside[key] ?? 0) + 1 / motors
    }
  }
  return inside
}

describe('expandedNm', () => {
  /** U = 2·√((0.002·5)² + 0.001² + 0.003²) mN·m; worked by hand. */
  it('adds calibration and scatter as variances and doubles the root', () => {
    expect(expandedNm(5e-3, 3e-6, { ...RIG, torqueRelativeUncertainty: 0.002, torqueAbsoluteUncertaintyNm: 1e-6 })).toBeCloseTo(2 * Math.sqrt(1e-5 ** 2 + 1e-6 ** 2 + 3e-6 ** 2), 12)
  })

  it('is null without a rig', () => {
    expect(expandedNm(1, 1, null)).toBeNull()
  })
})

describe('the expanded uncertainty (k = 2) holds the truth of about 95 % of 200 simulated motors', () => {
  const exact: RigProperties = { ...RIG, torqueAbsoluteUncertaintyNm: 0, torqueResolutionNm: 1e-9, torqueRelativeUncertainty: 0 }
  it.each([
    ['noise prevails', exact, 1e-4, 1],
    ['noise prevails over two turns', exact, 1e-4, 2],
    ['the calibration prevails', { ...exact, torqueRelativeUncertainty: 0.005 }, 2e-5, 1],
    ['the resolution is coarse', { ...exact, torqueRelativeUncertainty: 0.001, torqueResolutionNm: 1e-4 }, 3e-5, 1],
  ] as const)('when %s', (_, rig, noiseNm, turns) => {
    const shares = Object.entries(coverage(rig, noiseNm, turns, 200, 17))
    const mean = shares.reduce((sum, [, share]) => sum + share, 0) / shares.length
    // Of 200 motors a true 95 % shows itself as 90.5 to 99 % (three binomial standard deviations); the mean of five figures lies closer.
    for (const [key, share] of shares) {
      expect(share, key).toBeGreaterThan(0.905)
      expect(share, key).toBeLessThan(0.995)
    }
    expect(mean).toBeGreaterThan(0.93)
    expect(mean).toBeLessThan(0.98)
  }, 60_000)
})
