import type { Fault } from '../faults/fault.ts'
import type { Source, Template } from '../compose/template.ts'

/**
 * A template in which every file at fault is replaced by what is wrong with it, so that the rest can be seen meanwhile: the fault shows where the section
 * would stand.
 *
 * @param faults - of which those at a file of the template are shown in its place
 * @returns the template, and the faults that have no place in it
 */
export function showInPlace(template: Template, faults: readonly Fault[]): { readonly template: Template; readonly rest: readonly Fault[] } {
  const told = new Set<Fault>()
  const shown = <S extends { readonly place: string }>(source: S): S | Source => {
    const here = faults.filter(({ place }) => fileOf(place) === source.place)
    for (const fault of here) told.add(fault)
    return here.length === 0 ? source : { place: source.place, text: fenced(here) }
  }
  const all = <S extends { readonly place: string }>(sources: Readonly<Record<string, S>>) => Object.fromEntries(Object.entries(sources).map(([name, source]) => [name, shown(source)] as const))
  const review = shown(template.review)
  const whole = review === template.review ? {} : { review: { ...template.review, text: `${textOf(review)}\n::house\n` }, ownSections: [] }
  const replaced = { ...template, ...whole, sections: all(template.sections) as Template['sections'], included: all(template.included), notes: all(template.notes) as Template['notes'] }
  return { template: replaced, rest: faults.filter((fault) => !told.has(fault)) }
}

function textOf(source: Source | { readonly place: string }): string {
  return 'text' in source ? source.text : ''
}

/** `sections/opening.md:3:1` is in `sections/opening.md`. */
function fileOf(place: string): string {
  return place.split(' ')[0].replace(/(:\d+){1,2}$/, '')
}

/** A block of code: whatever a fault quotes is text in it. */
function fenced(faults: readonly Fault[]): string {
  const text = faults.map(({ message, mend }) => `${message}\n${mend}`).join('\n\n')
  const fence = '`'.repeat(Math.max(3, ...[...text.matchAll(/`+/g)].map(([ticks]) => ticks.length + 1)))
  return `${fence}\n${text}\n${fence}\n`
}
