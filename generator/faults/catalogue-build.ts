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
  'draft-unwritable': (details: { readonly reason: string }): Wording => ({
    unexpected: `refusal to write (${details.reason})`, expected: 'a folder that can be written, with room for a draft',
    mend: 'Give this user the right to write there, make room, or name another folder with --out.',
  }),
  'stopped': (details: { readonly signal: string }): Wording => ({
    unexpected: details.signal, expected: 'time to finish',
    mend: 'Run the command again: an earlier draft is as it was, and what was computed is not computed twice.',
  }),
  'printer-unusable': (details: { readonly reason: string }): Wording => ({
    unexpected: `state of the machine (${details.reason})`, expected: 'one in which the printing library starts',
    mend: 'Set HOME to a folder that this user can read and work in one as well, or build with --no-pdf.',
  }),
  'out-not-a-draft': (details: { readonly entry: string }): Wording => ({
    unexpected: details.entry === 'a file' ? details.entry : `entry \`${details.entry}\``, expected: 'a folder that is absent, empty, or holds a draft',
    mend: 'Name another folder with --out: a folder with anything else in it is not replaced.',
  }),
}
