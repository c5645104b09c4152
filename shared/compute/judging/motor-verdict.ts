import type { CharacteristicVerdict, LimitSheetContent, MotorVerdict, NonconformityClass, Verdict } from '../terms/judgement'
import type { Characteristic } from '../terms/measurement'
import { judgeCharacteristic } from './characteristic-verdict'

const CLASSES: readonly NonconformityClass[] = ['critical', 'major', 'minor']

/**
 * Whether a verdict counts as nonconforming: fail and, under the four-way rule, conditional fail. A conditional pass
 * conforms; what cannot be judged is not counted.
 */
export function isNonconforming(verdict: Verdict | null): boolean {
  return verdict === 'fail' || verdict === 'conditional-fail'
}

function worst(characteristics: readonly CharacteristicVerdict[]): Verdict | null {
  const has = (verdict: Verdict | null): boolean => characteristics.some(each => each.verdict === verdict)
  if (has('fail')) return 'fail'
  if (has('conditional-fail')) return 'conditional-fail'
  if (has(null)) return null
  return has('conditional-pass') ? 'conditional-pass' : 'pass'
}

/**
 * Judges a motor: every limit of the sheet, then the worst of them.
 *
 * @param request what the limit sheet holds (at least one limit), and the motor's characteristics
 * @returns verdict (null when a limit cannot be judged and none fails), each characteristic in the sheet's order with its
 *   reason, and the classes in which the motor is nonconforming
 * @throws RangeError when the sheet has no limit, or as `judgeCharacteristic`
 */
export function judgeMotor({ content, characteristics }: {
  content: Pick<LimitSheetContent, 'limits' | 'decisionRule'>
  characteristics: readonly Characteristic[]
}): MotorVerdict {
  if (content.limits.length === 0) throw new RangeError('judgeMotor: content.limits must hold at least one limit')
  const measured = new Map(characteristics.map(each => [each.key, each]))
  const judged = content.limits.map(limit => judgeCharacteristic(limit, measured.get(limit.key), content.decisionRule))
  const failing = judged.filter(each => isNonconforming(each.verdict))
  return {
    verdict: worst(judged),
    characteristics: judged,
    nonconformingClasses: CLASSES.filter(name => failing.some(each => each.class === name)),
  }
}
