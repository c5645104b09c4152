import { describe, expect, it } from 'vitest'
import { seriesOf } from '#shared/compute/torque/estimate'
import { fitSeries } from '#shared/compute/torque/least-squares'
import { addReadings, emptyMoments } from '#shared/compute/torque/moments'
import reference from '../../reference/harmonics.json'
import { bytesOf, characteristic, figuresOf, randomSource, settingsWith } from './support'

/** Each case stands in the reference file with its source (numpy's rfft and lstsq, or a closed form). */
const caseOf = (id: string) => reference.cases.find((candidate) => candidate.id === id)! as unknown as {
  inputs: { angles_deg: number[]; y: number[]; dc: number; components: { k: number; A: number; phi: number }[] }
  expected: Record<string, { dc: number; harmonics: Record<string, { a_cos: number; b_sin: number }> }> & { harmonics: Record<string, { a_cos: number; b_sin: number }>; se_coef: number[] }
}

function fit(angleDeg: number[], values: number[], highestOrder: number) {
  const angles = Float64Array.from(angleDeg, (angle) => (angle * Math.PI) / 180)
  const moments = emptyMoments(highestOrder)
  addReadings(moments, angles, Float64Array.from(values), new Int8Array(angles.length).fill(1), 1)
  return seriesOf(fitSeries(moments, highestOrder).spectrum, true)
}

function compose(angleDeg: number[], dc: number, components: { k: number; A: number; phi: number }[]) {
  return angleDeg.map((angle) => components.reduce((sum, { k, A, phi }) => sum + A * Math.cos((k * angle * Math.PI) / 180 + phi), dc))
}

/** Least squares on the same basis by Gaussian elimination, as an independent check. */
function denseLeastSquares(angleDeg: number[], values: number[], highestOrder: number): number[] {
  const basis = angleDeg.map((angle) => [1, ...Array.from({ length: highestOrder }, (_, index) => ((index + 1) * angle * Math.PI) / 180).flatMap((phase) => [Math.cos(phase), Math.sin(phase)])])
  const size = 2 * highestOrder + 1
  const matrix = Array.from({ length: size }, (_, row) => [
    ...Array.from({ length: size }, (_, column) => basis.reduce((sum, line) => sum + line[row]! * line[column]!, 0)),
    basis.reduce((sum, line, index) => sum + line[row]! * values[index]!, 0),
  ])
  for (let pivot = 0; pivot < size; pivot++) {
    const best = matrix.slice(pivot).reduce((found, line, index) => (Math.abs(line[pivot]!) > Math.abs(matrix[found]![pivot]!) ? pivot + index : found), pivot)
    ;[matrix[pivot], matrix[best]] = [matrix[best]!, matrix[pivot]!]
    for (let row = 0; row < size; row++) {
      if (row === pivot) continue
      const factor = matrix[row]![pivot]! / matrix[pivot]![pivot]!
      for (let column = pivot; column <= size; column++) matrix[row]![column]! -= factor * matrix[pivot]![column]!
    }
  }
  return matrix.map((line, row) => line[size]! / line[row]!)
}

describe('fitSeries against published cases', () => {
  it('equals numpy\'s FFT on one uniform turn', () => {
    const { inputs, expected } = caseOf('uniform-360')
    const angles = Array.from({ length: 360 }, (_, index) => index)
    const series = fit(angles, compose(angles, inputs.dc, inputs.components), 30)
    for (const [order, { a_cos, b_sin }] of Object.entries(expected.fft!.harmonics)) {
      expect(series.cosNm[Number(order) - 1]).toBeCloseTo(a_cos, 8)
      expect(series.sinNm[Number(order) - 1]).toBeCloseTo(b_sin, 8)
    }
    expect(series.meanNm).toBeCloseTo(100, 8)
  })

  it('puts three turns on mechanical orders', () => {
    const { inputs, expected } = caseOf('three-revolutions')
    const angles = Array.from({ length: 600 }, (_, index) => (index * 1080) / 600)
    const series = fit(angles, compose(angles, inputs.dc, inputs.components), 12)
    for (const [order, { a_cos, b_sin }] of Object.entries(expected.fft_by_mechanical_harmonic!.harmonics)) {
      expect(series.cosNm[Number(order) - 1]).toBeCloseTo(a_cos, 8)
      expect(series.sinNm[Number(order) - 1]).toBeCloseTo(b_sin, 8)
    }
  })

  it('is exact with a repeated end point, where a plain FFT leaks', () => {
    const { inputs, expected } = caseOf('duplicate-endpoint')
    const angles = Array.from({ length: 73 }, (_, index) => 5 * index)
    const series = fit(angles, compose(angles, inputs.dc, inputs.components), 10)
    for (const [order, { a_cos, b_sin }] of Object.entries(expected.least_squares!.harmonics)) {
      expect(series.cosNm[Number(order) - 1]).toBeCloseTo(a_cos, 8)
      expect(series.sinNm[Number(order) - 1]).toBeCloseTo(b_sin, 8)
    }
    expect(series.cosNm[4]).toBeCloseTo(0, 9)
  })

  it.each([['nonuniform-jitter-12345', 6], ['gap-100-160', 3]])('agrees with numpy on %s within three standard errors, though it fits all orders', (id, highestOrder) => {
    const { inputs, expected } = caseOf(id)
    const series = fit(inputs.angles_deg, inputs.y, highestOrder)
    const error = 3 * Math.max(...expected.se_coef)
    for (const [order, { a_cos, b_sin }] of Object.entries(expected.harmonics)) {
      expect(Math.abs(series.cosNm[Number(order) - 1]! - a_cos)).toBeLessThan(error)
      expect(Math.abs(series.sinNm[Number(order) - 1]! - b_sin)).toBeLessThan(error)
    }
  })

  it.each([['nonuniform-jitter-12345', 9], ['gap-100-160', 2]])('equals dense least squares on all orders of %s', (id, highestOrder) => {
    const { inputs } = caseOf(id)
    const series = fit(inputs.angles_deg, inputs.y, highestOrder)
    const dense = denseLeastSquares(inputs.angles_deg, inputs.y, highestOrder)
    expect(Math.abs(series.meanNm - dense[0]!)).toBeLessThan(1e-8 * dense[0]!)
    for (let order = 1; order <= highestOrder; order++) {
      expect(Math.abs(series.cosNm[order - 1]! - dense[2 * order - 1]!)).toBeLessThan(1e-8 * dense[0]!)
      expect(Math.abs(series.sinNm[order - 1]! - dense[2 * order]!)).toBeLessThan(1e-8 * dense[0]!)
    }
  })
})

describe('fitSeries', () => {
  /** The rule: the same result as the FFT on a full uniform grid, to 1e-9 of the peak. */
  it.each([1024, 3600, 5000])('gives the discrete Fourier sums of %i uniform readings to 1e-9', (count) => {
    const { normal } = randomSource(7)
    const angles = Array.from({ length: count }, (_, index) => (index * 360) / count)
    const values = angles.map(() => normal())
    const series = fit(angles, values, 120)
    for (const order of [1, 2, 7, 84, 119, 120]) {
      const cosine = values.reduce((sum, value, index) => sum + value * Math.cos((2 * Math.PI * order * index) / count), 0) * (2 / count)
      const sine = values.reduce((sum, value, index) => sum + value * Math.sin((2 * Math.PI * order * index) / count), 0) * (2 / count)
      expect(Math.abs(series.cosNm[order - 1]! - cosine)).toBeLessThan(1e-9)
      expect(Math.abs(series.sinNm[order - 1]! - sine)).toBeLessThan(1e-9)
    }
  })

  it('recovers an order exactly from angles of any jitter: nothing is attenuated by bins', () => {
    const { uniform } = randomSource(3)
    const angles = Array.from({ length: 4000 }, () => 360 * uniform())
    const series = fit(angles, angles.map((angle) => Math.cos((200 * angle * Math.PI) / 180 + 0.4)), 210)
    expect(Math.hypot(series.cosNm[199]!, series.sinNm[199]!)).toBeCloseTo(1, 7)
  })

  it('refuses fewer readings than coefficients', () => {
    expect(() => fit([0, 90, 180, 270], [1, 2, 3, 4], 2)).toThrow(RangeError)
  })
})

describe('even and odd part', () => {
  /** Closed form: friction (T₊ − T₋)/2 = 10, position part 2, −1, −2, 1 at 0, 90, 180, 270°. */
  it('separates friction from cogging as the closed form does', () => {
    const { expected } = reference.cases.find(({ id }) => id === 'direction-split')! as unknown as { expected: { friction: number[]; position_part: number[] } }
    const [a, b] = [expected.position_part[0]!, expected.position_part[1]!]
    const rows = ['direction,angle_deg,torque_mNm']
    for (const [direction, sign] of [['fwd', 1], ['rev', -1]] as const) {
      for (let step = 0; step < 1200; step++) {
        const angle = (sign === 1 ? step : 1200 - step) * 0.3
        const radians = (angle * Math.PI) / 180
        rows.push(`${direction},${angle.toFixed(4)},${a * Math.cos(radians) + b * Math.sin(radians) + sign * expected.friction[0]!}`)
      }
    }
    const result = figuresOf(bytesOf(rows), settingsWith({ design: { kind: 'brushless', slots: 9, poles: 6 } }))
    expect(result.cogging.cosNm[0]! * 1e3).toBeCloseTo(2, 6)
    expect(result.cogging.sinNm[0]! * 1e3).toBeCloseTo(-1, 6)
    expect(characteristic(result, 'friction.mean').value! * 1e3).toBeCloseTo(10, 6)
  })
})
