/** Characters that a name may have: it stands in tables and beside lines. A longer one is a text that strayed into its place. */
export const mostCharacters = 80

/** Whether a name is too long, by characters as one counts them: a pair of surrogates is one. */
export function isLongName(name: string): boolean {
  return name.length > mostCharacters && Array.from(name).length > mostCharacters
}
