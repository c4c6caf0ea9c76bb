/** A change of a zone's clocks; offsets are seconds east of Greenwich. */
export interface Transition {
  /** Seconds since 1970 in UTC: the first with the new offset. */
  readonly at: number
  readonly before: number
  readonly after: number
}

/** A zone's clocks over a stretch of time. */
export interface ZoneClock {
  /** Offset before the first transition. */
  readonly start: number
  readonly transitions: readonly Transition[]
}

const day = 86_400

/**
 * How a zone's clocks run between two instants, both in seconds since 1970, by the time zone tables of Intl.
 * Looked at once a day: two changes within one day that cancel out would be missed, of which none is known.
 */
export function zoneClock(timeZone: string, from: number, to: number): ZoneClock {
  const offsetAt = offsetReader(timeZone)
  const transitions: Transition[] = []
  const first = Math.floor(from / day) * day
  const start = offsetAt(first)
  let before = start
  for (let time = first; time < to; time += day) {
    const after = offsetAt(time + day)
    if (after === before) continue
    let [low, high] = [time, time + day]
    while (high - low > 1) {
      const middle = Math.floor((low + high) / 2)
      if (offsetAt(middle) === before) low = middle
      else high = middle
    }
    transitions.push({ at: high, before, after })
    before = after
  }
  return { start, transitions }
}

function offsetReader(timeZone: string): (seconds: number) => number {
  const format = new Intl.DateTimeFormat('en-US', {
    timeZone, hourCycle: 'h23', era: 'short', year: 'numeric', month: 'numeric', day: 'numeric', hour: 'numeric', minute: 'numeric', second: 'numeric',
  })
  return (seconds) => {
    const part: Partial<Record<Intl.DateTimeFormatPartTypes, string>> = {}
    for (const { type, value } of format.formatToParts(seconds * 1000)) part[type] = value
    const wall = Date.UTC(Number(part.year), Number(part.month) - 1, Number(part.day), Number(part.hour), Number(part.minute), Number(part.second))
    return wall / 1000 - seconds
  }
}
