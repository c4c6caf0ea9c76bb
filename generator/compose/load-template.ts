import { readdir, readFile } from 'node:fs/promises'
import { basename, dirname, join } from 'node:path'
import { InputFault } from '../faults/fault.ts'
import type { Source, Template } from './template.ts'

/**
 * Read a template.
 *
 * @param house - folder of the house template: `review.md`, `sections/*.md`, `sentences.yaml`
 * @param own - an account's own review file; sections in the folder `sections` beside it go before those of the house
 * @throws {InputFault} `template-missing` where a file can't be read
 */
export async function loadTemplate(house: string, own?: string): Promise<Template> {
  const houseSections = await readSections(join(house, 'sections'), 'templates/sections')
  const ownSections = own === undefined ? {} : await readSections(join(dirname(own), 'sections'), 'sections')
  return {
    review: own === undefined ? await read(join(house, 'review.md'), 'templates/review.md') : await read(own, basename(own)),
    sections: { ...houseSections, ...ownSections },
    sentences: await read(join(house, 'sentences.yaml'), 'templates/sentences.yaml'),
  }
}

async function readSections(folder: string, place: string): Promise<Record<string, Source>> {
  const files = (await readdir(folder).catch(() => [])).filter((file) => file.endsWith('.md')).sort()
  const sources = await Promise.all(files.map(async (file) => [basename(file, '.md'), await read(join(folder, file), `${place}/${file}`)] as const))
  return Object.fromEntries(sources)
}

async function read(path: string, place: string): Promise<Source> {
  try {
    return { place, text: await readFile(path, 'utf8') }
  } catch {
    throw new InputFault([{
      code: 'template-missing', place, message: `Unexpected absence of ${place}, expected a template file`, mend: `Put the file there, or mend \`template\` in account.yaml.`,
    }])
  }
}
