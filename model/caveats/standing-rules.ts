import { caveat, type CaveatRule } from './rule.ts'

/** What is true of every review, or of every review that lacks an input. */
export const standingRules: readonly CaveatRule[] = [
  () => [caveat('caution', 'no-sampling-error')],
  () => [caveat('note', 'level-conventional')],
  () => [caveat('caution', 'coder-unaudited')],
  ({ findings }) => (findings.survey === null ? [caveat('caution', 'survey-absent')] : []),
  ({ findings }) => (findings.benchmark === null ? [caveat('caution', 'benchmark-absent')] : []),
  ({ givenNotUsed }) => (givenNotUsed.length === 0 ? [] : [caveat('note', 'given-not-used', { keys: givenNotUsed.join(', ') })]),
  ({ findings }) => (findings.opinion.previous === null ? [caveat('note', 'no-previous-period')] : []),
]
