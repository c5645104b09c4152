import { formatQuantity, joinQuantity } from '#shared/compute/judging/quantities'
import type { CharacteristicUnit } from '#shared/compute/terms/measurement'

/** "6.83 mN·m" from a stored figure. */
export function quantity(value: number, unit: CharacteristicUnit): string {
  const { text, unit: shown } = formatQuantity(value, unit)
  return joinQuantity(text, shown)
}
