/** A text of an account as a terminal may be given it: what would move the cursor, or hide or turn about what stands there, gives way to a space. */
export function plainText(text: string): string {
  return text.replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]+/gu, ' ')
}
