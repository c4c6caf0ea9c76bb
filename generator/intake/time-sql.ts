import type { ZoneClock } from '../calendar/time-zone.ts'
import { literal } from './database.ts'

/**
 * Times in SQL are whole microseconds since 1970. A `clock` is what the data says: an instant where it came with an
 * offset (`zoned`), the reading of a wall clock in the account's zone where it did not.
 */
const second = 1_000_000
const dayLength = 86_400 * second
/** Keeps integer division on positive numbers, where it rounds down. */
const shift = 200_000

/** Times outside these years are slips of typing, not mentions. */
const earliest = Date.UTC(1900, 0, 1) * 1000
const latest = Date.UTC(2200, 0, 1) * 1000

export interface TimeSql {
  /** BIGINT or NULL. */
  readonly clock: string
  /** BOOLEAN. */
  readonly zoned: string
}

/** How the text of a time is read: by the account's form, or as ISO 8601 or an epoch in seconds or milliseconds. */
export function timeSql(text: string, format: string | null): TimeSql {
  const held = (clock: string): string => `CASE WHEN ${clock} BETWEEN ${earliest} AND ${latest - 1} THEN ${clock} END`
  if (format !== null) return { clock: held(`epoch_us(try_strptime(${text}, ${literal(format)}))`), zoned: format.includes('%z') ? 'true' : 'false' }
  const wall = `TRY_CAST(${text} AS TIMESTAMP)`
  // Nearly every time is 19 characters without an offset, or those and a Z: no pattern need be matched for them.
  const plain = `(strlen(${text}) = 19 AND ${text}[17] = ':')`
  const offset = `regexp_matches(${text}, ':\\d\\d(:\\d\\d(\\.\\d+)?)? ?(Z|z|UTC|[+-]\\d\\d(:?\\d\\d)?)$')`
  const isWall = `(${wall} IS NOT NULL AND ${text}[1] BETWEEN '0' AND '9')`
  return {
    clock: `CASE WHEN ${isWall} THEN ${held(`CASE WHEN ${plain} OR ${text}[-1] = 'Z' OR NOT ${offset} THEN epoch_us(${wall}) ELSE epoch_us(TRY_CAST(${text} AS TIMESTAMPTZ)) END`)} `
      + `ELSE ${held(otherForms(text))} END`,
    zoned: `CASE WHEN ${isWall} THEN NOT ${plain} AND ${offset} ELSE ${basicIso(text)} IS NULL END`,
  }
}

/** ISO 8601's basic form, which DuckDB's cast does not know: 20261031, 20261031T142500. */
function basicIso(text: string): string {
  return `try_strptime(${text}, ['%Y%m%dT%H%M%S', '%Y%m%d'])`
}

function otherForms(text: string): string {
  const basic = `CASE WHEN strlen(${text}) IN (8, 15) THEN epoch_us(${basicIso(text)}) END`
  const zoned = `epoch_us(TRY_CAST(regexp_replace(${text}, '^(\\d{4})(\\d\\d)(\\d\\d)T(\\d\\d)(\\d\\d)(\\d\\d)', '\\1-\\2-\\3T\\4:\\5:\\6') AS TIMESTAMPTZ))`
  const number = `TRY_CAST(${text} AS DOUBLE)`
  // 1e11 seconds is the year 5138, 1e11 milliseconds is 1973: no mention lies on the wrong side of it.
  const epoch = `CASE WHEN abs(${number}) < 1e11 THEN CAST(round(${number} * 1e6) AS BIGINT) WHEN abs(${number}) < 1e14 THEN CAST(round(${number} * 1e3) AS BIGINT) END`
  return `coalesce(${basic}, ${epoch}, ${zoned})`
}

/** The readings of `clock` and `zoned` in a zone, as SQL over those two columns. */
export interface ZoneSql {
  readonly instant: string
  /** Day number in the zone. */
  readonly day: string
  /** BOOLEAN: a wall time that the clocks skipped, and one that they showed twice. */
  readonly nonexistent: string
  readonly doubled: string
}

/**
 * A wall time that does not exist or exists twice is read as the first valid instant: the moment of the change, or the
 * earlier of the two.
 */
export function zoneSql({ start, transitions }: ZoneClock): ZoneSql {
  const last = transitions.at(-1)?.after ?? start
  const cases = (branches: readonly string[], otherwise: string): string =>
    (branches.length === 0 ? otherwise : `CASE ${branches.join(' ')} ELSE ${otherwise} END`)
  const offset = cases(transitions.map(({ at, before }) => `WHEN clock < ${at * second} THEN ${before * second}`), String(last * second))
  const fromWall = cases(transitions.flatMap(({ at, before, after }) => [
    `WHEN clock < ${(at + before) * second} THEN clock - ${signed(before)}`,
    ...(after > before ? [`WHEN clock < ${(at + after) * second} THEN ${at * second}`] : []),
  ]), `clock - ${signed(last)}`)
  const skipped = transitions.filter(({ before, after }) => after > before)
  const wall = cases(skipped.map(({ at, before, after }) =>
    `WHEN clock >= ${(at + before) * second} AND clock < ${(at + after) * second} THEN ${(at + after) * second}`), 'clock')
  const within = (ranges: readonly (readonly [number, number])[]): string =>
    (ranges.length === 0 ? 'false' : `NOT zoned AND (${ranges.map(([low, high]) => `(clock >= ${low * second} AND clock < ${high * second})`).join(' OR ')})`)
  return {
    instant: `CASE WHEN zoned THEN clock ELSE ${fromWall} END`,
    day: `CAST((CASE WHEN zoned THEN clock + ${offset} ELSE ${wall} END + ${shift * dayLength}) // ${dayLength} - ${shift} AS INTEGER)`,
    nonexistent: within(skipped.map(({ at, before, after }) => [at + before, at + after])),
    doubled: within(transitions.filter(({ before, after }) => after < before).map(({ at, before, after }) => [at + after, at + before])),
  }
}

function signed(offset: number): string {
  return `(${offset * second})`
}
