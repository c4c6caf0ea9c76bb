import { z } from 'zod'
import { isDate } from '../calendar/days.ts'
import { expectations as expected } from '../faults/catalogue-account.ts'
import { isLongName, mostCharacters } from './long-name.ts'

/** The shape of account.yaml, key by key; what hangs together between keys is in combinations.ts. */

const noNul = (given: string): boolean => !given.includes('\0')
const text = z.string().trim().min(1, expected.text).refine(noNul, expected.text)
const date = z.string().refine(isDate, expected.date)
const dateRange = z.strictObject({ from: date, to: date }).refine(({ from, to }) => from <= to, expected.dateOrder)
const number = z.number()
const oneCharacter = z.string().length(1, expected.delimiter).refine(noNul, expected.delimiter)
/** Data values may look like numbers or truth values in YAML: they are compared as text. */
const value = z.preprocess((given) => (typeof given === 'number' || typeof given === 'boolean' ? String(given) : given), text)

const isTimeZone = (name: string): boolean => {
  try {
    return new Intl.DateTimeFormat('en', { timeZone: name }).resolvedOptions().timeZone !== ''
  } catch {
    return false
  }
}

const isLocale = (name: string): boolean => {
  try {
    return Intl.DateTimeFormat.supportedLocalesOf(name).length === 1
  } catch {
    return false
  }
}

/** What a locale with an underscore means is told: `de_DE` is de-DE. */
function localeExpected(name: string): string {
  const hyphened = name.replaceAll('_', '-')
  return hyphened !== name && isLocale(hyphened) ? `${Intl.getCanonicalLocales(hyphened)[0]!}, with a hyphen` : expected.locale
}

const files = z.strictObject({ files: text })

const score = z.strictObject({
  labels: z.record(z.string(), number.min(-1, expected.labelScore).max(1, expected.labelScore)).optional(),
  range: z.tuple([number, number], expected.range).refine(([low, high]) => low !== high, expected.range).optional(),
})

const source = z.strictObject({
  files: text.optional(),
  cells: text.optional(),
  columns: z.record(z.string(), text).optional(),
  score: score.optional(),
  delimiter: oneCharacter.optional(),
  quote: oneCharacter.optional(),
  time_format: text.refine((form) => form.includes('%'), expected.timeFormat).optional(),
})

const level = z.strictObject({ label: text.optional(), values: z.array(value).optional() })
const venue = level.extend({ cost_per_author: number.gt(0, expected.cost).optional(), drift: z.literal('none').optional() })
const whole = z.number().int(expected.lags)
/** More would be looking until something is found. */
const mostLags = 200
/** Each is fitted as the brand itself is. */
const mostCompetitors = 12

export const accountShape = {
  account: z.string().regex(/^[A-Za-z0-9][A-Za-z0-9-]*$/, expected.accountName),
  brand: text,
  competitors: z.array(text.refine((name) => !isLongName(name), expected.shortText(mostCharacters))).max(mostCompetitors, expected.mostCompetitors(mostCompetitors)).default([]),
  locale: z.string().refine(isLocale, { error: ({ input }) => localeExpected(String(input)) }).default('en-GB'),
  time_zone: z.string().refine(isTimeZone, expected.timeZone).default('UTC'),
  grid: z.enum(['day', 'week', 'month']).default('week'),
  reporting: z.enum(['month', 'quarter', 'week']).default('month'),
  base: dateRange.optional(),
  interval: number.min(0.5, expected.interval).max(0.99, expected.interval).default(0.9),
  mentions: z.array(source).min(1, expected.someMentions),
  factors: z.array(text).default(['venue', 'topic', 'poster']),
  venues: z.record(z.string(), venue.nullable()).default({}),
  topics: z.record(z.string(), level.nullable()).default({}),
  posters: z.strictObject({ occasional: z.number().int(expected.posters).min(1, expected.posters), regular: z.number().int(expected.posters).min(1, expected.posters) })
    .refine(({ occasional, regular }) => occasional < regular, expected.posters).default({ occasional: 1, regular: 5 }),
  target_mix: z.record(z.string(), z.record(z.string(), number.min(0, expected.share).max(1, expected.share))).default({}),
  survey: files.extend({
    headline: text.optional(),
    lags: z.tuple([whole, whole], expected.lags).refine(([low, high]) => low <= high, expected.lags)
      .refine(([low, high]) => high - low < mostLags, expected.mostLags(mostLags)).optional(),
    labels: z.record(z.string(), text.refine((label) => !isLongName(label), expected.shortText(mostCharacters))).default({}),
    next_fieldwork: dateRange.optional(),
  }).optional(),
  benchmark: files.optional(),
  customers: number.int(expected.customers).min(1, expected.customers).optional(),
  coding_audit: files.optional(),
  importance: files.optional(),
  events: files.optional(),
  outcome: files.optional(),
  template: text.optional(),
  theme: text.optional(),
  notes: text.optional(),
  words: text.optional(),
  prepared_by: text.optional(),
  reviewed_by: text.optional(),
  one_person_seals: z.boolean().default(false),
  smallest_group: z.number().int(expected.smallestGroup).min(10, expected.smallestGroup).default(10),
} as const

export type Entries = { readonly [K in keyof typeof accountShape]: z.output<(typeof accountShape)[K]> }
export type SourceEntry = z.output<typeof source>

export type AccountKey = keyof typeof accountShape
