import type { DecisionRule } from '../terms/judgement'

/**
 * A decision rule in one sentence for people.
 *
 * Source: JCGM 106:2012 clause 8 (simple and guarded acceptance); ILAC-G8:09/2019 (four-way statement); from memory.
 *
 * @param rule decision rule of a limit sheet.
 */
export function describeRule(rule: DecisionRule): string {
  switch (rule.kind) {
    case 'simple':
      return 'Simple acceptance: a value at or inside its limit conforms; the uncertainty is stated beside it.'
    case 'guard-band':
      return `Guarded acceptance: a value conforms only when it lies inside its limit by ${share(rule.ratio)} or more.`
    case 'four-way':
      return `Four-way statement: pass or fail when the value lies ${share(rule.ratio)} or more away from its limit; conditional in between.`
  }
}

function share(ratio: number): string {
  return ratio === 1 ? 'its expanded uncertainty (k = 2)' : `${ratio} times its expanded uncertainty (k = 2)`
}
