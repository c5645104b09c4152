import { describe, expect, it } from 'vitest'
import { matchSerial } from '#shared/compute/intake/label/match-serial'

const SERIALS = ['71-4452', '71-4453', '71-445', 'AX9', 'AX9-1']

describe('matchSerial', () => {
  it.each([
    ['71-4452_fwd.csv', '71-4452'], ['map 71-4452 (2).csv', '71-4452'], ['MAP_ax9.CSV', 'AX9'], ['ax9-1.csv.gz', 'AX9-1'], ['lot/71-4453/71-4452.csv', '71-4452'],
    ['C:\\maps\\71-4452.csv', '71-4452'], ['71-445.csv', '71-445'], ['71-4452', '71-4452'], ['71-4452_71-4452.csv', '71-4452'], ['71_4452.csv', '71-4452'], ['71 4452 rev.csv', '71-4452'],
  ])('finds in "%s" the serial %s', (name, serial) => {
    expect(matchSerial(name, SERIALS)).toEqual({ serial })
  })

  it.each(['171-4452.csv', '71-44521.csv', '71-4452a.csv', 'x71-4452.csv', '714452.csv', 'map.csv', ''])('finds none in "%s"', (name) => {
    expect(matchSerial(name, SERIALS)).toBeNull()
  })

  it('does not take a serial for a longer one that begins alike', () => {
    expect(matchSerial('71-4452.csv', ['71-445'])).toBeNull()
  })

  it('names all serials when a name holds two', () => {
    expect(matchSerial('71-4452_vs_71-4453.csv', SERIALS)).toEqual({ ambiguous: ['71-4452', '71-4453'] })
  })

  it('calls serials that differ in case only ambiguous', () => {
    expect(matchSerial('ax9.csv', ['AX9', 'ax9'])).toEqual({ ambiguous: ['AX9', 'ax9'] })
  })

  it('takes a serial with signs that mean something in patterns literally', () => {
    expect(matchSerial('A.1+B.csv', ['A.1+B'])).toEqual({ serial: 'A.1+B' })
    expect(matchSerial('Ax1+B.csv', ['A.1+B'])).toBeNull()
  })

  it('ignores empty serials', () => {
    expect(matchSerial('map.csv', ['', ' '])).toBeNull()
  })
})
