import { readAccount } from '../../../generator/account/read-account.ts'
import { InputFault, type Fault } from '../../../generator/faults/fault.ts'
import type { RawInputs } from '../../../generator/inputs/raw-inputs.ts'
import { readSmallInputs } from '../../../generator/inputs/read-small-inputs.ts'
import { withAccount } from '../intake/temporary-account.ts'

export type Files = Readonly<Record<string, string | Uint8Array>>

export const surveyHeader = 'wave,field_start,field_end,metric,segment,base,effective_base,value,kind,sd\n'
export const firstRow = 'w1,2026-01-05,2026-01-16,favourability,,400,340,0.43,share,\n'

/** An account beside the small inputs, on a grid of weeks, whose scores come from a range; it names no venue or topic. */
const starredAccount = 'account: demo\nbrand: Skerrow Ferries\nmentions:\n  - files: posts.csv\n    columns: { posted_at: published, venue: source, score: tone }\n    score: { range: [1, 5] }\n'

/** One whose scores come from labels, with venues and topics of its own. */
export const labelledAccount = `${starredAccount.replace('range: [1, 5]', 'labels: { negative: -1, neutral: 0, Very Positive: 1 }')}venues:
  boards: { label: Discussion boards, values: [forum, island board] }
  blogs: { label: Blogs }
topics:
  onboard: { label: On board, values: [food and seats] }
  punctuality: { label: Punctuality }
  staff: { label: Crew and staff }
`

/** Read the small inputs of an account with these keys besides, and these files. */
export async function readInputs(keys: string, files: Files, account = starredAccount): Promise<RawInputs> {
  return withAccount({ 'posts.csv': 'published,source,tone\n', 'account.yaml': account + keys, ...files }, async (folder) => readSmallInputs(await readAccount(folder)))
}

/** The faults of such an account. */
export async function faultsOf(keys: string, files: Files, account = starredAccount): Promise<readonly Fault[]> {
  const reason: unknown = await readInputs(keys, files, account).then(() => null, (error: unknown) => error)
  if (!(reason instanceof InputFault)) throw new Error('no fault', { cause: reason })
  return reason.faults
}
