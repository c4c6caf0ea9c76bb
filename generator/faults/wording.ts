/** Names in a row, each short, and the last of very many left out. */
export function told(names: readonly string[]): string {
  const more = names.length - mostTold
  const shown = names.slice(0, mostTold).map((name) => `\`${shortened(name)}\``).join(', ')
  return names.length === 0 ? 'nothing' : more > 0 ? `${shown} and ${more} more` : shown
}

const mostTold = 12

/** A mistaken column may hold whole texts, and a mistaken header be one. */
export function shortened(text: string): string {
  return text.length > 60 ? `${text.slice(0, 57)}...` : text
}

/** What a wording says: the two halves of "Unexpected X at PLACE, expected Y", and the mend. */
export interface Wording {
  readonly unexpected: string
  readonly expected: string
  readonly mend: string
}
