import type { Font } from 'fontkit'

/** The characters that are measured: Latin letters, figures, and the signs that reviews are written with. */
const measuredCharacters: readonly number[] = [...span(0x20, 0x7e), ...span(0xa0, 0x17f), ...span(0x2010, 0x2026), 0x202f, 0x20ac, 0x2212]

const perEm = 1000

/**
 * How far each measured character moves the pen.
 *
 * @param faces - of one weight; the first that has a character gives its width
 * @returns thousandths of an em, in the order of `measuredCharacters`; 0 where no face has the character
 */
function advancesOf(faces: readonly Font[]): readonly number[] {
  return measuredCharacters.map((character) => {
    const owner = faces.find((face) => face.hasGlyphForCodePoint(character))
    return owner === undefined ? 0 : Math.round((owner.glyphForCodePoint(character).advanceWidth / owner.unitsPerEm) * perEm)
  })
}

/** The widths of each weight as one table. */
export function advanceTable(weights: Readonly<Record<string, readonly Font[]>>) {
  return {
    perEm, characters: String.fromCodePoint(...measuredCharacters),
    advances: Object.fromEntries(Object.entries(weights).map(([weight, faces]) => [weight, advancesOf(faces)])),
  }
}

function span(first: number, last: number): number[] {
  return Array.from({ length: last - first + 1 }, (_, index) => first + index)
}
