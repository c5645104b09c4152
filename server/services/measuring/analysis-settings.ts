import type { calibrations, rigs } from '../../database/schema/rigs'
import type { parts } from '../../database/schema/parts'
import type { LimitSheetContent } from '#shared/compute/terms/judgement'
import type { AnalysisSettings, ColumnRecipe } from '#shared/compute/terms/measurement'

/**
 * Everything outside the files that a motor's figures depend on, from the part, the limit sheet, the rig and its calibration.
 *
 * @param recipe columns of the file; null: read from the file's own header.
 */
export function analysisSettings(input: {
  part: Pick<typeof parts.$inferSelect, 'design' | 'ratedTorqueNm'>
  content: LimitSheetContent
  rig: Pick<typeof rigs.$inferSelect, 'method' | 'properties'>
  calibration: Pick<typeof calibrations.$inferSelect, 'torqueRelativeUncertainty' | 'torqueAbsoluteUncertaintyNm'>
  recipe: ColumnRecipe | null
}): AnalysisSettings {
  const { part, content, rig, calibration, recipe } = input
  return {
    method: rig.method,
    design: part.design,
    ratedTorqueNm: part.ratedTorqueNm,
    highestOrder: content.highestOrder,
    ordersNamed: ordersNamed(content),
    rippleDefinition: content.rippleDefinition,
    compensation: content.compensation,
    recipe,
    rig: {
      ...rig.properties,
      torqueRelativeUncertainty: calibration.torqueRelativeUncertainty,
      torqueAbsoluteUncertaintyNm: calibration.torqueAbsoluteUncertaintyNm,
    },
  }
}

/** Orders that the limits name (`order.24`), rising. */
export function ordersNamed(content: LimitSheetContent): number[] {
  const orders = content.limits.flatMap((limit) => {
    const match = /^order\.(\d+)$/.exec(limit.key)
    return match ? [Number(match[1])] : []
  })
  return [...new Set(orders)].sort((a, b) => a - b)
}
