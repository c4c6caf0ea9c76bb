import { crc32, inflateSync } from 'node:zlib'

/** What is wrong with a picture, or the picture. */
export type Cleaned = { readonly bytes: Uint8Array } | { readonly found: string, readonly expected: string }

const signature = Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a)
/** What draws the picture; texts, dates, thumbnails and further frames are left out. */
const kept: ReadonlySet<string> = new Set(['IHDR', 'PLTE', 'tRNS', 'gAMA', 'cHRM', 'sRGB', 'IDAT', 'IEND'])
/** Longest side, px: at 30 mm height that is more than 600 dpi of a logo six times as wide. */
const longestSide = 4000

interface Chunk { readonly kind: string, readonly whole: Uint8Array, readonly data: Uint8Array }

/**
 * A PNG with nothing in it but what draws it: the signature, each chunk with its checksum, sizes within bounds, and pixels that unpack to as many bytes as the
 * header says and no more.
 *
 * @see ISO/IEC 15948 (PNG), sections 5 and 11
 */
export function cleanPng(bytes: Uint8Array): Cleaned {
  const wrong = (found: string, expected: string): Cleaned => ({ found, expected })
  if (!signature.every((byte, at) => bytes[at] === byte)) return wrong('other bytes than those of a PNG', 'a PNG picture')
  const chunks = chunksOf(bytes)
  const header = chunks?.[0]
  if (chunks === null || header?.kind !== 'IHDR' || header.data.length !== 13 || chunks.at(-1)?.kind !== 'IEND') return wrong('a broken PNG', 'whole chunks from IHDR to IEND, each with its checksum')
  const [width, height] = [uint32(header.data, 0), uint32(header.data, 4)]
  if (width === 0 || height === 0 || width > longestSide || height > longestSide) return wrong(`a picture of ${width} by ${height} pixels`, `1 to ${longestSide} on either side`)
  if (!unpacksTo(chunks.filter(({ kind }) => kind === 'IDAT').map(({ data }) => data), packedSize(header.data, width, height))) {
    return wrong('pixels that are too few, too many or broken', 'as many as the header says')
  }
  return { bytes: Buffer.concat([signature, ...chunks.filter(({ kind }) => kept.has(kind)).map(({ whole }) => whole)]) }
}

/** All chunks up to IEND; null where one is cut short or its checksum wrong. What follows IEND is not read. */
function chunksOf(bytes: Uint8Array): readonly Chunk[] | null {
  const chunks: Chunk[] = []
  for (let at = signature.length; at + 12 <= bytes.length;) {
    const length = uint32(bytes, at)
    if (at + 12 + length > bytes.length) return null
    const kind = Buffer.from(bytes.subarray(at + 4, at + 8)).toString('latin1')
    if (crc32(bytes.subarray(at + 4, at + 8 + length)) !== uint32(bytes, at + 8 + length)) return null
    chunks.push({ kind, whole: bytes.subarray(at, at + 12 + length), data: bytes.subarray(at + 8, at + 8 + length) })
    if (kind === 'IEND') return chunks
    at += 12 + length
  }
  return null
}

const channels: Readonly<Record<number, number>> = { 0: 1, 2: 3, 3: 1, 4: 2, 6: 4 }

/** Bytes of the unpacked rows, each with its filter byte; seven passes of an interlaced picture have more rows. */
function packedSize(header: Uint8Array, width: number, height: number): { readonly least: number, readonly most: number } {
  const bits = header[8] * (channels[header[9]] ?? 0)
  const least = (Math.ceil((width * bits) / 8) + 1) * height
  const isInterlaced = header[12] === 1
  return { least: bits === 0 ? Infinity : isInterlaced ? Math.floor((width * height * bits) / 8) : least, most: isInterlaced ? 2 * least + 64 : least }
}

function unpacksTo(packed: readonly Uint8Array[], { least, most }: { readonly least: number, readonly most: number }): boolean {
  if (!Number.isFinite(least)) return false
  try {
    return inflateSync(Buffer.concat(packed), { maxOutputLength: most }).length >= least
  } catch {
    return false
  }
}

function uint32(bytes: Uint8Array, at: number): number {
  return Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength).readUInt32BE(at)
}
