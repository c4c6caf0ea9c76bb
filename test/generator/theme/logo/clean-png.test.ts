import { crc32, deflateSync } from 'node:zlib'
import { describe, expect, test } from 'vitest'
import { cleanPng } from '../../../../generator/theme/logo/clean-png.ts'

function chunk(kind: string, data: Uint8Array = Uint8Array.of()): Buffer {
  const body = Buffer.concat([Buffer.from(kind, 'latin1'), data])
  const [length, sum] = [Buffer.alloc(4), Buffer.alloc(4)]
  length.writeUInt32BE(data.length)
  sum.writeUInt32BE(crc32(body))
  return Buffer.concat([length, body, sum])
}
function header(width: number, height: number): Buffer {
  const data = Buffer.alloc(13)
  data.writeUInt32BE(width, 0)
  data.writeUInt32BE(height, 4)
  data.set([8, 6, 0, 0, 0], 8)
  return chunk('IHDR', data)
}
const signature = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])
const pixels = (rows: number, width: number) => chunk('IDAT', deflateSync(Buffer.alloc(rows * (4 * width + 1))))
const picture = (...more: readonly Buffer[]) => Buffer.concat([signature, header(3, 2), ...more, pixels(2, 3), chunk('IEND')])

const refused = (bytes: Uint8Array): string => {
  const cleaned = cleanPng(bytes)
  if ('bytes' in cleaned) throw new Error('passed')
  return cleaned.found
}

describe('a PNG', () => {
  test('passes as it is, and loses texts and what follows its end', () => {
    expect(cleanPng(picture())).toEqual({ bytes: picture() })
    const noted = picture(chunk('tEXt', Buffer.from('Author\0somebody')), chunk('acTL', Buffer.alloc(8)))
    expect(cleanPng(Buffer.concat([noted, Buffer.from('<script>alert(1)</script>')]))).toEqual({ bytes: picture() })
  })

  test.each([
    ['an SVG by another name', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'), /other bytes/],
    ['nothing', Buffer.alloc(0), /other bytes/],
    ['one that is cut', picture().subarray(0, 40), /broken/],
    ['a chunk with a wrong checksum', Buffer.from(picture()).fill(7, 20, 21), /broken/],
    ['a chunk longer than the file', Buffer.concat([signature, Buffer.from([0xff, 0xff, 0xff, 0xff]), Buffer.from('IHDR'), Buffer.alloc(40)]), /broken/],
    ['too many pixels', Buffer.concat([signature, header(100_000, 100_000), pixels(2, 3), chunk('IEND')]), /100000 by 100000/],
    ['no pixels', Buffer.concat([signature, header(0, 2), pixels(2, 3), chunk('IEND')]), /0 by 2/],
    ['pixels that unpack to more than they say', Buffer.concat([signature, header(3, 2), pixels(4000, 4000), chunk('IEND')]), /too many/],
    ['fewer pixels than it says', Buffer.concat([signature, header(3, 200), pixels(2, 3), chunk('IEND')]), /too few/],
    ['pixels that are no pixels', Buffer.concat([signature, header(3, 2), chunk('IDAT', Buffer.from('no')), chunk('IEND')]), /broken/],
  ] as const)('%s is refused', (_what, bytes, found) => { expect(refused(bytes)).toMatch(found) })
})
