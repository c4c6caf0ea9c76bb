import { type Linear, linearOf } from './srgb.ts'

/** What text, and what a mark that carries meaning, must reach: WCAG 2.2, success criteria 1.4.3 and 1.4.11 (level AA). */
export const leastContrast = { text: 4.5, mark: 3 } as const

/** @see WCAG 2.2, relative luminance; 0 for black, 1 for white */
export function luminance([red, green, blue]: Linear): number {
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}

/**
 * Contrast of two colours, from 1 to 21, whichever is the lighter.
 *
 * @see WCAG 2.2, contrast ratio
 * @example contrast('#000000', '#ffffff') // => 21
 */
export function contrast(one: string, other: string): number {
  const [darker, lighter] = [luminance(linearOf(one)), luminance(linearOf(other))].sort((a, b) => a - b)
  return (lighter + 0.05) / (darker + 0.05)
}
