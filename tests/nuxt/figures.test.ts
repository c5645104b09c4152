import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import FigureRing from '~/components/figure/FigureRing.vue'
import FigureComb from '~/components/figure/FigureComb.vue'
import VerdictMark from '~/components/verdict/VerdictMark.vue'

const turn = (amplitudeNm: number, order: number) => Array.from({ length: 1024 }, (_, index) => amplitudeNm * Math.cos(2 * Math.PI * order * index / 1024))

describe('VerdictMark', () => {
  it.each([['pass', 'circle', 'pass'], ['fail', 'rect', 'fail'], ['conditional-pass', 'circle', 'conditional pass'], ['conditional-fail', 'rect', 'conditional fail']] as const)('shows %s as a %s with its word', async (verdict, shape, word) => {
    const mark = await mountSuspended(VerdictMark, { props: { verdict } })
    expect(mark.find(shape).exists()).toBe(true)
    expect(mark.text()).toBe(word)
  })

  it('says "not judged" where there is no verdict', async () => {
    expect((await mountSuspended(VerdictMark, { props: { verdict: null } })).text()).toBe('not judged')
  })
})

describe('FigureRing', () => {
  it('draws nothing beyond the band for a motor inside its limit, and says so', async () => {
    const ring = await mountSuspended(FigureRing, { props: { values: turn(2e-3, 84), limitPeakToPeakNm: 5.4e-3, label: 'Motor 71-4410' } })
    expect(ring.find('path.stroke-fail').exists()).toBe(false)
    expect(ring.find('desc').text()).toContain('4.00')
    expect(ring.find('desc').text()).not.toContain('outside')
  })

  it('draws the parts beyond the band of a motor outside it, and says so', async () => {
    const ring = await mountSuspended(FigureRing, { props: { values: turn(3.4e-3, 84), limitPeakToPeakNm: 5.4e-3, label: 'Motor 71-4452' } })
    expect(ring.find('path.stroke-fail').attributes('d')!.length).toBeGreaterThan(100)
    expect(ring.find('desc').text()).toContain('outside the limit band')
  })
})

describe('FigureComb', () => {
  it('reads an order to the keyboard: amplitude and where it comes from', async () => {
    const comb = await mountSuspended(FigureComb, { props: {
      orders: [{ order: 84, amplitudeNm: 2e-3, phaseDeg: -90, expandedUncertaintyNm: 1e-5, significant: true, origins: ['design'], reason: 'The design order.' }, { order: 12, amplitudeNm: 8e-4, phaseDeg: 0, expandedUncertaintyNm: 1e-5, significant: true, origins: ['rotorSide'], reason: 'A multiple of the 12 slots.' }],
      limits: [{ order: 12, upperNm: 6e-4 }], highestOrder: 252, label: 'Amplitude by order',
    } })
    expect(comb.findAll('line.stroke-fail').length).toBeGreaterThan(0)
    await comb.find('svg').trigger('keydown', { key: 'ArrowRight' })
    expect(comb.find('figcaption').text()).toMatch(/Order (12|84), .*(slots|design order)/)
  })
})
