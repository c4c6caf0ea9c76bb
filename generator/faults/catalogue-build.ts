import type { Wording } from './catalogue.ts'

/** Faults of what a build is asked for. */
export const buildWordings = {
  'base-empty': (details: { readonly reason: string }): Wording => ({
    unexpected: `base (${details.reason})`, expected: 'a base that holds mentions’ steps',
    mend: 'Mend `base` of the account, or leave it out: then the first 12 months of mentions serve.',
  }),
  'period-empty': (details: { readonly reason: string }): Wording => ({
    unexpected: `period (${details.reason})`, expected: 'a period within the mentions',
    mend: 'Name another period with --period.',
  }),
  'out-not-a-draft': (details: { readonly entry: string }): Wording => ({
    unexpected: `entry \`${details.entry}\``, expected: 'a folder that is absent, empty, or holds a draft',
    mend: 'Name another folder with --out: a folder with anything else in it is not replaced.',
  }),
}
