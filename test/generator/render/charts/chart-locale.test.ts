import { parse, View } from 'vega'
import { expect, test } from 'vitest'
import { vegaLocale } from '../../../../generator/render/charts/chart-locale.ts'

const fifthOfOctober = 'utc(2026, 9, 5)'
const written = ["format(-12345.6, ',.1f')", "format(0.5, '+~f')", "format(0.9, '.0%')", `utcFormat(${fifthOfOctober}, '%x')`, `utcFormat(${fifthOfOctober}, '%b')`]

/** What an axis writes, by vega itself. */
function axis(locale: string): readonly unknown[] {
  const signals = written.map((update, at) => ({ name: `s${at}`, update }))
  const view = new View(parse({ config: { locale: vegaLocale(locale) }, signals }), { renderer: 'none' })
  const said = signals.map(({ name }) => view.run().signal(name) as unknown)
  view.finalize()
  return said
}

test('figures, percentages and days stand on axes as the locale has them', () => {
  expect(axis('en-GB')).toEqual(['\u221212,345.6', '+0.5', '90%', '5 Oct', 'Oct'])
  expect(axis('en-US')).toEqual(['\u221212,345.6', '+0.5', '90%', 'Oct 5', 'Oct'])
  expect(axis('de-DE')).toEqual(['\u221212.345,6', '+0,5', '90\u00a0%', '5. Okt', 'Okt'])
  expect(axis('fr-FR')).toEqual(['\u221212\u00a0345,6', '+0,5', '90\u00a0%', '5 oct.', 'oct.'])
  expect(axis('pt-BR')).toEqual(['\u221212.345,6', '+0,5', '90%', '5 de out.', 'out.'])
})
