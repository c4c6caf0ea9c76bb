import { shortened, type Wording } from './wording.ts'

/** What a value of theme.yaml must be: the `Y` of "expected Y". */
export const themeExpectations = {
  colour: "a colour written '#0a5674', in quotes",
  alt: 'a text of at most 200 characters that says what the logo shows',
  height: 'a height from 5 to 30 mm',
  running: (most: number, places: readonly string[]) => `a text of at most ${most} characters in one line, with no braces but ${places.map((place) => `{${place}}`).join(', ')}`,
} as const

/** Faults of an account's looks: theme.yaml, and the logo and typeface that it names. */
export const themeWordings = {
  'theme-contrast': (details: {
    readonly role: string; readonly colour: string; readonly ground: string; readonly on: string; readonly ratio: number; readonly least: number; readonly kind: 'text' | 'mark'; readonly nearest: string | null
  }): Wording => ({
    unexpected: `contrast of ${hundredths(details.ratio)}:1 between \`${details.role}\` ${details.colour} and \`${details.ground}\` ${details.on}`,
    expected: `${details.least}:1 or more (WCAG 2.2 AA, ${details.kind === 'text' ? 'text' : 'marks that carry meaning'})`,
    mend: details.nearest === null
      ? 'Give another ground: no colour passes on all that it stands on.'
      : `Give \`${details.role}: '${details.nearest}'\`, the nearest colour that passes.`,
  }),
  'theme-alike': (details: { readonly one: string; readonly other: string; readonly colours: readonly [string, string]; readonly difference: number; readonly least: number; readonly vision: string }): Wording => ({
    unexpected: `nearness of \`${details.one}\` ${details.colours[0]} and \`${details.other}\` ${details.colours[1]} as seen with ${details.vision} (${hundredths(details.difference)} in OKLab)`,
    expected: `a difference of ${details.least} or more: the two stand in one chart and mean different things`,
    mend: 'Make one of the two clearly darker, or of another hue.',
  }),
  'theme-paper-dark': (details: { readonly colour: string; readonly lightness: number; readonly least: number }): Wording => ({
    unexpected: `paper ${details.colour} of lightness ${hundredths(details.lightness)}`, expected: `${details.least} or more in OKLab, where white has 1`,
    mend: 'Give a lighter colour, or leave `paper` out: a review is printed.',
  }),
  'theme-file-large': (details: { readonly path: string; readonly most: number }): Wording => ({
    unexpected: `size of \`${details.path}\``, expected: `at most ${Math.round(details.most / 1000)} kB`,
    mend: 'Save a smaller one: it stands inside every review.',
  }),
  'theme-picture': (details: { readonly found: string; readonly expected: string }): Wording => ({
    unexpected: details.found, expected: details.expected,
    mend: 'Save the logo again as a plain PNG or SVG.',
  }),
  'theme-drawing': (details: { readonly found: string; readonly expected: string; readonly mend: string }): Wording => ({
    unexpected: shortened(details.found), expected: details.expected, mend: details.mend,
  }),
  'theme-typeface': (details: { readonly found: string; readonly expected: string; readonly mend: string }): Wording => ({
    unexpected: details.found, expected: details.expected, mend: details.mend,
  }),
} as const

/** Cut, not rounded: 4.496 falls short of 4.5 and must not read as 4.50. */
function hundredths(ratio: number): string {
  return (Math.floor(ratio * 100) / 100).toFixed(2)
}
