import { readAccount } from '../../../generator/account/read-account.ts'
import { InputFault, type Fault } from '../../../generator/faults/fault.ts'
import type { RawInputs } from '../../../generator/inputs/raw-inputs.ts'
import { readSmallInputs } from '../../../generator/inputs/read-small-inputs.ts'
import { withAccount } from '../intake/temporary-account.ts'

export type Files = Readonly<Record<string, string | Uint8Array>>

export const surveyHeader = 'wave,field_start,field_end,metric,segment,base,effective_base,value,kind,sd\n'
export const firstRow = 'w1,2026-01-05,2026-01-16,favourability,,400,340,0.43,share,\n'

/** Keys of the account beside its posts, on a grid of weeks. */
function accountWith(keys: string): string {
  return `account: demo\nbrand: Skerrow Ferries\nmentions:\n  - files: posts.csv\n    columns: { posted_at: published, venue: source, score: tone }\n    score: { range: [1, 5] }\n${keys}`
}

/** Read the small inputs of an account with these keys and files. */
export async function readInputs(keys: string, files: Files): Promise<RawInputs> {
  return withAccount({ 'posts.csv': 'published,source,tone\n', 'account.yaml': accountWith(keys), ...files }, async (folder) => readSmallInputs(await readAccount(folder)))
}

/** The faults of such an account. */
export async function faultsOf(keys: string, files: Files): Promise<readonly Fault[]> {
  const reason: unknown = await readInputs(keys, files).then(() => null, (error: unknown) => error)
  if (!(reason instanceof InputFault)) throw new Error('no fault', { cause: reason })
  return reason.faults
}
