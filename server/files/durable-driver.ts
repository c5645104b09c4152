import { randomUUID } from 'node:crypto'
import { open, mkdir, rename, rm } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import { defineDriver } from 'unstorage'
import type { Driver } from 'unstorage'
import fsDriver from 'unstorage/drivers/fs'

/**
 * unstorage's file-system driver with durable writes: temporary file, fsync, rename, fsync of the folder.
 * A name is therefore either absent or complete, even when the machine stops in the middle.
 */
export const durableDriver = defineDriver((options: { base: string }): Driver<{ base: string }, never> => {
  const plain = fsDriver({ base: options.base, ignore: ['**/*.part'] })

  async function write(key: string, value: Uint8Array | string): Promise<void> {
    const target = join(options.base, key.replaceAll(':', '/'))
    const folder = dirname(target)
    await mkdir(folder, { recursive: true })
    const temporary = join(folder, `${randomUUID()}.part`)
    try {
      const file = await open(temporary, 'wx')
      try {
        await file.writeFile(value)
        await file.sync()
      }
      finally {
        await file.close()
      }
      await rename(temporary, target)
    }
    catch (error) {
      await rm(temporary, { force: true })
      throw error
    }
    const directory = await open(folder, 'r')
    try {
      await directory.sync()
    }
    finally {
      await directory.close()
    }
  }

  return { ...plain, name: 'durable-fs', options, setItem: write, setItemRaw: write }
})
