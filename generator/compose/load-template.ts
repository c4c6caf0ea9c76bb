import { readdir, readFile } from 'node:fs/promises'
import { basename, join, posix } from 'node:path'
import { visit } from 'unist-util-visit'
import type { Account } from '../account/account.ts'
import { periodNamed, periodPattern } from '../calendar/periods.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import type { Fault } from '../faults/fault.ts'
import { isRead, readOwnFile, readOwnFolder, unreadFault } from './own-file.ts'
import type { OwnFolder } from './own-file.ts'
import { parseMarkdown } from './parse-markdown.ts'
import type { Source, Template, Unread } from './template.ts'

/** What an account has of its own: paths relative to its folder, null where it has none. */
export type OwnFiles = Pick<Account, 'folder' | 'template' | 'notes' | 'reporting'>

/**
 * Read a template, and all that an account adds to it.
 *
 * @param house - folder of the house template: `review.md`, `sections/*.md`, `sentences.yaml`
 * @param own - an account; sections in the folder `sections` beside its review go before those of the house
 * @throws {InputFault} with what can't be read: `template-missing`, `template-outside`, `template-large`, `template-no-text`, `notes-name`
 */
export async function loadTemplate(house: string, own?: OwnFiles): Promise<Template> {
  const houseReview = await readHouse(house, 'review.md')
  const [review, sections, notes] = own === undefined ? [nothing, nothing, nothing] : await Promise.all([ownReview(own), ownSections(own), ownNotes(own)])
  const faults = [review, sections, notes].flatMap((part) => part.faults)
  if (faults.length > 0) throw new InputFault(faults)
  const ownSources = [...review.files.values(), ...sections.files.values()]
  return {
    review: [...review.files.values()][0] ?? houseReview,
    house: houseReview,
    sections: { ...await houseSections(house), ...Object.fromEntries(sections.files) },
    ownSections: [...sections.files.keys()],
    sentences: await readHouse(house, 'sentences.yaml'),
    included: own === undefined ? {} : await readIncluded(own.folder, ownSources),
    notes: Object.fromEntries(notes.files),
  }
}

const nothing: OwnFolder = { files: new Map(), faults: [] }

async function ownReview({ folder, template }: OwnFiles): Promise<OwnFolder> {
  if (template === null) return nothing
  const file = await readOwnFile(folder, template)
  return isRead(file) ? { files: new Map([[template, file]]), faults: [] } : { files: new Map(), faults: [unreadFault(file, file.place)] }
}

async function ownSections({ folder, template }: OwnFiles): Promise<OwnFolder> {
  return template === null ? nothing : readOwnFolder(folder, posix.join(posix.dirname(template), 'sections'), '.md')
}

/** Notes under a name that is no period's would never be read: that is told. */
async function ownNotes({ folder, notes, reporting }: OwnFiles): Promise<OwnFolder> {
  if (notes === null) return nothing
  const { files, faults } = await readOwnFolder(folder, notes, '.md')
  const misnamed = [...files].filter(([name]) => periodNamed(reporting, name) === undefined)
  return { files, faults: [...faults, ...misnamed.map(([name, { place }]): Fault => faultOf('notes-name', place, { name, pattern: periodPattern[reporting] }))] }
}

/** Every file that is put in, also by one that is itself put in. */
async function readIncluded(folder: string, sources: readonly Source[]): Promise<Readonly<Record<string, Source | Unread>>> {
  const included = new Map<string, Source | Unread>()
  for (let open = sources; open.length > 0;) {
    const paths = [...new Set(open.flatMap(includesIn))].filter((path) => !included.has(path))
    const files = await Promise.all(paths.map((path) => path.endsWith('.md') ? readOwnFile(folder, path) : { place: path, unread: 'kind' as const }))
    for (const [at, file] of files.entries()) included.set(paths[at] ?? '', file)
    open = files.filter(isRead)
  }
  return Object.fromEntries(included)
}

function includesIn(source: Source): readonly string[] {
  const paths: string[] = []
  visit(parseMarkdown(source), 'leafDirective', ({ name, attributes }) => {
    if (name === 'include') paths.push(attributes?.['file'] ?? '')
  })
  return paths
}

async function houseSections(house: string): Promise<Record<string, Source>> {
  const files = (await readdir(join(house, 'sections'))).filter((file) => file.endsWith('.md')).sort()
  return Object.fromEntries(await Promise.all(files.map(async (file) => [basename(file, '.md'), await readHouse(house, `sections/${file}`)] as const)))
}

async function readHouse(house: string, file: string): Promise<Source> {
  return { place: `templates/${file}`, text: await readFile(join(house, file), 'utf8') }
}
