import { describe, expect, it } from 'vitest'
import { firstRepeated, splitSerials } from '~/utils/serials'

describe('splitSerials', () => {
  it('takes one a line, and spaces, tabs, commas and semicolons between them, and leaves out what is empty', () => {
    expect(splitSerials('71-4410\r\n71-4417, 71-4424;71-4431\t71-4438\n\n')).toEqual(['71-4410', '71-4417', '71-4424', '71-4431', '71-4438'])
  })

  it('finds none in an empty list or in one of separators alone', () => {
    expect(splitSerials('')).toEqual([])
    expect(splitSerials(' \n, ;')).toEqual([])
  })
})

describe('firstRepeated', () => {
  it('names the serial that stands in the list twice', () => {
    expect(firstRepeated(['a', 'b', 'c', 'b', 'a'])).toBe('b')
  })

  it('gives null when all differ, upper and lower case being different serials', () => {
    expect(firstRepeated(['a', 'A', 'b'])).toBeNull()
    expect(firstRepeated([])).toBeNull()
  })
})
