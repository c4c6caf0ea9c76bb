import type { Wording } from './wording.ts'

/** Faults of what a build is asked for. */
export const buildWordings = {
  'base-empty': (details: { readonly from: string; readonly to: string; readonly first: string; readonly last: string }): Wording => ({
    unexpected: `base from ${details.from} to ${details.to}`, expected: `days within the mentions, which run from ${details.first} to ${details.last}`,
    mend: 'Mend `base` of the account, or leave it out: then the first 12 months of mentions serve.',
  }),
  'period-empty': (details: { readonly name: string; readonly first: string; readonly last: string }): Wording => ({
    unexpected: `period ${details.name}`, expected: `one within the mentions, which run from ${details.first} to ${details.last}`,
    mend: 'Name another period with --period, or leave it out: then the last whole one serves.',
  }),
  'out-not-a-draft': (details: { readonly entry: string }): Wording => ({
    unexpected: `entry \`${details.entry}\``, expected: 'a folder that is absent, empty, or holds a draft',
    mend: 'Name another folder with --out: a folder with anything else in it is not replaced.',
  }),
}
