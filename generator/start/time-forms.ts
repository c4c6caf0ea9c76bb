/** How the values of a column read as times: found from the values alone, in the forms that the intake reads. */
export interface TimeReading {
  readonly kind: 'iso' | 'seconds' | 'milliseconds' | 'form'
  /** strptime form to be stated in the account; null for what is read without one. */
  readonly format: string | null
  /** The same form with day and month changed over, where it reads every value too. */
  readonly rival: string | null
  /** Share of the filled values that read so, in [0.8, 1]. */
  readonly share: number
  /** Share of those that say their offset from UTC. */
  readonly withOffset: number
  /** Milliseconds since 1970, of every value; NaN where it does not read. A value without offset is taken as UTC. */
  readonly moments: Float64Array
}

interface Moment {
  readonly at: number
  readonly zoned: boolean
}

type Reader = (value: string) => Moment | null

/** A column in which fewer values read as times is none of times. */
const leastShare = 0.8

/** Whole years in which mentions are looked for: an identifier of ten digits is a time all too easily. */
const [firstYear, lastYear] = [1990, 2100]
const [earliest, latest] = [Date.UTC(firstYear, 0, 1), Date.UTC(lastYear, 0, 1)]

/**
 * The first form under which most of the filled values read as times, or null.
 *
 * @param values - as they stand in the file, in its order; empty where there is none
 */
export function readTimes(values: readonly string[]): TimeReading | null {
  const filled = values.filter((value) => value.trim() !== '')
  // nearly every column fails at its first values: forty forms need not be tried on all of them
  const first = filled.slice(0, 50)
  const enough = (reader: Reader, some: readonly string[]): boolean => some.filter((value) => reader(value.trim()) !== null).length >= leastShare * some.length
  if (filled.length === 0 || !first.some((value) => /\d/.test(value))) return null
  const kinds = ['iso', 'seconds', 'milliseconds'] as const
  const plain = kinds.find((kind) => enough(plainReaders[kind], first) && enough(plainReaders[kind], filled))
  if (plain !== undefined) return readingOf(values, filled.length, plain, null, null)
  const reading = timeForms.filter((form) => enough(formReader(form), first) && enough(formReader(form), filled)).map((format) => readingOf(values, filled.length, 'form', format, null))
  const best = reading.reduce<TimeReading | null>((most, form) => (most === null || form.share > most.share ? form : most), null)
  const twin = best?.format == null ? null : changedOver(best.format)
  return best === null || twin === null || !reading.some((form) => form.format === twin && form.share === best.share) ? best : { ...best, rival: twin }
}

/** The form with day and month changed over; null where it does not write both as figures. @example changedOver('%d/%m/%Y') // => '%m/%d/%Y' */
export function changedOver(format: string): string | null {
  const match = /^%(d|m)(.)%(m|d)(.*)$/.exec(format)
  return match === null ? null : `%${match[3]!}${match[2]!}%${match[1]!}${match[4]!}`
}

function readingOf(values: readonly string[], filled: number, kind: TimeReading['kind'], format: string | null, rival: string | null): TimeReading {
  const reader = kind === 'form' ? formReader(format!) : plainReaders[kind]
  const moments = values.map((value) => reader(value.trim()))
  const read = moments.filter((moment) => moment !== null)
  return {
    kind, format, rival, share: read.length / filled, withOffset: read.filter(({ zoned }) => zoned).length / Math.max(1, read.length),
    moments: Float64Array.from(moments, (moment) => moment?.at ?? Number.NaN),
  }
}

const iso = /^(\d{4})([-/])(\d{1,2})\2(\d{1,2})(?:[T ](\d{2}):(\d{2})(?::(\d{2})(?:\.\d+)?)?)? ?(Z|UTC|[+-]\d\d(?::?\d\d)?)?$/i
const basicIso = /^(\d{4})()(\d\d)(\d\d)(?:T(\d\d)(\d\d)(\d\d))?()$/

const plainReaders: Readonly<Record<'iso' | 'seconds' | 'milliseconds', Reader>> = {
  iso: (value) => {
    const [, year, , month, day, hour, minute, second, offset] = iso.exec(value) ?? basicIso.exec(value) ?? []
    return year === undefined ? null : momentOf({ year, month: Number(month) - 1, day, hour, minute, second, offset })
  },
  seconds: (value) => epoch(value, 1000),
  milliseconds: (value) => epoch(value, 1),
}

function epoch(value: string, milliseconds: number): Moment | null {
  return /^\d{8,13}(\.\d+)?$/.test(value) ? within(Number(value) * milliseconds, true) : null
}

const within = (at: number, zoned: boolean): Moment | null => (at >= earliest && at < latest ? { at, zoned } : null)

interface Parts {
  readonly year: string
  /** From 0. */
  readonly month: number
  readonly day: string | undefined
  readonly hour?: string | undefined
  readonly minute?: string | undefined
  readonly second?: string | undefined
  readonly half?: string | undefined
  readonly offset?: string | undefined
}

/** null for a day or a time of day that there is none of. */
function momentOf({ year, month, day, hour, minute, second, half, offset }: Parts): Moment | null {
  const whole = year.length === 2 ? Number(year) + (Number(year) < 69 ? 2000 : 1900) : Number(year)
  const [hours, minutes, seconds] = [Number(hour ?? 0), Number(minute ?? 0), Number(second ?? 0)]
  const inHalf = half === undefined ? hours : (hours % 12) + (half.toLowerCase() === 'pm' ? 12 : 0)
  if (hours > 23 || minutes > 59 || seconds > 59 || (half !== undefined && (hours < 1 || hours > 12))) return null
  const date = new Date(Date.UTC(whole, month, Number(day)))
  if (date.getUTCMonth() !== month || date.getUTCDate() !== Number(day)) return null
  const zoned = offset !== undefined && offset !== ''
  const [, sign, ahead, rest] = /^([+-])(\d\d):?(\d\d)?$/.exec(offset ?? '') ?? []
  const shift = sign === undefined ? 0 : (sign === '-' ? -1 : 1) * (Number(ahead) * 60 + Number(rest ?? 0))
  return within(date.getTime() + ((inHalf * 60 + minutes - shift) * 60 + seconds) * 1000, zoned)
}

const days = [
  '%d.%m.%Y', '%d/%m/%Y', '%m/%d/%Y', '%d-%m-%Y', '%m-%d-%Y', '%d.%m.%y', '%d/%m/%y', '%m/%d/%y', '%d-%m-%y', '%Y.%m.%d',
  '%d %b %Y', '%d %B %Y', '%d-%b-%Y', '%d-%b-%y', '%b %d, %Y', '%B %d, %Y', '%b %d %Y', '%B %d %Y',
]
const hours = ['', ' %H:%M', ' %H:%M:%S', ' %H:%M:%S %z', ' %I:%M %p', ' %I:%M:%S %p', ', %H:%M', ', %H:%M:%S', ', %I:%M %p', 'T%H:%M', 'T%H:%M:%S']

/** The strptime forms that are looked for, day before month where both would do; the last two are those of mail (RFC 5322) and of C's ctime with an offset. */
export const timeForms: readonly string[] = [...days.flatMap((day) => hours.map((hour) => day + hour)), '%a, %d %b %Y %H:%M:%S %z', '%a %b %d %H:%M:%S %z %Y']

const months = ['january', 'february', 'march', 'april', 'may', 'june', 'july', 'august', 'september', 'october', 'november', 'december']
const patterns: Readonly<Record<string, string>> = {
  d: '(?<day>\\d{1,2})', m: '(?<month>\\d{1,2})', Y: '(?<year>\\d{4})', y: '(?<year>\\d{2})', H: '(?<hour>\\d{1,2})', I: '(?<hour>\\d{1,2})', M: '(?<minute>\\d{2})', S: '(?<second>\\d{2})',
  p: '(?<half>am|pm)', z: '(?<offset>[+-]\\d\\d(?::?\\d\\d)?)', a: '(?:mon|tue|wed|thu|fri|sat|sun)',
  b: `(?<name>${months.map((name) => name.slice(0, 3)).join('|')})`, B: `(?<name>${months.join('|')})`,
}

const readers = new Map(timeForms.map((form) => {
  const pattern = new RegExp(`^${form.replace(/[.]/g, '\\.').replace(/%(\w)/g, (_, part: string) => patterns[part]!)}$`, 'i')
  return [form, (value: string): Moment | null => {
    const groups = pattern.exec(value)?.groups
    if (groups === undefined) return null
    const month = groups.name === undefined ? Number(groups.month) - 1 : months.findIndex((name) => name.startsWith(groups.name!.toLowerCase()))
    return momentOf({ year: groups.year!, month, day: groups.day, hour: groups.hour, minute: groups.minute, second: groups.second, half: groups.half, offset: groups.offset })
  }] as const
}))

function formReader(form: string): Reader {
  return readers.get(form)!
}
