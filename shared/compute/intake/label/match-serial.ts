export type SerialMatch = { serial: string } | { ambiguous: string[] } | null

interface Place { serial: string; start: number; end: number }

const isWordCharacter = (character: string | undefined): boolean => character !== undefined && /[\p{L}\p{N}]/u.test(character)

/** Places where the serial stands as a token: no letter or digit right before or after it. */
function placesOf(name: string, serial: string, needle: string): Place[] {
  const places: Place[] = []
  if (needle === '') return places
  for (let start = name.indexOf(needle); start >= 0; start = name.indexOf(needle, start + 1)) {
    const end = start + needle.length
    if (!isWordCharacter(name[start - 1]) && !isWordCharacter(name[end])) places.push({ serial, start, end })
  }
  return places
}

function search(name: string, serials: readonly string[], fold: (text: string) => string): string[] {
  const folded = fold(name)
  const places = serials.flatMap(serial => placesOf(folded, serial, fold(serial)))
  const longest = places.filter(place => !places.some(other =>
    other.start <= place.start && other.end >= place.end && other.end - other.start > place.end - place.start))
  return [...new Set(longest.map(place => place.serial))]
}

const lowerCase = (text: string): string => text.normalize('NFC').toLowerCase()
/** File systems and rigs replace separators: 71-4452 may be written 71_4452 or 71 4452. */
const oneSeparator = (text: string): string => lowerCase(text).replace(/[-_ .]/g, '-')

/**
 * Finds which of the sample's serials a file name names.
 *
 * A serial counts where no letter or digit stands right before or after it, case ignored; one inside a longer one is not
 * counted there. When none is found, hyphen, underscore, space and point are taken for the same. Folders are ignored.
 *
 * @param fileName name with or without folders and extension
 * @param serials the sample's serials
 * @returns the serial, several when the name fits more than one, or null
 */
export function matchSerial(fileName: string, serials: readonly string[]): SerialMatch {
  const name = fileName.split(/[\\/]/).at(-1)!
  const wanted = [...new Set(serials.filter(serial => serial.trim() !== ''))]
  const exact = search(name, wanted, lowerCase)
  const found = exact.length > 0 ? exact : search(name, wanted, oneSeparator)
  if (found.length === 0) return null
  return found.length === 1 ? { serial: found[0]! } : { ambiguous: found }
}
