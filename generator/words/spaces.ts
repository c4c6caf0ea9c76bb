/**
 * Text with Intl's narrow and thin spaces (U+202F, U+2009) as no-break spaces: typefaces often lack the first two, and a space that another
 * face supplies tears a figure apart.
 */
export function plainSpaces(text: string): string {
  return text.replace(/[\u202f\u2009]/g, '\u00a0')
}
