import { strToU8, zipSync } from 'fflate'
import { describe, expect, it } from 'vitest'
import { openArchives } from '~/utils/upload-files'

const zip = (name: string, members: Record<string, string>) => new File([zipSync(Object.fromEntries(Object.entries(members).map(([member, text]) => [member, strToU8(text)]))) as Uint8Array<ArrayBuffer>], name)

describe('openArchives', () => {
  it('leaves files that are no zip as they are', async () => {
    const file = new File(['angle_deg,torque_mN.m\n'], '71-4410.csv')
    expect(await openArchives([file])).toEqual({ files: [file], problems: [] })
  })

  it('replaces a zip by its maps, byte for byte, without their folders, notes and hidden files', async () => {
    const text = 'angle_deg,torque_mN.m\n0,1.25\n'
    const { files, problems } = await openArchives([zip('LOT.ZIP', { 'maps/71-4410.csv': text, 'read-me-first.md': 'notes', '__MACOSX/._71-4410.csv': 'x', 'maps/.hidden': 'x' })])
    expect(problems).toEqual([])
    expect(files.map(file => file.name)).toEqual(['71-4410.csv'])
    expect(await files[0]!.text()).toBe(text)
  })

  it('says which file is no zip though its name says so, and still gives the others', async () => {
    const good = new File(['a'], '71-4417.csv')
    const { files, problems } = await openArchives([new File(['not a zip at all'], 'broken.zip'), good])
    expect(files).toEqual([good])
    expect(problems).toHaveLength(1)
    expect(problems[0]).toMatch(/^broken\.zip cannot be opened as a zip\./)
  })

  it('takes 500 files and says that there were more, but says nothing at exactly 500', async () => {
    const many = (count: number) => Array.from({ length: count }, (_, index) => new File(['a'], `${index}.csv`))
    expect((await openArchives(many(500))).problems).toEqual([])
    const over = await openArchives(many(501))
    expect(over.files).toHaveLength(500)
    expect(over.problems[0]).toMatch(/^More than 500 files at once/)
  })

  it('sends nothing of a zip with more than 500 maps, but opens one with exactly 500', async () => {
    const members = (count: number) => Object.fromEntries(Array.from({ length: count }, (_, index) => [`${index}.csv`, 'a']))
    expect((await openArchives([zip('full.zip', members(500))])).files).toHaveLength(500)
    const refused = await openArchives([zip('over.zip', members(501))])
    expect(refused.files).toEqual([])
    expect(refused.problems[0]).toBe('over.zip holds more than 500 files. Nothing of it was sent; split it.')
  })
})
