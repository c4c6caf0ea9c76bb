import type { Findings } from '../../model/findings/schema.ts'
import type { Account } from '../account/account.ts'
import { compose } from '../compose/compose.ts'
import type { Document } from '../compose/document.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import type { Program } from '../program/program.ts'
import type { Drawings } from '../render/drawings.ts'
import { imprintOf } from '../render/imprint.ts'
import { render } from '../render/render.ts'
import { readHouse, type House } from '../review/house.ts'
import { tablesOf } from '../tables/tables-of.ts'
import { wordFindings } from '../words/word-findings.ts'
import { showInPlace } from './faults-in-place.ts'

/** The review of findings that are known, made anew, and what is wrong in what it is made with. */
export interface Rendered {
  /** null where nothing can be shown. */
  readonly html: string | null
  /** Everything that is wrong. */
  readonly faults: readonly Fault[]
  /** Of those, what the page does not show in its place. */
  readonly unshown: readonly Fault[]
  /** Files of the account that were read, relative to its folder; null where they could not all be. */
  readonly files: readonly string[] | null
}

/** Read template, words, charts, theme and notes again and render the same findings with them. Nothing is computed. */
export async function renderAgain(program: Program, account: Account, findings: Findings, drawings: Drawings): Promise<Rendered> {
  try {
    const house = await readHouse(program, account)
    const worded = wordFindings(findings, house.words)
    const tables = tablesOf(worded)
    const { document, faults, unshown } = composed(house, worded)
    const { charts, words, theme } = house
    return { html: document === null ? null : await render(document, { tables, charts, words, theme, imprint: imprintOf(worded, words), drawings, pictures: 'wide' }), faults, unshown, files: house.files }
  } catch (error) {
    const faults = faultsOf(error)
    return { html: null, faults, unshown: faults, files: null }
  }
}

/** What was put in the place of a fault may bring another to light; more rounds than this do not help. */
const mostRounds = 4

/** Composed as it is, or with what is at fault shown in its place, as long as that helps. */
function composed({ template, words, charts }: House, findings: Findings): { readonly document: Document | null; readonly faults: readonly Fault[]; readonly unshown: readonly Fault[] } {
  const composition = { findings, tables: tablesOf(findings), charts: [...charts.keys()], words }
  let [sound, faults, unshown]: [House['template'], readonly Fault[], readonly Fault[]] = [template, [], []]
  for (let round = 0; round < mostRounds; round++) {
    try {
      return { document: compose({ ...composition, template: sound }), faults, unshown }
    } catch (error) {
      const found = faultsOf(error)
      const shown = showInPlace(sound, found)
      faults = [...faults, ...found]
      if (shown.rest.length === found.length) return { document: null, faults, unshown: faults }
      ;[sound, unshown] = [shown.template, [...unshown, ...shown.rest]]
    }
  }
  return { document: null, faults, unshown: faults }
}

function faultsOf(error: unknown): readonly Fault[] {
  if (error instanceof InputFault) return error.faults
  throw error
}
