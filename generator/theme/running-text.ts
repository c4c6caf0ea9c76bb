/** A text of the margins: what stands as it is, and places that each page fills. */
export type RunningText = readonly RunningPart[]
export type RunningPart = { readonly text: string } | { readonly place: RunningPlace }
export type RunningPlace = typeof runningPlaces[number]

export const runningPlaces = ['brand', 'period', 'title', 'page', 'pages'] as const
/** One line of a margin. */
export const longestRunning = 100

/**
 * Read `{brand}, page {page}`.
 *
 * @returns null where a brace holds no known place or is left open, where the text is too long, or where it holds a control character
 */
export function readRunning(text: string): RunningText | null {
  if (text.length > longestRunning || /\p{Cc}/u.test(text)) return null
  const parts = text.split(/(\{\w+\})/u).filter((part) => part !== '').map((part) => partOf(part))
  return parts.every((part) => part !== null) ? parts : null
}

function partOf(part: string): RunningPart | null {
  const name = /^\{(\w+)\}$/u.exec(part)?.[1]
  const place = runningPlaces.find((known) => known === name)
  if (place !== undefined) return { place }
  return /[{}]/.test(part) ? null : { text: part }
}
