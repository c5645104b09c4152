import { spawnSync } from 'node:child_process'
import { readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { measurements } from '../../server/database/schema/measurements'
import { seedDemo } from '../../server/database/seed/seed-demo'
import { openTestServices } from './support/services'

const RUN = fileURLToPath(new URL('../../server/commands/run.mjs', import.meta.url))

function run(name: string, ...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [RUN, name, ...args], { encoding: 'utf8' })
  return { status, stdout, stderr }
}

describe('check-logbook and check-store', () => {
  it('pass on the demo’s data, and name what was altered behind the application’s back', async () => {
    const { services, folder } = openTestServices()
    await seedDemo(services, 'small')
    expect(run('check-logbook', '--data', folder)).toMatchObject({ status: 0, stdout: expect.stringContaining('Sound:') })
    expect(run('check-store', '--data', folder, '--sample', '8', '--seed', '0123456789abcdef')).toMatchObject({ status: 0, stdout: expect.stringContaining('8 of 8 measurements follow') })

    const stored = services.db.select().from(measurements).get()!
    const forged = { ...stored.result, characteristics: stored.result.characteristics.map(row => row.key === 'cogging.peakToPeak' ? { ...row, value: row.value! * 0.9 } : row) }
    services.db.update(measurements).set({ result: forged }).run()
    const figures = run('check-store', '--data', folder, '--sample', '1000')
    expect(figures.status).toBe(1)
    expect(figures.stdout).toMatch(/cogging\.peakToPeak is .*, stored is/)

    services.db.$client.exec('DROP TRIGGER logbook_no_update; UPDATE logbook SET content = \'{}\' WHERE sequence = 4')
    expect(run('check-logbook', '--data', folder)).toMatchObject({ status: 1, stdout: expect.stringContaining('Entry 4 no longer says what was written') })
  }, 120_000)

  it('name the raw file whose content changed on the disk', async () => {
    const { services, folder } = openTestServices()
    await seedDemo(services, 'small')
    const shelf = readdirSync(join(folder, 'files'))[0]!
    const path = join(folder, 'files', shelf, readdirSync(join(folder, 'files', shelf))[0]!)
    writeFileSync(path, readFileSync(path, 'utf8').replace(/\d(?=\n)/, digit => digit === '1' ? '2' : '1'))
    const check = run('check-store', '--data', folder)
    expect(check.status).toBe(1)
    expect(check.stdout).toContain('was altered on the disk')
  }, 120_000)

  it('say where they looked when there is no database', () => {
    expect(run('check-logbook', '--data', '/tmp/no-such-folder')).toMatchObject({ status: 1, stderr: expect.stringContaining('There is no database in /tmp/no-such-folder') })
  })
})
