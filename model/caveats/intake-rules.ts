import { caveat, type CaveatRule } from './rule.ts'

/** Share of mentions without an author above which it is told. */
const manyUnknown = 0.2
/** Distinct authors in the period under which a venue's own figures rest on too few. */
const fewAuthors = 30
/** Mentions in the period under which the whole review rests on little. */
const fewMentions = 300
/** A venue that starts or ends this many days inside the history has an uneven one. */
const unevenDays = 28
/** The busiest period holds so many times the quietest one's mentions a step, or more: volumes are uneven. */
const unevenVolume = 3
/** A venue not seen in this last stretch has vanished; first seen in it, appeared. In days. */
const recentDays = 91

/** A period whose last days, so many and a step's length more, hold no mention is probably not over. */
const unfinishedDays = 7
/** Share of rows that could not be read above which what is left may not stand for the rest. */
const manyRejected = 0.05
/** Values named one by one where the account does not map them. */
const namedValues = 5

/** Caveats that rest on what came in: authors, venues' histories, values and times. */
export const intakeRules: readonly CaveatRule[] = [
  ({ findings, reading }) => {
    const known = reading.tables.accounting.withAuthor.reduce((a, b) => a + b, 0)
    const all = reading.tables.cells.mentions.reduce((a, b) => a + b, 0)
    if (known === 0) return [caveat('caution', 'authors-unknown', { share: 1 })]
    if (known < all * (1 - manyUnknown)) {
      return findings.venues.filter((venue) => venue.authors_known < 1 - manyUnknown)
        .map((venue) => caveat('note', 'authors-partly-unknown', { venue: venue.label, share: 1 - venue.authors_known }))
    }
    return []
  },
  ({ reading }) => (reading.tables.accounting.readyMade ? [caveat('note', 'ready-made-authors')] : []),
  ({ findings }) => (findings.venues.length === 1 ? [caveat('serious', 'one-venue')] : []),
  ({ findings, reading }) => {
    const { steps, stepDays } = reading.tables.timeline
    const at = (step: string) => steps.indexOf(step)
    const days = (from: number, to: number) => (to - from) * stepDays
    return findings.venues.flatMap((venue) => {
      const late = days(0, at(venue.first_step))
      const early = days(at(venue.last_step), steps.length - 1)
      if (early > recentDays) return [caveat('caution', 'venue-vanished', { venue: venue.label, last: venue.last_step })]
      if (days(at(venue.first_step), steps.length - 1) < recentDays && late > unevenDays) return [caveat('caution', 'venue-appeared', { venue: venue.label, first: venue.first_step })]
      return late > unevenDays || early > unevenDays ? [caveat('note', 'uneven-history', { venue: venue.label, first: venue.first_step, last: venue.last_step })] : []
    })
  },
  ({ findings, reading }) => {
    // per step: the first and the last period may not be whole
    const { periodOf } = reading.tables.timeline
    const volumes = findings.opinion.periods.map(({ mentions }, p) => mentions / periodOf.filter((period) => period === p).length)
    const [least, most] = [Math.min(...volumes), Math.max(...volumes)]
    return most >= unevenVolume * least ? [caveat('note', 'uneven-volume', { least: Math.round(least), most: Math.round(most) })] : []
  },
  ({ findings }) => findings.venues.filter((venue) => venue.authors < fewAuthors).map((venue) => caveat('note', 'venue-thin', { venue: venue.label, authors: venue.authors })),
  ({ findings }) => (findings.opinion.mentions < fewMentions ? [caveat('caution', 'thin-data', { mentions: findings.opinion.mentions })] : []),
  ({ reading }) => {
    const { lastMention, quietDays, stepDays } = reading.tables.timeline
    return quietDays > unfinishedDays + stepDays ? [caveat('serious', 'period-unfinished', { last: lastMention })] : []
  },
  ({ findings }) => {
    const { received, rejected } = findings.accounting
    return rejected > received * manyRejected ? [caveat('serious', 'many-rejected', { count: rejected, share: rejected / received })] : []
  },
  ({ findings }) => {
    const empty = findings.opinion.series.filter((step) => step.mentions === 0).length
    return empty === 0 ? [] : [caveat('note', 'empty-steps', { steps: empty })]
  },
  ({ reading }) => reading.tables.factors.flatMap(({ name, levels }, f) =>
    levels.flatMap((level, l) => (reading.mix.source[f] === 'base' && levels.length > 1 && reading.mix.shares[f][l] === 0
      ? [caveat('note', 'level-unseen-in-base', { factor: name, level: level.label })] : []))),
  ({ reading }) => {
    const { unmapped } = reading.tables.accounting
    const factors = [...new Set(unmapped.map((row) => row.factor))]
    return factors.map((factor) => {
      const rows = unmapped.filter((row) => row.factor === factor)
      const most = rows.slice(0, namedValues).map((row) => row.value)
      const values = rows.length > namedValues ? [...most, '…'] : most
      return caveat('note', 'values-unmapped', { factor, values: values.join(', '), mentions: rows.reduce((total, row) => total + row.mentions, 0) })
    })
  },
  ({ reading }) => {
    const { reasons } = reading.tables.accounting
    const count = (reasons['time-nonexistent'] ?? 0) + (reasons['time-doubled'] ?? 0)
    return count === 0 ? [] : [caveat('note', 'clock-times', { count })]
  },
]
