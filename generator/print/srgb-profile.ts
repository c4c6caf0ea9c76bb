/*
 * The sRGB colour space as an ICC profile (version 2, display, matrix and tone curves), computed: what a PDF/A names as its output intent.
 * Primaries, white and transfer function: IEC 61966-2-1:1999. File format: ICC.1:2001-04.
 */

type Vector = readonly [number, number, number]
type Matrix = readonly [Vector, Vector, Vector]

/** Chromaticities x, y of red, green, blue (ITU-R BT.709) and of the white D65. */
const primaries = [[0.64, 0.33], [0.3, 0.6], [0.15, 0.06]] as const
const d65 = [0.3127, 0.329] as const
/** White of the profile connection space, as ICC.1 states it. */
const d50: Vector = [0.9642, 1, 0.8249]
/** Cone responses after Bradford (Lam 1985), by which an ICC profile adapts from one white to another. */
const bradford: Matrix = [[0.8951, 0.2664, -0.1614], [-0.7502, 1.7135, 0.0367], [0.0389, -0.0685, 1.0296]]

/** sRGB's transfer function: encoded 0..1 -> linear 0..1. */
export function linearOf(encoded: number): number {
  return encoded <= 0.04045 ? encoded / 12.92 : ((encoded + 0.055) / 1.055) ** 2.4
}

/** Red, green and blue of sRGB at full intensity, as X, Y, Z under the profile's white D50: their sum is D50. */
export function srgbColorants(): Matrix {
  const white = xyzOf(d65)
  const directions = transpose(primaries.map(xyzOf) as unknown as Matrix)
  const intensities = solve(directions, white)
  const responses = multiply(bradford, white)
  const wanted = multiply(bradford, d50)
  const adapted = (colour: Vector): Vector => solve(bradford, map(multiply(bradford, colour), (response, i) => response * wanted[i] / responses[i]))
  return primaries.map((primary, i) => adapted(map(xyzOf(primary), (part) => part * intensities[i]))) as unknown as Matrix
}

/** @returns the profile's bytes, the same on every call */
export function srgbProfile(): Uint8Array {
  const [red, green, blue] = srgbColorants().map(xyzTag)
  const curve = curveTag(1024)
  const tags = [
    ['desc', descriptionTag('sRGB IEC61966-2.1, computed')], ['cprt', asciiTag('text', 'No copyright: computed from a standard')], ['wtpt', xyzTag(d50)],
    ['rXYZ', red], ['gXYZ', green], ['bXYZ', blue], ['rTRC', curve], ['gTRC', curve], ['bTRC', curve],
  ] as const
  return assemble(tags)
}

const headerSize = 128

/** Header, tag table, then each distinct tag once, on boundaries of four bytes. */
function assemble(tags: readonly (readonly [string, Buffer])[]): Uint8Array {
  const distinct = [...new Set(tags.map(([, data]) => data))]
  const places = new Map<Buffer, number>()
  let size = headerSize + 4 + 12 * tags.length
  for (const data of distinct) {
    places.set(data, size)
    size += Math.ceil(data.length / 4) * 4
  }
  const profile = Buffer.alloc(size)
  writeHeader(profile)
  profile.writeUInt32BE(tags.length, headerSize)
  tags.forEach(([signature, data], i) => {
    const entry = headerSize + 4 + 12 * i
    profile.write(signature, entry, 'latin1')
    profile.writeUInt32BE(places.get(data)!, entry + 4)
    profile.writeUInt32BE(data.length, entry + 8)
  })
  for (const [data, place] of places) data.copy(profile, place)
  return profile
}

/** Dated with the standard's publication, so that the profile is the same whenever it is made. */
function writeHeader(profile: Buffer): void {
  profile.writeUInt32BE(profile.length, 0)
  profile.writeUInt32BE(0x02400000, 8)
  profile.write('mntrRGB XYZ ', 12, 'latin1')
  ;[1999, 10, 1, 0, 0, 0].forEach((part, i) => profile.writeUInt16BE(part, 24 + 2 * i))
  profile.write('acsp', 36, 'latin1')
  d50.forEach((part, i) => profile.writeInt32BE(fixed(part), 68 + 4 * i))
}

/** s15Fixed16Number. */
const fixed = (value: number): number => Math.round(value * 65536)

function xyzTag(colour: Vector): Buffer {
  const tag = Buffer.alloc(20)
  tag.write('XYZ ', 'latin1')
  colour.forEach((part, i) => tag.writeInt32BE(fixed(part), 8 + 4 * i))
  return tag
}

function curveTag(points: number): Buffer {
  const tag = Buffer.alloc(12 + 2 * points)
  tag.write('curv', 'latin1')
  tag.writeUInt32BE(points, 8)
  for (let i = 0; i < points; i += 1) tag.writeUInt16BE(Math.round(65535 * linearOf(i / (points - 1))), 12 + 2 * i)
  return tag
}

function asciiTag(type: string, text: string): Buffer {
  const tag = Buffer.alloc(8 + text.length + 1)
  tag.write(type, 'latin1')
  tag.write(text, 8, 'latin1')
  return tag
}

/** textDescriptionType: the text as ASCII; its Unicode and Macintosh forms are left empty, but their room is not. */
function descriptionTag(text: string): Buffer {
  const tag = Buffer.alloc(12 + text.length + 1 + 78)
  tag.write('desc', 'latin1')
  tag.writeUInt32BE(text.length + 1, 8)
  tag.write(text, 12, 'latin1')
  return tag
}

function xyzOf([x, y]: readonly [number, number]): Vector {
  return [x / y, 1, (1 - x - y) / y]
}

function map(vector: Vector, change: (part: number, index: number) => number): Vector {
  return [change(vector[0], 0), change(vector[1], 1), change(vector[2], 2)]
}

function multiply(matrix: Matrix, vector: Vector): Vector {
  return map(vector, (_, row) => matrix[row][0] * vector[0] + matrix[row][1] * vector[1] + matrix[row][2] * vector[2])
}

function transpose([a, b, c]: Matrix): Matrix {
  return [[a[0], b[0], c[0]], [a[1], b[1], c[1]], [a[2], b[2], c[2]]]
}

function determinant([a, b, c]: Matrix): number {
  return a[0] * (b[1] * c[2] - b[2] * c[1]) - a[1] * (b[0] * c[2] - b[2] * c[0]) + a[2] * (b[0] * c[1] - b[1] * c[0])
}

/** Cramer's rule. */
function solve(matrix: Matrix, right: Vector): Vector {
  const whole = determinant(matrix)
  const columns = transpose(matrix)
  return map(right, (_, at) => determinant(transpose(map3(columns, (column, index) => (index === at ? right : column)))) / whole)
}

function map3(matrix: Matrix, change: (row: Vector, index: number) => Vector): Matrix {
  return [change(matrix[0], 0), change(matrix[1], 1), change(matrix[2], 2)]
}
