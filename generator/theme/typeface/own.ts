import { create, type Font } from 'fontkit'
import { faultOf } from '../../faults/catalogue.ts'
import { InputFault } from '../../faults/fault.ts'
import { type NamedFile, readBounded } from '../bounded-file.ts'
import { advanceTable } from '../metrics/advances.ts'
import type { Face, Typeface } from '../theme.ts'

/** Font files of an account, by weight. */
export interface OwnFiles {
  readonly regular: NamedFile
  /** Left out: the bold one serves. */
  readonly semibold: NamedFile | null
  readonly bold: NamedFile
}

const kinds = ['.woff2', '.ttf', '.otf'] as const
const mostBytes = 2_000_000
/** What a woff2 file says that it unpacks to; a few kB can pretend to be gigabytes. */
const mostUnpacked = 20_000_000

/** Signs that every review writes; one that a typeface lacks would come in from another, and differ from machine to machine. */
const needed = [...Array.from({ length: 0x7e - 0x20 + 1 }, (_, index) => String.fromCharCode(0x20 + index)), '\u2212', '\u2013', '\u2019', '\u2026', '\u00d7']

/**
 * A typeface from font files of the account: static faces of regular, semibold and bold, measured as they are read.
 *
 * The name is the program's own, so that no font of the same name on the reader's machine is taken for it.
 *
 * @throws {InputFault} at the file's place in theme.yaml, with what is wrong
 */
export async function ownTypeface({ regular, semibold, bold }: OwnFiles): Promise<Typeface> {
  const [light, middle, heavy] = [await readFace(regular), semibold === null ? null : await readFace(semibold), await readFace(bold)]
  const weights = [[400, light], [600, middle ?? heavy], [700, heavy]] as const
  return {
    family: 'Account Typeface', generic: 'sans-serif',
    faces: weights.map(([weight, { form, bytes }]): Face => ({ weight, range: 'U+0-10FFFF', form, bytes })),
    advances: advanceTable(Object.fromEntries(weights.map(([weight, { font }]) => [weight, [font]]))),
  }
}

interface ReadFace { readonly font: Font, readonly form: Face['form'], readonly bytes: Uint8Array }

async function readFace(file: NamedFile): Promise<ReadFace> {
  const bytes = await readBounded(file, kinds, mostBytes)
  const refuse = (found: string, expected: string, mend: string): never => {
    throw new InputFault([faultOf('theme-typeface', file.place, { found: `${found} in \`${file.path}\``, expected, mend })])
  }
  const form = formOf(bytes) ?? refuse('other bytes than those of a font', 'a woff2, TrueType or OpenType file', 'Export the face again as woff2, ttf or otf.')
  if (form === 'woff2' && unpackedSize(bytes) > mostUnpacked) refuse('a font that unpacks to more than 20 MB', 'one face of an alphabet', 'Leave out the characters that no review needs.')
  const font = parsed(bytes) ?? refuse('a font that can’t be read', 'a woff2, TrueType or OpenType file', 'Export the face again as woff2, ttf or otf.')
  if (Object.keys(font.variationAxes).length > 0) refuse('a variable font', 'a static face', 'Export one static file for each weight: a variable font prints badly.')
  if (font['OS/2']?.fsType?.noEmbedding === true) refuse('a font whose licence forbids embedding', 'one that may be embedded', 'Ask its maker for a file that may be embedded in documents.')
  const absent = needed.filter((character) => !font.hasGlyphForCodePoint(character.codePointAt(0)!))
  if (absent.length > 0) refuse(`absence of ${absent.slice(0, 8).map((character) => `"${character}"`).join(' ')}`, 'letters, figures and signs of a review', 'Export the face with basic Latin, the minus sign, the dash, the apostrophe, the ellipsis and the times sign.')
  return { font, form, bytes }
}

/** By the first four bytes: OpenType 1.9, table directory; WOFF 2.0, section 4. */
function formOf(bytes: Uint8Array): Face['form'] | null {
  const tag = Buffer.from(bytes.subarray(0, 4)).toString('latin1')
  if (tag === 'wOF2') return 'woff2'
  if (tag === 'OTTO') return 'opentype'
  return tag === '\0\x01\0\0' || tag === 'true' ? 'truetype' : null
}

function unpackedSize(bytes: Uint8Array): number {
  return bytes.length < 20 ? Infinity : Buffer.from(bytes).readUInt32BE(16)
}

function parsed(bytes: Uint8Array): Font | null {
  try {
    const font = create(Buffer.from(bytes))
    if (!('unitsPerEm' in font) || !(font.unitsPerEm > 0)) return null
    // tables are read when they are asked for: ask here, where a broken one is caught
    advanceTable({ 400: [font] })
    return font
  } catch {
    return null
  }
}
