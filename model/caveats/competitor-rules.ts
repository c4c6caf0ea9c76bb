import { caveat, type CaveatRule } from './rule.ts'

/** Share of the brand's fixed mix that two brands' levels have to cover, or it is told; ours, no source. */
const coveredWell = 0.9

/** What a comparison with competitors can bear. */
export const competitorRules: readonly CaveatRule[] = [
  ({ findings: { competitors } }) => {
    const unread = competitors?.brands.filter(({ status }) => status === 'unread') ?? []
    return unread.length === 0 ? [] : [caveat('caution', 'competitors-unread', { brands: unread.map(({ brand }) => brand).join(', ') })]
  },
  ({ findings: { competitors } }) => (competitors?.told === 'some' ? [caveat('caution', 'competitors-in-some-sources')] : []),
  ({ findings: { competitors } }) => (competitors?.brands ?? []).filter(({ status }) => status === 'absent').map(({ brand }) => caveat('caution', 'competitor-absent', { brand })),
  ({ findings: { competitors, method } }) => (competitors?.brands ?? []).filter(({ status }) => status === 'thin')
    .map(({ brand, authors }) => caveat('caution', 'competitor-thin', { brand, authors, least: method.smallest_group })),
  ({ findings: { competitors } }) => (competitors?.brands ?? []).filter(({ status, covered }) => status === 'apart' || (covered !== null && covered < coveredWell))
    .map(({ brand, covered, left_out }) => caveat('caution', 'competitor-other-mix', { brand, share: covered ?? 0, levels: left_out.map(({ label }) => label).join(', ') })),
  ({ findings: { competitors } }) => (competitors?.brands ?? []).filter(({ converged }) => converged === false).map(({ brand }) => caveat('serious', 'competitor-not-converged', { brand })),
  ({ findings: { competitors } }) => (competitors?.brands.some(({ mentions }) => mentions > 0) === true ? [caveat('caution', 'competitors-those-who-post')] : []),
]
