import { told, type Wording } from './wording.ts'

const restore = 'Put back what was sealed from a copy: a seal is never mended by hand.'

/** Faults of sealing and of the archive. */
export const archiveWordings = {
  'draft-absent': (details: { readonly period: string }): Wording => ({
    unexpected: `absence of a draft of ${details.period}`, expected: 'one that `tareline build` made',
    mend: 'Build the period first; a draft that was made into another folder with --out is not sealed.',
  }),
  'draft-unrecorded': (_: object): Wording => ({
    unexpected: 'draft without a record of what it was made from', expected: 'record.json beside it', mend: 'Build the period again.',
  }),
  'draft-of-another': (details: { readonly account: string; readonly period: string }): Wording => ({
    unexpected: `draft of ${details.period} of ${details.account}`, expected: 'a draft of the account and period to be sealed', mend: 'Build the period again, without --out.',
  }),
  'draft-without-pdf': (_: object): Wording => ({
    unexpected: 'draft without a PDF', expected: 'review.pdf beside review.html', mend: 'Build the period again without --no-pdf.',
  }),
  'draft-changed': (details: { readonly paths: readonly string[] }): Wording => ({
    unexpected: `change of ${told(details.paths)}`, expected: 'the draft as it was built', mend: 'Build the period again.',
  }),
  'inputs-changed': (details: { readonly paths: readonly string[] }): Wording => ({
    unexpected: `change of ${told(details.paths)} since the draft was built`, expected: 'the inputs that the draft was built from',
    mend: 'Build the period again, read the draft again, and seal that.',
  }),
  'program-changed': (details: { readonly built: string }): Wording => ({
    unexpected: `draft by another program (${details.built})`, expected: 'one that this program built', mend: 'Build the period again.',
  }),
  'checks-failed': (_: object): Wording => ({
    unexpected: 'draft whose computation failed its checks', expected: 'one that passed them',
    mend: 'See the section on how the review was made for the check that failed; a review that failed is not sealed.',
  }),
  'people-missing': (details: { readonly key: string }): Wording => ({
    unexpected: `absence of \`${details.key}\``, expected: 'the name of a person', mend: `Write \`${details.key}\` into account.yaml and build the period again.`,
  }),
  'same-person': (details: { readonly person: string }): Wording => ({
    unexpected: `${details.person} as both who prepared and who reviewed`, expected: 'two people',
    mend: 'Let somebody else review it, or set `one_person_seals: true` in account.yaml.',
  }),
  'sealed-already': (details: { readonly period: string }): Wording => ({
    unexpected: `seal of ${details.period}`, expected: 'a period that is not sealed yet', mend: 'Say why it is revised with --revise REASON: the first seal stays as it is.',
  }),
  'nothing-to-revise': (details: { readonly period: string }): Wording => ({
    unexpected: '--revise', expected: `a seal of ${details.period} to revise`, mend: 'Leave --revise out: this is the first seal of the period.',
  }),
  'archive-unsound': (_: object): Wording => ({
    unexpected: 'archive that is not as it was sealed', expected: 'one that `tareline verify` finds sound', mend: 'Run `tareline verify` and mend what it names: no figure is taken from such an archive, and nothing added to it.',
  }),
  'archive-moved-on': (details: { readonly last: string | null }): Wording => ({
    unexpected: details.last === null ? 'draft that looks back at an archive that is gone' : `draft from before ${details.last} was sealed`,
    expected: 'one that looks back at everything sealed', mend: 'Build the period again: what it says of earlier figures comes from the archive.',
  }),
  'archive-busy': (_: object): Wording => ({ unexpected: 'seal that was put there meanwhile', expected: 'one seal at a time', mend: 'Seal again.' }),
  'archive-unwritable': (details: { readonly reason: string }): Wording => ({
    unexpected: `refusal to write (${details.reason})`, expected: 'an archive that can be written, with room for a seal',
    mend: 'Give this user the right to write there, or make room: the archive is as it was.',
  }),
  'archive-page-unwritten': (details: { readonly reason: string }): Wording => ({
    unexpected: `failure to write the page of the archive (${details.reason})`, expected: 'a page with the new seal in it', mend: 'The seal stands and needs nothing; the next seal writes the page anew.',
  }),
  'archive-empty': (_: object): Wording => ({ unexpected: 'absence of any seal', expected: 'an archive', mend: 'Seal a draft first.' }),
  'archive-entry-unknown': (_: object): Wording => ({ unexpected: 'entry', expected: 'seals only', mend: 'Move it elsewhere: the archive holds seals and nothing else.' }),
  'manifest-unreadable': (details: { readonly absent: boolean }): Wording => ({
    unexpected: details.absent ? 'absence of the manifest' : 'manifest', expected: 'the manifest of this seal', mend: restore,
  }),
  'sealed-file-absent': (_: object): Wording => ({ unexpected: 'absence of a sealed file', expected: 'the file that the manifest lists', mend: restore }),
  'sealed-file-changed': (_: object): Wording => ({ unexpected: 'content', expected: 'the bytes that were sealed', mend: restore }),
  'sealed-file-added': (_: object): Wording => ({ unexpected: 'file', expected: 'those that the manifest lists', mend: 'Move it elsewhere: it was not there when the review was sealed.' }),
  'chain-gap': (details: { readonly sequence: number; readonly due: number }): Wording => ({
    unexpected: `seal number ${details.sequence}`, expected: `number ${details.due}: a seal between is missing, or one is there twice`, mend: restore,
  }),
  'chain-broken': (details: { readonly before: string | null }): Wording => ({
    unexpected: 'hash of the manifest before', expected: details.before === null ? 'none: this is the first seal' : `that of ${details.before}: one of the two manifests was changed`, mend: restore,
  }),
  'chain-cut': (details: { readonly sealed: number; readonly found: number }): Wording => ({
    unexpected: `archive of ${details.found} seals`, expected: `${details.sealed}: the last ones are missing`, mend: restore,
  }),
  'chain-end-differs': (_: object): Wording => ({ unexpected: 'manifest', expected: 'the one that chain-end.json names: one of the two was changed', mend: restore }),
  'chain-end-unreadable': (_: object): Wording => ({ unexpected: 'content', expected: 'the end of the chain of seals', mend: restore }),
  'rebuild-differs': (details: { readonly found: string; readonly expected: string }): Wording => ({
    unexpected: details.found, expected: details.expected,
    mend: 'The same program, to the byte, made something else of the archived tables and inputs: one of them is not what the review was made from. Compare with a copy of the archive.',
  }),
  'rebuild-failed': (details: { readonly reason: string }): Wording => ({
    unexpected: `content that no review can be made from (${details.reason})`, expected: 'the tables and inputs that the review was made from', mend: restore,
  }),
}
