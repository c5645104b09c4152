import { describe, expect, it } from 'vitest'
import { drawSample, nextWord, seededState } from '#shared/compute/sampling/draw'
import type { GeneratorState } from '#shared/compute/sampling/draw'
import reference from '../../reference/draw.json'

const SEED = '0123456789abcdef0123456789abcdef'

describe('nextWord', () => {
  it('gives the reference outputs of xoshiro128** for the state 1, 2, 3, 4', () => {
    const state = [...reference.generator.state] as GeneratorState
    expect(reference.generator.words.map(() => nextWord(state))).toEqual(reference.generator.words)
  })
})

describe('drawSample', () => {
  it.each(reference.draws.cases)('repeats the draw of $n from $lotSize with seed $seed', ({ positions, ...request }) => {
    expect(drawSample(request)).toEqual(positions)
  })

  it('draws different positions from 1 to N', () => {
    const drawn = drawSample({ lotSize: 300, n: 250, seed: SEED })
    expect(new Set(drawn).size).toBe(250)
    expect(Math.min(...drawn)).toBeGreaterThanOrEqual(1)
    expect(Math.max(...drawn)).toBeLessThanOrEqual(300)
  })

  it('draws every position when n = N', () => {
    const drawn = drawSample({ lotSize: 50, n: 50, seed: SEED })
    expect(drawn.toSorted((a, b) => a - b)).toEqual(Array.from({ length: 50 }, (_, i) => i + 1))
  })

  it('begins a larger draw with the smaller one of the same seed', () => {
    expect(drawSample({ lotSize: 300, n: 80, seed: SEED }).slice(0, 32)).toEqual(drawSample({ lotSize: 300, n: 32, seed: SEED }))
  })

  it('takes the seed in either case and tells other seeds apart', () => {
    const draw = (seed: string) => drawSample({ lotSize: 1000, n: 10, seed })
    expect(draw(SEED.toUpperCase())).toEqual(draw(SEED))
    expect(draw(SEED.replace(/f$/, 'e'))).not.toEqual(draw(SEED))
  })

  it('draws each of 20 positions equally often: χ² of 4 000 draws of 5 below the 99.99 % point for 19 degrees of freedom', () => {
    const counts = new Array<number>(20).fill(0)
    for (let i = 0; i < 4000; i++) {
      const seed = i.toString(16).padStart(16, '0')
      for (const position of drawSample({ lotSize: 20, n: 5, seed })) counts[position - 1]!++
    }
    const chiSquare = counts.reduce((sum, count) => sum + (count - 1000) ** 2 / 1000, 0)
    expect(chiSquare).toBeLessThan(50.8)
  })

  it('never starts from the all-zero state', () => {
    expect(seededState('0'.repeat(32)).some(word => word !== 0)).toBe(true)
  })

  it.each(['', 'g'.repeat(16), '0'.repeat(15), '0'.repeat(65), `${SEED} `])('refuses the seed "%s"', (seed) => {
    expect(() => drawSample({ lotSize: 10, n: 1, seed })).toThrow(/seed must be 16 to 64/)
  })

  it.each([[0, 0], [10, 11], [10, -1], [10, 1.5], [2 ** 32, 1]])('refuses lot size %d with n = %d', (lotSize, n) => {
    expect(() => drawSample({ lotSize, n, seed: SEED })).toThrow(RangeError)
  })
})
