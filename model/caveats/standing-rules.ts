import { caveat, type CaveatRule } from './rule.ts'

/** What is true of every review of posts, or of every one that lacks an input. */
export const standingRules: readonly CaveatRule[] = [
  ({ findings }) => (findings.accounting.modelled > 0 ? [caveat('caution', 'no-sampling-error')] : []),
  // a mix that the account gives, such as its customers', is no convention of ours
  ({ findings }) => (Object.values(findings.method.target_source).every((source) => source === 'account') ? [] : [caveat('note', 'level-conventional')]),
  ({ findings }) => (findings.coder.status === 'absent' ? [caveat('caution', 'coder-unaudited')] : []),
  ({ findings }) => (findings.survey === null ? [caveat('caution', 'survey-absent')] : []),
  ({ findings }) => (findings.benchmark === null ? [caveat('caution', 'benchmark-absent')] : []),
  ({ findings }) => (findings.opinion.previous === null ? [caveat('note', 'no-previous-period')] : []),
]
