import { expect, test } from 'vitest'
import type { Datum } from '../../../../generator/render/charts/chart-data.ts'
import { stackedShares } from '../../../../generator/render/charts/stack-ends.ts'

const row = (level: string, start: number, share: number, shareBase: number): Datum => ({ factor: 'poster', level, label: level, start, share, share_base: shareBase })
const mix = [row('few', 1, 0.5, 0.5), row('some', 1, 0.3, 0.3), row('many', 1, 0.2, 0.2), row('few', 2, 0.45, 0.5), row('some', 2, 0.2, 0.3), row('many', 2, 0.35, 0.2)]

test('levels stand on each other in the order of the table, whatever their size', () => {
  const { stack } = stackedShares(mix, 'poster', 200)
  expect(stack.filter((datum) => datum.start === 2).map(({ level, from, to }) => [level, Number(from).toFixed(2), Number(to).toFixed(2)]))
    .toEqual([['few', '0.00', '0.45'], ['some', '0.45', '0.65'], ['many', '0.65', '1.00']])
})

test('the level whose share is furthest from that in the base leads, in every period', () => {
  const leads = (rows: readonly Datum[]) => [...new Set(stackedShares(rows, 'poster', 200).stack.filter((datum) => datum.leads).map(({ level }) => level))]
  expect(leads(mix)).toEqual(['many'])
  expect(leads(mix.map((datum) => datum.level === 'some' ? { ...datum, share_base: 0.9 } : datum))).toEqual(['some'])
})
