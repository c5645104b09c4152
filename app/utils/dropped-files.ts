import { MOST_FILES, NOT_A_MAP, openArchives } from './upload-files'
import type { GatheredFiles } from './upload-files'

/** The files of a drop, those in dropped folders too. To be called before the event ends: the browser forgets the items after it. */
export async function droppedFiles(transfer: DataTransfer): Promise<GatheredFiles> {
  const entries = [...transfer.items].flatMap((item) => {
    const entry = item.kind === 'file' ? item.webkitGetAsEntry() : null
    return entry ? [entry] : []
  })
  if (entries.length === 0) return openArchives([...transfer.files])
  const found: File[] = []
  for (const entry of entries) await walk(entry, found)
  return openArchives(found)
}

async function walk(entry: FileSystemEntry, found: File[]): Promise<void> {
  if (found.length > MOST_FILES || NOT_A_MAP.test(entry.name)) return
  if (entry.isFile) found.push(await new Promise<File>((resolve, reject) => (entry as FileSystemFileEntry).file(resolve, reject)))
  if (!entry.isDirectory) return
  const reader = (entry as FileSystemDirectoryEntry).createReader()
  // A reader gives its entries a hundred at a time, and an empty list at the end.
  for (;;) {
    const some = await new Promise<FileSystemEntry[]>((resolve, reject) => reader.readEntries(resolve, reject))
    if (some.length === 0) return
    for (const each of some) await walk(each, found)
  }
}
