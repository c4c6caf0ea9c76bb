import { describe, expect, test } from 'vitest'
import { dayNumber } from '../../../generator/calendar/days.ts'
import { nameEvidence } from '../../../generator/start/column-names.ts'
import { chooseAxis } from '../../../generator/start/propose-account.ts'
import { proposeLocale } from '../../../generator/start/language.ts'
import { namesFrom } from '../../../generator/start/start-account.ts'
import { likelyCut } from '../../../generator/start/table-head.ts'

describe('the time axis', () => {
  test.each([
    ['a year of thick mentions', '2025-01-01', '2025-12-31', 50_000, 'week', 'month'],
    ['three years of a few', '2023-01-01', '2025-12-31', 900, 'month', 'quarter'],
    ['three weeks of very many', '2025-01-06', '2025-01-26', 9000, 'day', 'week'],
    ['three weeks of some', '2025-01-06', '2025-01-26', 300, 'week', 'week'],
    ['two halves of months, so no whole one', '2025-01-10', '2025-02-20', 3000, 'week', 'week'],
    ['one whole month and a bit', '2025-01-01', '2025-02-02', 3000, 'week', 'month'],
  ])('%s', (_, first, last, rows, grid, reporting) => {
    expect(chooseAxis({ first: dayNumber(first), last: dayNumber(last) }, rows)).toMatchObject({ grid, reporting })
  })

  test('no time that can be read', () => {
    expect(chooseAxis(null, 10)).toMatchObject({ grid: 'week', reporting: 'month' })
  })
})

test.each([
  ['skerrow-ferries', { account: 'skerrow-ferries', brand: 'Skerrow Ferries' }], ['Café_Zoë 2', { account: 'cafe-zoe-2', brand: 'Café Zoë 2' }], ['日本', { account: 'account', brand: '日本' }], ['---', { account: 'account', brand: 'Brand' }],
])('what the folder %s is called', (folder, names) => {
  expect(namesFrom(folder)).toEqual(names)
})

describe('how fields are cut', () => {
  test.each([
    ['a,b\n1,2\n', ',', '"'], ['a;b\n"1,5";"2,5"\n', ';', '"'], ['a;b\n1,5;2,5\n3,5;4,5\n', ';', '"'], ['"a, b";"c"\n1;2\n', ';', '"'], ["'a;x';'b'\n'1';'2;3'\n", ';', "'"], ['a\tb\n1, 2, 3\t"x\ny"\n', '\t', '"'], ['a|b\n1|2', '|', '"'],
  ])('%j', (text, delimiter, quote) => {
    expect(likelyCut(text)).toEqual({ delimiter, quote })
  })

  test.each([['a\n1\n'], [''], ['\n\n']])('%j is no table', (text) => {
    expect(likelyCut(text)).toBeNull()
  })
})

test.each([
  ['postedAt', 'posted_at', 1], ['Datum', 'posted_at', 1], ['Veröffentlicht', 'posted_at', 1], ['date_added', 'posted_at', 0.6], ['Quelle', 'venue', 1], ['Étoiles', 'score', 1], ['usuário', 'author', 1], ['colour', 'venue', 0],
] as const)('the name %s speaks for %s with %d', (name, role, weight) => {
  expect(nameEvidence(name).weight[role]).toBe(weight)
})

describe('the language of a file', () => {
  test.each([
    ['German', ['Datum', 'Quelle', 'Verfasser'], [], null, 'de-DE'],
    ['English names, German labels', ['date', 'site'], ['gut', 'schlecht', 'positiv'], null, 'de-DE'],
    ['one word of German and its dates', ['Zeitpunkt', 'x'], [], '%d.%m.%Y %H:%M', 'de-DE'],
    ['one word alone', ['Datum', 'x'], [], null, 'en-GB'],
    ['French', ['Publié', 'Plateforme', 'Auteur'], ['négatif', 'neutre', 'positif'], null, 'fr-FR'],
    ['Portuguese', ['Data', 'Fonte', 'Utilizador'], ['negativo', 'neutro', 'positivo'], null, 'pt-PT'],
    ['Portuguese of Brazil', ['Data', 'Fonte', 'Usuário', 'Avaliação'], [], null, 'pt-BR'],
    ['Spanish, which has no catalogue', ['Fecha', 'Fuente', 'Usuario'], ['negativo', 'neutro', 'positivo'], null, 'en-GB'],
    ['Dutch', ['Datum', 'Bron', 'Gebruiker'], [], null, 'en-GB'],
    ['what Portuguese and Spanish share', ['canal', 'autor', 'texto'], [], null, 'en-GB'],
    ['English', ['date', 'source', 'author', 'sentiment'], ['negative', 'neutral', 'positive'], '%d/%m/%Y', 'en-GB'],
  ] as const)('%s', (_, columns, labels, format, locale) => {
    expect(proposeLocale(columns, labels, format).locale).toBe(locale)
  })

  test('the reason quotes the file', () => {
    expect(proposeLocale(['Datum', 'Quelle'], ['gut'], '%d.%m.%Y').reason).toContain('Datum, Quelle, gut, dates such as 31.12.')
  })
})
