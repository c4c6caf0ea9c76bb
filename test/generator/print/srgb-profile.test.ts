import { createHash } from 'node:crypto'
import { expect, test } from 'vitest'
import { linearOf, srgbColorants, srgbProfile } from '../../../generator/print/srgb-profile.ts'

const profile = Buffer.from(srgbProfile())

function tag(signature: string): Buffer {
  for (let at = 132; at < 132 + 12 * profile.readUInt32BE(128); at += 12) {
    if (profile.toString('latin1', at, at + 4) === signature) return profile.subarray(profile.readUInt32BE(at + 4), profile.readUInt32BE(at + 4) + profile.readUInt32BE(at + 8))
  }
  throw new Error(`no tag ${signature}`)
}

const xyz = (signature: string) => [8, 12, 16].map((at) => tag(signature).readInt32BE(at) / 65536)

test('colorants are those of another maker', () => {
  // srgb.icc of Ghostscript (Debian's icc-profiles-free 2.0.1), read from its tags; its D50 is 0.82509 in Z, that of ICC.1 is 0.8249
  const theirs = [[0.436065673828125, 0.2224884033203125, 0.013916015625], [0.3851470947265625, 0.7168731689453125, 0.097076416015625], [0.14306640625, 0.06060791015625, 0.7140960693359375]]
  srgbColorants().forEach((colorant, i) => { colorant.forEach((part, k) => { expect(Math.abs(part - theirs[i][k])).toBeLessThan(2e-4) }) })
})

test('white is the D50 of the profile connection space', () => {
  const sums = [0, 1, 2].map((k) => xyz('rXYZ')[k] + xyz('gXYZ')[k] + xyz('bXYZ')[k])
  // each of three figures is rounded to 1/65536
  ;[0.9642, 1, 0.8249].forEach((part, k) => { expect(Math.abs(sums[k] - part)).toBeLessThan(2 / 65536) })
  expect(xyz('wtpt').map((part) => part.toFixed(4))).toEqual(['0.9642', '1.0000', '0.8249'])
})

test('the tone curve is that of IEC 61966-2-1', () => {
  // both branches meet at 0.04045 to the standard's own rounding; 0.5 and 0.2 by hand: ((0.5 + 0.055) / 1.055) ** 2.4
  expect(linearOf(0.04045)).toBeCloseTo(0.0031308, 7)
  expect(linearOf(0.0404500001)).toBeCloseTo(0.0031308, 7)
  expect(linearOf(0.5)).toBeCloseTo(0.21404114, 8)
  expect([linearOf(0), linearOf(1)]).toEqual([0, 1])
  const curve = tag('gTRC')
  expect([curve.readUInt32BE(8), curve.readUInt16BE(12), curve.readUInt16BE(12 + 2 * 1023)]).toEqual([1024, 0, 65535])
})

test('is a whole profile, the same each time', () => {
  expect(profile.readUInt32BE(0)).toBe(profile.length)
  expect(profile.length).toBe(2548)
  expect(createHash('sha256').update(srgbProfile()).digest('hex')).toBe(createHash('sha256').update(profile).digest('hex'))
  expect(createHash('sha256').update(profile).digest('hex')).toBe('3a4674f459119063c1b74358ae5a95976c6333d839b4d8dd51750e49913e0471')
})
