import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import FigureRing from '~/components/figure/FigureRing.vue'
import FigureChart from '~/components/figure/FigureChart.vue'
import FigureRosette from '~/components/figure/FigureRosette.vue'
import FigureTrace from '~/components/figure/FigureTrace.vue'
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

describe('FigureComb by keyboard', () => {
  const order = (number: number) => ({ order: number, amplitudeNm: 1e-3 / number, phaseDeg: 0, expandedUncertaintyNm: 1e-5, significant: true, origins: ['other' as const], reason: `Reason ${number}.` })
  it.each([['ArrowLeft', 'Order 84'], ['End', 'Order 84'], ['ArrowRight', 'Order 7'], ['Home', 'Order 7']])('begins with %s at %s', async (key, words) => {
    const comb = await mountSuspended(FigureComb, { props: { orders: [order(84), order(7), order(12)], limits: [], highestOrder: 252, label: 'Amplitude by order' } })
    await comb.find('svg').trigger('keydown', { key })
    expect(comb.find('figcaption').text()).toContain(words)
    await comb.find('svg').trigger('keydown', { key: 'Escape' })
    expect(comb.find('figcaption').text()).not.toContain('Order')
  })

  it('says so where no order stands out', async () => {
    const comb = await mountSuspended(FigureComb, { props: { orders: [], limits: [], highestOrder: 64, label: 'Amplitude by order' } })
    await comb.find('svg').trigger('keydown', { key: 'ArrowRight' })
    expect(comb.find('figcaption').text()).toBe('no order stands out from the noise')
  })
})

describe('FigureTrace', () => {
  it('reads angle and three values at the place of the keys, from 0° on and round the turn', async () => {
    const trace = await mountSuspended(FigureTrace, { props: { coggingNm: turn(2e-3, 1), frictionNm: turn(0, 1).map(() => 1e-3), limitPeakToPeakNm: 5.4e-3, label: 'Torque' } })
    const caption = () => trace.find('figcaption').text()
    await trace.find('svg').trigger('keydown', { key: 'Home' })
    expect(caption()).toMatch(/0\.00°.*cogging 2\.000.*forward 3\.000.*reverse 1\.000/s)
    expect(trace.findAll('circle')).toHaveLength(3)
    await trace.find('svg').trigger('keydown', { key: 'ArrowLeft' })
    expect(caption()).toContain('359.65°')
    await trace.find('svg').trigger('keydown', { key: 'Escape' })
    expect(caption()).toContain('limit band')
  })
})

describe('FigureChart', () => {
  it('says a point that is not stated, and opens the lot of the point that is chosen', async () => {
    const chart = await mountSuspended(FigureChart, { props: { values: [4, null, 6], labels: ['1', '2', '3'], names: ['A', 'B', 'C'], limits: { centre: 4, lower: 3, upper: 5 }, sheetUpper: null, signals: [false, false, true], unit: 'mN·m', label: 'Cogging', summary: 'One signal.' } })
    const key = (name: string) => chart.find('svg').trigger('keydown', { key: name })
    await key('Home')
    await key('ArrowRight')
    expect(chart.find('figcaption').text()).toBe('B: not stated')
    await key('ArrowRight')
    expect(chart.find('figcaption').text()).toContain('C: 6 mN·m — outside the control limits')
    await key('Enter')
    expect(chart.emitted('open')).toEqual([[2]])
    expect(chart.find('desc').text()).toContain('Outside the control limits: C with 6 mN·m.')
  })
})

describe('FigureRosette', () => {
  const tile = (serial: string, more = {}) => ({ drawOrder: Number(serial), position: 1, serial, state: 'to-measure' as const, verdict: null, peakToPeakNm: null, ring: null, nonconformingClasses: [], attempts: 0, warnings: 0, ...more })
  it('says of each motor what it waits for, and in words where it lies in the guard band', async () => {
    const rosette = await mountSuspended(FigureRosette, { props: {
      samples: [tile('1'), tile('2'), tile('3'), tile('4', { state: 'incomplete' }), tile('5', { state: 'judged', verdict: 'conditional-pass', peakToPeakNm: 5e-3, ring: turn(2.5e-3, 84) })],
      lotNumber: '26-0001', limitPeakToPeakNm: 5.4e-3, working: new Set(['2']), refused: new Set(['3']),
    } })
    const words = rosette.findAll('li').map(item => item.text())
    expect(words[0]).toContain('to measure')
    expect(words[1]).toContain('being judged')
    expect(words[2]).toContain('file refused')
    expect(words[3]).toContain('other direction missing')
    expect(words[4]).toMatch(/conditional pass.*5\.00 mN·m.*in the guard band/s)
    expect(rosette.find('a').attributes('href')).toBe('/lots/26-0001/motors/5')
  })
})
