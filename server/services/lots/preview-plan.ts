import { makePlan } from '#shared/compute/sampling/plan'
import type { PlanPreview } from '#shared/contracts/lots'
import { now } from '../context'
import type { Context } from '../context'
import { getSheetInForce, limitedClasses } from '../parts/sheet-in-force'
import { getSupplierAndPart } from './receive-lot'
import { severityOfNextLot } from './severity'

/** The plan that a lot received now would get; nothing is written. */
export function previewPlan(context: Context, input: { supplierCode: string; partNumber: string; quantity: number }): PlanPreview {
  const { supplier, part } = getSupplierAndPart(context.db, input.supplierCode, input.partNumber)
  const sheet = getSheetInForce(context.db, part, now(context))
  const severity = severityOfNextLot(context.db, { supplierId: supplier.id, partId: part.id })
  return {
    plan: makePlan({ lotSize: input.quantity, scheme: sheet.content.sampling, severity: severity.severity, limited: limitedClasses(sheet.content) }),
    sheetVersion: sheet.version,
    severityReason: severity.reason,
  }
}
