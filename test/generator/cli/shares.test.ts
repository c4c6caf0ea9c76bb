import { expect, test } from 'vitest'
import { sharesOf } from '../../../generator/cli/shares.ts'

const gigabytes = 2 ** 30

test.each([
  [24, 1, 64, { atOnce: 1, threads: 1 }],
  [24, 2, 16, { atOnce: 2, threads: 2 }],
  [24, 4, 16, { atOnce: 2, threads: 2 }],
  [24, 8, 64, { atOnce: 4, threads: 2 }],
  [24, 32, 64, { atOnce: 4, threads: 8 }],
  [1, 8, 64, { atOnce: 1, threads: 8 }],
  [24, 8, 4, { atOnce: 2, threads: 4 }],
  [24, 8, 1, { atOnce: 1, threads: 8 }],
])('%i accounts, %i threads, %i GB: %j', (accounts, threads, memory, expected) => {
  expect(sharesOf(accounts, threads, memory * gigabytes)).toEqual(expected)
})
