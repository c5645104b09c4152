import canonicalize from 'canonicalize'
import { judgeLot } from '#shared/compute/sampling/lot-verdict'
import type { LotVerdict } from '#shared/compute/terms/judgement'
import type { Reader } from '../../database/client'
import type { lots } from '../../database/schema/lots'
import { sha256Hex } from '../../files/store'
import { countedMeasurements } from './counted-measurements'

export interface Evidence {
  counted: ReturnType<typeof countedMeasurements>
  lotVerdict: LotVerdict
  /** SHA-256 of all that the decision rests on: plan, sheet, each counted measurement and its verdict. */
  hash: string
}

/** What a lot's decision rests on at this moment; the signer's screen shows it, the signature names its hash. */
export function gatherEvidence(db: Pick<Reader, 'select'>, lot: typeof lots.$inferSelect): Evidence {
  const counted = countedMeasurements(db, lot.id)
  const lotVerdict = judgeLot({ plan: lot.plan, motors: counted.map(row => row.measurement?.judgement ?? null) })
  const told = {
    lot: lot.number,
    sheet: lot.sheetId,
    plan: lot.plan,
    motors: counted.map(({ sample, measurement }) => ({ position: sample.position, serial: sample.serial, measurement: measurement?.id ?? null, judgement: measurement?.judgement ?? null })),
    lotVerdict,
  }
  return { counted, lotVerdict, hash: sha256Hex(canonicalize(JSON.parse(JSON.stringify(told)))!) }
}
