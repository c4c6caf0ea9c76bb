import { expect, test } from 'vitest'
import { deferred } from '../../../generator/cli/deferred.ts'
import { sideBySide } from '../../../generator/cli/side-by-side.ts'

test('results come in the order of the list, whatever ends first; begun in that order, never more at once than asked', async () => {
  const gates = Array.from({ length: 5 }, deferred)
  const begun: number[] = []
  let [inside, most] = [0, 0]
  const results = sideBySide(gates, 2, async ({ promise }, index) => {
    begun.push(index)
    most = Math.max(most, ++inside)
    await promise
    inside--
    return index * 10
  })
  for (const last of [1, 2, 0, 4, 3]) {
    await new Promise((resolve) => { setImmediate(resolve) })
    gates[last].resolve()
  }
  expect(await results).toEqual([0, 10, 20, 30, 40])
  expect(begun).toEqual([0, 1, 2, 3, 4])
  expect(most).toBe(2)
})

test('nothing to do, and more at once than there is to do', async () => {
  expect(await sideBySide([], 3, () => Promise.resolve(1))).toEqual([])
  expect(await sideBySide(['a'], 3, (item) => Promise.resolve(item))).toEqual(['a'])
})
