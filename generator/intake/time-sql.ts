import type { Transition, ZoneClock } from '../calendar/time-zone.ts'
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

/** Columns to be selected in four levels, each from the one before, so that nothing is worked out twice. */
export interface TimeSql {
  readonly draft: string
  /** `zoned`: BOOLEAN. */
  readonly zoned: string
  readonly reading: string
  /** `clock`: BIGINT or NULL. */
  readonly clock: string
}

/**
 * How the `timeText` of a time is read: by the account's form, or as ISO 8601 or an epoch in seconds or milliseconds.
 * DuckDB would also take the words epoch and infinity for times; here they are none.
 */
export function timeSql(text: string, format: string | null): TimeSql {
  const clock = `CASE WHEN reading BETWEEN ${earliest} AND ${latest - 1} THEN reading END AS clock`
  if (format !== null) {
    return {
      draft: `CASE WHEN lower(trim(${text})) NOT IN ('epoch', 'infinity', '-infinity') THEN epoch_us(try_strptime(${text}, ${literal(format)})) END AS wall`,
      zoned: `${format.includes('%z')} AS zoned`, reading: 'wall AS reading', clock,
    }
  }
  // Nearly every time is 19 characters without an offset, or those and a Z: no pattern need be matched for them.
  const plain = `strlen(${text}) = 19 AND (wall % 60000000 <> 0 OR ${text}[17] = ':')`
  const offset = `regexp_matches(${text}, ':\\d\\d(:\\d\\d(\\.\\d+)?)? ?(Z|z|UTC|[+-]\\d\\d(:?\\d\\d)?)\\s*$')`
  return {
    draft: `CASE WHEN ${text} < ':' THEN epoch_us(TRY_CAST(${text} AS TIMESTAMP)) END AS wall`,
    zoned: `CASE WHEN wall IS NULL THEN ${basicIso(text)} IS NULL WHEN ${plain} THEN false ELSE ends_with(${text}, 'Z') OR ${offset} END AS zoned`,
    reading: `CASE WHEN wall IS NULL THEN ${otherForms(text)} WHEN NOT zoned OR ends_with(${text}, 'Z') THEN wall ELSE epoch_us(TRY_CAST(${text} AS TIMESTAMPTZ)) END AS reading`,
    clock,
  }
}

/** The text of a time without spaces around it, so that its first character tells what it can be. */
export function timeText(field: string): string {
  return `CASE WHEN starts_with(${field}, ' ') OR ends_with(${field}, ' ') THEN trim(${field}) ELSE ${field} END`
}

/** ISO 8601's basic form, which DuckDB's cast does not know: 20261031, 20261031T142500. */
function basicIso(text: string): string {
  return `CASE WHEN regexp_full_match(${text}, '\\d{8}(T\\d{6})?\\s*') THEN try_strptime(trim(${text}), ['%Y%m%dT%H%M%S', '%Y%m%d']) END`
}

function otherForms(text: string): string {
  const spread = `regexp_replace(upper(${text}), '^(\\d{4})(\\d\\d)(\\d\\d)T(\\d\\d)(\\d\\d)(\\d\\d)', '\\1-\\2-\\3T\\4:\\5:\\6')`
  const withSeconds = `regexp_replace(${spread}, '^(.{10}[T ]\\d\\d:\\d\\d)( ?[Z+-])', '\\1:00\\2')`
  const zoned = `epoch_us(TRY_CAST(${withSeconds} AS TIMESTAMPTZ))`
  const number = `TRY_CAST(${text} AS DOUBLE)`
  // 1e11 seconds is the year 5138, 1e11 milliseconds is 1973: no mention lies on the wrong side of it. A zero stands for a missing time.
  const epoch = `CASE WHEN ${number} = 0 THEN NULL WHEN abs(${number}) < 1e11 THEN CAST(round(${number} * 1e6) AS BIGINT) WHEN abs(${number}) < 1e14 THEN CAST(round(${number} * 1e3) AS BIGINT) END`
  return `CASE WHEN ${text} < ':' THEN coalesce(epoch_us(${basicIso(text)}), ${epoch}, ${zoned}) END`
}

/** The readings of `clock` and `zoned` in a zone, as SQL over those two columns. */
export interface ZoneSql {
  readonly instant: string
  /** Day number in the zone. */
  readonly day: string
  /** BOOLEAN: posted on that day or before. */
  readonly until: (day: number) => string
  /** BOOLEAN: a wall time that the clocks skipped, and one that they showed twice. */
  readonly nonexistent: string
  readonly doubled: string
}

/**
 * A wall time that does not exist or exists twice is read as the first valid instant: the moment of the change, or the
 * earlier of the two.
 */
export function zoneSql(clock: ZoneClock): ZoneSql {
  const { start, transitions } = clock
  const last = transitions.at(-1)?.after ?? start
  const cases = (branches: readonly string[], otherwise: string): string =>
    (branches.length === 0 ? otherwise : `CASE ${branches.join(' ')} ELSE ${otherwise} END`)
  const offset = cases(transitions.map(({ at, before }) => `WHEN clock < ${at * second} THEN ${before * second}`), String(last * second))
  // After clocks were set forward, a wall time that they skipped comes out before the change, and is moved to it.
  const since = (change: Transition | undefined, offset: number): string =>
    (change === undefined || change.after < change.before ? `clock - ${signed(offset)}` : `greatest(clock - ${signed(offset)}, ${change.at * second})`)
  const fromWall = cases(transitions.map(({ at, before }, index) => `WHEN clock < ${(at + before) * second} THEN ${since(transitions[index - 1], before)}`), since(transitions.at(-1), last))
  const skipped = transitions.filter(({ before, after }) => after > before)
  // A wall time that was skipped has another day only where midnight was.
  const overMidnight = skipped.filter(({ at, before, after }) => Math.floor((at + before) / 86_400) !== Math.floor((at + after) / 86_400))
  const wall = cases(overMidnight.map(({ at, before, after }) =>
    `WHEN clock >= ${(at + before) * second} AND clock < ${(at + after) * second} THEN ${(at + after) * second}`), 'clock')
  const within = (ranges: readonly (readonly [number, number])[]): string =>
    (ranges.length === 0 ? 'false' : `NOT zoned AND (${ranges.map(([low, high]) => `(clock >= ${low * second} AND clock < ${high * second})`).join(' OR ')})`)
  return {
    instant: `CASE WHEN zoned THEN clock ELSE ${fromWall} END`,
    day: `CAST((CASE WHEN zoned THEN clock + ${offset} ELSE ${wall} END + ${shift * dayLength}) // ${dayLength} - ${shift} AS INTEGER)`,
    until: (day) => `clock < CASE WHEN zoned THEN ${lastInstantOf(clock, day + 1) * second} ELSE ${firstWallOf(clock, day + 1) * second} END`,
    nonexistent: within(skipped.map(({ at, before, after }) => [at + before, at + after])),
    doubled: within(transitions.filter(({ before, after }) => after < before).map(({ at, before, after }) => [at + after, at + before])),
  }
}

/** Seconds since 1970 of the last time that a day begins: where clocks are set back over midnight, it begins twice. */
function lastInstantOf({ start, transitions }: ZoneClock, day: number): number {
  const midnight = day * 86_400
  const passed = transitions.filter(({ at, after }) => at + after <= midnight).at(-1)
  const skipping = transitions.find(({ at, before, after }) => at + before <= midnight && midnight < at + after)
  return skipping?.at ?? midnight - (passed?.after ?? start)
}

/** Wall time in seconds from which on unzoned times are read as that day or later: a skipped time counts as the one after the gap. */
function firstWallOf({ transitions }: ZoneClock, day: number): number {
  const midnight = day * 86_400
  const skipping = transitions.find(({ at, before, after }) => at + before < midnight && midnight <= at + after)
  return skipping === undefined ? midnight : skipping.at + skipping.before
}

function signed(offset: number): string {
  return `(${offset * second})`
}
