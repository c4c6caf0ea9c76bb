/** Red, green and blue of linear light, each in [0, 1]. */
export type Linear = readonly [number, number, number]

/**
 * A colour's linear light.
 *
 * @param colour - `#rrggbb`, sRGB
 * @see IEC 61966-2-1; the bend at 0.04045 as WCAG 2.2 has it
 */
export function linearOf(colour: string): Linear {
  const [red, green, blue] = [1, 3, 5].map((at) => levels[Number.parseInt(colour.slice(at, at + 2), 16)])
  return [red, green, blue]
}

/** The colour of linear light: each part is cut to [0, 1] and rounded to 8 bits. */
export function colourOf(light: Linear): string {
  return colourOfBytes(light.map(byteOf))
}

/** @param bytes - red, green and blue, whole, 0 to 255 */
export function colourOfBytes(bytes: readonly number[]): string {
  return `#${bytes.map((byte) => byte.toString(16).padStart(2, '0')).join('')}`
}

/** @returns red, green and blue, 0 to 255 */
export function bytesOf(colour: string): readonly [number, number, number] {
  return [1, 3, 5].map((at) => Number.parseInt(colour.slice(at, at + 2), 16)) as [number, number, number]
}

const levels = Array.from({ length: 256 }, (_, byte) => (byte / 255 <= 0.04045 ? byte / 255 / 12.92 : ((byte / 255 + 0.055) / 1.055) ** 2.4))

function byteOf(part: number): number {
  const within = Math.min(1, Math.max(0, part))
  return Math.round(255 * (within <= 0.0031308 ? 12.92 * within : 1.055 * within ** (1 / 2.4) - 0.055))
}
