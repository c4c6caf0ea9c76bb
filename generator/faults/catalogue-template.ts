import { shortened, type Wording } from './wording.ts'

/** Faults of an account's own template, charts and notes. */
export const templateWordings = {
  'form-unit': (details: { readonly form: string; readonly figure: string; readonly unit: string; readonly fitting: readonly string[]; readonly unitNeeded: boolean }): Wording => ({
    unexpected: `form "${details.form}" for "${shortened(details.figure)}", which is in ${details.unit}`, expected: 'a form for that',
    mend: `Fitting forms: ${details.fitting.join(', ')}${details.unitNeeded ? '; those of measures and steps need unit="PATH", such as survey.kind or grid' : ''}.`,
  }),
  'directive-slip': (details: { readonly text: string; readonly name: string | null; readonly colons: string }): Wording => ({
    unexpected: `text "${shortened(details.text)}" that looks like a directive`, expected: 'a directive, or text',
    mend: details.name === null ? `Text that begins with "::" is written "\\::".`
      : `Write ${details.colons}${details.name}{...} without a space before the name or the brace, values in quotes, and on a line of its own where it has two colons or more.`,
  }),
  'block-open': (details: { readonly name: string; readonly colons: number; readonly line: number }): Wording => ({
    unexpected: `block "${shortened(details.name)}" opened at line ${details.line} and not closed`, expected: `a line "${':'.repeat(details.colons)}" where it ends`,
    mend: `Add that line, with exactly ${details.colons} colons: all that follows stands inside the block otherwise.`,
  }),
  'block-colons': (details: { readonly inner: { readonly name: string; readonly colons: number }; readonly outer: { readonly name: string; readonly colons: number; readonly line: number } }): Wording => ({
    unexpected: `block "${shortened(details.inner.name)}" with ${details.inner.colons} colons inside block "${shortened(details.outer.name)}" that line ${details.outer.line} opened with ${details.outer.colons}`,
    expected: 'fewer colons than the block around it has',
    mend: `Open and close "${shortened(details.outer.name)}" with "${':'.repeat(details.inner.colons + 1)}": the outer block needs one colon more than the inner.`,
  }),
  'fence-stray': (details: { readonly line: string }): Wording => ({
    unexpected: `line "${shortened(details.line)}" that closes nothing`, expected: 'a block opened before it',
    mend: 'Take it out; where blocks stand inside one another, the outer block needs one colon more than the inner.',
  }),
  'item-absent': (details: { readonly path: string; readonly sought: string; readonly list: string; readonly items: readonly string[] }): Wording => ({
    unexpected: `"${shortened(details.sought)}" in path "${shortened(details.path)}"`, expected: `an item of ${details.list}`,
    mend: details.items.length === 0 ? 'There is none this time; put the figure into a block :::when that asks whether it exists.'
      : `There are ${details.items.map((item) => shortened(item)).join(', ')}; a figure that is not always there stands in a block :::when that asks whether it exists.`,
  }),
  'anchor-left-out': (details: { readonly anchor: string }): Wording => ({
    unexpected: `anchor "${shortened(details.anchor)}" of a section that this review leaves out`, expected: 'a place in this review',
    mend: 'Take the link out, or put its section into the review.',
  }),
  'chart-unused': (details: { readonly name: string }): Wording => ({
    unexpected: `chart "${details.name}" that the review does not call`, expected: 'a chart that stands in the review',
    mend: `Call it by \`::chart{name="${details.name}"}\`, or take the file away.`,
  }),
  'template-missing': (details: { readonly path: string }): Wording => ({
    unexpected: `absence of \`${shortened(details.path)}\``, expected: 'a file of the account folder, named from there',
    mend: 'Put the file there, or mend the name; upper and lower case matter.',
  }),
  'template-outside': (details: { readonly path: string }): Wording => ({
    unexpected: `path \`${shortened(details.path)}\` that leaves the account folder`, expected: 'a relative path inside it, with forward slashes',
    mend: 'Put the file into the account folder itself; links that lead out of it count as outside.',
  }),
  'template-large': (details: { readonly path: string }): Wording => ({
    unexpected: `size of \`${shortened(details.path)}\``, expected: 'at most 1 MB of text, and 100 kB of a chart',
    mend: 'Make the file smaller: it is meant to be read in a review.',
  }),
  'template-no-text': (details: { readonly path: string }): Wording => ({
    unexpected: `bytes of \`${shortened(details.path)}\``, expected: 'text in UTF-8',
    mend: 'Save the file as UTF-8.',
  }),
  'include-kind': (details: { readonly path: string }): Wording => ({
    unexpected: `kind of file \`${shortened(details.path)}\``, expected: 'Markdown, in a file that ends with .md',
    mend: 'Give the file that ending; data and settings of an account are not put into its reviews.',
  }),
  'include-circular': (details: { readonly path: string }): Wording => ({
    unexpected: `file \`${shortened(details.path)}\` inside itself`, expected: 'files that do not lead back to one another',
    mend: 'Take one of the two lines out.',
  }),
  'include-deep': (details: { readonly path: string; readonly most: number }): Wording => ({
    unexpected: `file \`${shortened(details.path)}\` inside ${details.most} others`, expected: `at most ${details.most} files inside one another`,
    mend: 'Put the text where it is needed.',
  }),
  'include-many': (details: { readonly most: number }): Wording => ({
    unexpected: 'one more file put in', expected: `at most ${details.most} in one review`,
    mend: 'Put texts that belong together into one file.',
  }),
  'section-twice': (details: { readonly name: string }): Wording => ({
    unexpected: `${details.name.includes(',') ? 'sections' : 'section'} "${details.name}" a second time`, expected: 'every section once in a review',
    mend: `Take it out here; a line \`::house\` leaves it out with \`without="${details.name}"\`.`,
  }),
  'section-unused': (details: { readonly name: string; readonly nearest: string }): Wording => ({
    unexpected: `section "${shortened(details.name)}" that the review does not call`, expected: 'a section that stands in the review',
    mend: `Call it by \`::section{name="${shortened(details.name)}"}\`; if it is meant to replace one of the house's, name the file like that one, such as ${details.nearest}.md; or take the file away.`,
  }),
  'house-order': (details: { readonly from: string; readonly to: string }): Wording => ({
    unexpected: `sections from "${details.from}" to "${details.to}"`, expected: 'the first one to stand before the last one in the house order',
    mend: 'Change the two round, or leave one of them out.',
  }),
  'note-directive': (details: { readonly name: string }): Wording => ({
    unexpected: `directive "${shortened(details.name)}" in a note`, expected: 'Markdown and :figure',
    mend: 'Write it as text; what every month needs belongs into the template.',
  }),
  'note-section-unknown': (details: { readonly name: string; readonly nearest: string }): Wording => ({
    unexpected: `heading "${shortened(details.name)}"`, expected: 'the name of a section of this review',
    mend: `A heading of the first level says beside which section a note stands. ${details.nearest} Headings of the second level are free.`,
  }),
  'note-unplaced': (_: object): Wording => ({
    unexpected: 'a note that has no place in the review', expected: 'a line `::notes` in the template',
    mend: 'Add `::notes` to the template, or put the note beside a section by a heading such as `# survey`.',
  }),
  'notes-twice': (_: object): Wording => ({
    unexpected: 'a second place for the notes', expected: 'one `::notes` in a review',
    mend: 'Take one of them out; a line `::house` that begins with the first page brings one with it.',
  }),
  'notes-name': (details: { readonly name: string; readonly pattern: string }): Wording => ({
    unexpected: `name \`${shortened(details.name)}.md\``, expected: `the name of a period, such as ${details.pattern}.md`,
    mend: 'Mend the name: under this one the notes would never be read.',
  }),
  'heading-deep': (details: { readonly depth: number }): Wording => ({
    unexpected: `heading of level ${details.depth}`, expected: 'levels 1 to 4',
    mend: 'Take some of the # signs away.',
  }),
  'footnote-in-template': (_: object): Wording => ({
    unexpected: 'a footnote', expected: 'text in its place',
    mend: 'Put what it says in brackets, or into a paragraph of its own.',
  }),
  'nested-deep': (details: { readonly path: string; readonly most: number }): Wording => ({
    unexpected: `line of \`${shortened(details.path)}\` that begins more than ${details.most} blocks or lists inside one another`, expected: 'text that people can read',
    mend: 'Take the > and - signs at the beginning of the line away.',
  }),
  'chart-name': (details: { readonly name: string }): Wording => ({
    unexpected: `name \`${shortened(details.name)}\` of a chart`, expected: 'small letters, digits and hyphens, a letter first',
    mend: 'Rename the file.',
  }),
  'chart-no-json': (details: { readonly reason: string }): Wording => ({
    unexpected: `text that is no JSON (${shortened(details.reason)})`, expected: 'a Vega-Lite specification as one JSON object',
    mend: 'Mend the file at this place; JSON has no comments and no comma after the last value.',
  }),
  'chart-data': (_: object): Wording => ({
    unexpected: 'data from elsewhere', expected: '{ "name": TABLE }, a table of the findings',
    mend: 'Name a table, such as { "name": "venues" }: a chart draws nothing that the review does not hold.',
  }),
  'chart-key': (details: { readonly key: string }): Wording => ({
    unexpected: `key \`${shortened(details.key)}\``, expected: 'marks drawn from tables of the findings, without links, pictures and addresses',
    mend: 'Take it out.',
  }),
  'chart-key-unknown': (details: { readonly key: string; readonly nearest: string }): Wording => ({
    unexpected: `key \`${shortened(details.key)}\``, expected: 'one that Vega-Lite knows in this place', mend: details.nearest,
  }),
  'chart-value': (details: { readonly value: string; readonly expected: string }): Wording => ({
    unexpected: `value ${shortened(details.value)}`, expected: 'one that Vega-Lite takes in this place', mend: details.expected,
  }),
  'chart-format': (details: { readonly format: string; readonly kind: 'figure' | 'date' }): Wording => ({
    unexpected: `format "${shortened(details.format)}"`, expected: details.kind === 'date' ? 'one for dates' : 'one for figures',
    mend: details.kind === 'date' ? 'Write it from directives such as %-d (day), %b (short month) and %Y (year): "%b %Y".' : 'Write it as "d" (whole), ".1f" (one decimal), ".0%" (per cent) or ",d" (thousands apart).',
  }),
  'chart-sort': (_: object): Wording => ({
    unexpected: 'another `sort` than that of a layer before', expected: 'one order of all layers on an axis that they share',
    mend: 'Give every layer the same sort, such as { "field": "rank" }, or leave it out in all but one; or write "sort": null in every layer.',
  }),
  'chart-mark': (details: { readonly mark: string }): Wording => ({
    unexpected: `mark \`${details.mark}\``, expected: 'lines, bars, points, areas, rules, ticks, text',
    mend: 'Draw with another mark: a review holds no picture and no map from elsewhere.',
  }),
  'chart-address': (_: object): Wording => ({
    unexpected: 'an address in a text', expected: 'colours and words',
    mend: 'Take `url(...)` out: a review asks for nothing from anywhere.',
  }),
  'chart-expression': (details: { readonly name: string }): Wording => ({
    unexpected: `\`${details.name}()\` in an expression`, expected: 'one that gives the same whenever it is asked',
    mend: 'Take it out: the same findings must give the same review.',
  }),
  'chart-expression-invalid': (details: { readonly reason: string }): Wording => ({
    unexpected: `expression (${shortened(details.reason)})`, expected: 'one of Vega\'s expression language',
    mend: 'Mend it; texts in it stand in single quotes, and a field is written `datum.share`.',
  }),
  'chart-function': (details: { readonly name: string }): Wording => ({
    unexpected: `function \`${shortened(details.name)}()\` in an expression`, expected: 'one of Vega\'s expression language',
    mend: 'Mend its name, or do without it.',
  }),
  'chart-table': (details: { readonly name: string; readonly nearest: string }): Wording => ({
    unexpected: `table "${shortened(details.name)}"`, expected: 'a table of the findings', mend: details.nearest,
  }),
  'chart-field': (details: { readonly field: string; readonly nearest: string }): Wording => ({
    unexpected: `field "${shortened(details.field)}"`, expected: 'a column of the table, or one that a transform makes', mend: details.nearest,
  }),
  'chart-message': (details: { readonly message: string; readonly nearest: string }): Wording => ({
    unexpected: `message "${shortened(details.message)}"`, expected: 'a text that does not begin with @, or a message of the catalogue', mend: details.nearest,
  }),
  'chart-layout': (details: { readonly reason: string }): Wording => ({
    unexpected: `usermeta (${details.reason})`, expected: 'narrow, panels, stacked or ends, as templates/TEMPLATES.md tells',
    mend: 'Mend it, or leave usermeta out.',
  }),
  'chart-deep': (_: object): Wording => ({
    unexpected: 'values nested very deeply', expected: 'a Vega-Lite specification',
    mend: 'Make the specification simpler.',
  }),
  'chart-undrawable': (details: { readonly reason: string }): Wording => ({
    unexpected: `specification (${details.reason})`, expected: 'one that Vega-Lite draws without a warning',
    mend: 'Mend what the reason names.',
  }),
} as const
