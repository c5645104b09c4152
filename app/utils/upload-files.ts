/** Bounds of what one drop may hold; a zip beyond them is refused rather than unpacked. */
export const MOST_FILES = 500
const LARGEST_MEMBER = 200 * 1024 * 1024

/** Names that a computer adds to folders and zips by itself, and notes beside the maps. */
export const NOT_A_MAP = /(^|\/)(\.|__MACOSX\/|Thumbs\.db$|desktop\.ini$)|\.(md|pdf|png|jpe?g)$/i

export interface GatheredFiles {
  files: File[]
  /** One sentence for each archive or folder that could not be opened. */
  problems: string[]
}

/** Replaces each zip by its members; a zip is transport, its members are what is measured. */
export async function openArchives(files: File[]): Promise<GatheredFiles> {
  const gathered: GatheredFiles = { files: [], problems: [] }
  for (const file of files) {
    if (!/\.zip$/i.test(file.name)) {
      gathered.files.push(file)
      continue
    }
    try {
      gathered.files.push(...await membersOf(file))
    }
    catch (error) {
      gathered.problems.push(error instanceof RangeError ? error.message : `${file.name} cannot be opened as a zip. Pack it again, or drop the files themselves.`)
    }
  }
  if (gathered.files.length <= MOST_FILES) return gathered
  return { files: gathered.files.slice(0, MOST_FILES), problems: [...gathered.problems, `More than ${MOST_FILES} files at once; the first ${MOST_FILES} are taken. Drop the others after them.`] }
}

async function membersOf(archive: File): Promise<File[]> {
  const { unzipSync } = await import('fflate')
  let count = 0
  const members = unzipSync(new Uint8Array(await archive.arrayBuffer()), {
    filter: (member) => {
      if (member.name.endsWith('/') || NOT_A_MAP.test(member.name)) return false
      if (member.originalSize > LARGEST_MEMBER) throw new RangeError(`${member.name} in ${archive.name} is larger than 200 MB. Nothing of the zip was sent.`)
      if (++count > MOST_FILES) throw new RangeError(`${archive.name} holds more than ${MOST_FILES} files. Nothing of it was sent; split it.`)
      return true
    },
  })
  return Object.entries(members).map(([name, bytes]) => new File([bytes as Uint8Array<ArrayBuffer>], name.split('/').at(-1)!))
}
