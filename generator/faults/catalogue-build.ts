import { shortened, type Wording } from './wording.ts'

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
  'rejects-unwritable': (details: { readonly reason: string }): Wording => ({
    unexpected: `refusal to write (${details.reason})`, expected: 'a folder for the rows that could not be read', mend: 'Give this user the right to write there, or make room, or name another folder.',
  }),
  'draft-unwritable': (details: { readonly reason: string }): Wording => ({
    unexpected: `refusal to write (${details.reason})`, expected: 'a folder that can be written, with room for a draft',
    mend: 'Give this user the right to write there, make room, or name another folder with --out.',
  }),
  'account-busy': (details: { readonly holder: { readonly command: string; readonly pid: number; readonly host: string; readonly since: string } | null; readonly here: boolean }): Wording => ({
    unexpected: details.holder === null ? 'file that is no lock of ours' : `lock of \`tareline ${shortened(details.holder.command)}\`, process ${details.holder.pid} on ${shortened(details.holder.host)} since ${details.holder.since},`,
    expected: 'nobody else at work on the account',
    mend: details.here ? 'Wait until that process has ended: the lock goes with it.' : 'Wait until it has ended. If nothing is at work on the account any more, on any machine, delete the file.',
  }),
  'accounts-absent': (_: object): Wording => ({
    unexpected: 'absence of accounts', expected: 'a folder in which each account is a folder with an account.yaml',
    mend: 'Name the folder around the accounts; one account alone is built without --all.',
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
