import { distance, oklabOf } from './oklab.ts'
import { type Linear, linearOf } from './srgb.ts'

type Matrix = readonly [Linear, Linear, Linear]

/**
 * How linear sRGB looks to an eye that lacks one kind of cone, severity 1.0.
 *
 * @see Machado, Oliveira and Fernandes (2009), A physiologically-based model for simulation of color vision deficiency, IEEE TVCG 15(6), table 1; from memory,
 *   and the same as the library culori 4.0.2 has. Its authors call the one for missing short cones an approximation.
 */
const visions = {
  protanopia: [[0.152286, 1.052583, -0.204868], [0.114503, 0.786281, 0.099216], [-0.003882, -0.048116, 1.051998]],
  deuteranopia: [[0.367322, 0.860646, -0.227968], [0.280085, 0.672501, 0.047413], [-0.01182, 0.04294, 0.968881]],
  tritanopia: [[1.255528, -0.076749, -0.178779], [-0.078411, 0.930809, 0.147602], [0.004733, 0.691367, 0.3039]],
} as const satisfies Readonly<Record<string, Matrix>>

export type Vision = keyof typeof visions | 'full colour vision'
export const allVisions = ['full colour vision', 'protanopia', 'deuteranopia', 'tritanopia'] as const satisfies readonly Vision[]

/** Light as an eye of that kind takes it, cut to what a screen can show. */
export function seenBy(vision: Vision, light: Linear): Linear {
  if (vision === 'full colour vision') return light
  const [red, green, blue] = visions[vision].map((row) => Math.min(1, Math.max(0, row[0] * light[0] + row[1] * light[1] + row[2] * light[2])))
  return [red, green, blue]
}

/** How far apart two colours look to the eye that parts them least: distance in OKLab, and to which. */
export function leastDifference(one: string, other: string): { readonly difference: number, readonly vision: Vision } {
  const seen = allVisions.map((vision) => ({ vision, difference: distance(oklabOf(seenBy(vision, linearOf(one))), oklabOf(seenBy(vision, linearOf(other)))) }))
  return seen.reduce((least, each) => (each.difference < least.difference ? each : least))
}
