import { readFileSync } from 'node:fs'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'

const day = 86_400_000
const iso = (time: number) => new Date(time).toISOString().slice(0, 10)

/** A weekly cell table (contract's `cells` columns, venue x topic x poster) as intake tables, without the intake. */
function tablesFromCells(csv: string, base: { readonly from: string; readonly to: string }): IntakeTables {
  const [head, ...lines] = csv.trim().split('\n')
  const names = head.split(',')
  const rows = lines.map((line) => {
    const fields = line.split(',')
    return Object.fromEntries(names.map((name, i) => [name, fields[i]]))
  })
  const times = rows.map((row) => Date.parse(row.step))
  const first = Math.min(...times)
  const count = (Math.max(...times) - first) / (7 * day) + 1
  const steps = Array.from({ length: count }, (_, t) => iso(first + t * 7 * day))
  const middle = steps.map((step) => iso(Date.parse(step) + 3 * day))
  const months = [...new Set(middle.map((date) => date.slice(0, 7)))]
  const periods = months.map((name) => ({ name, start: `${name}-01`, end: iso(Date.UTC(Number(name.slice(0, 4)), Number(name.slice(5)), 0)) }))
  const factors = ['venue', 'topic', 'poster'].map((name) => ({ name, levels: [...new Set(rows.map((row) => row[name]))].sort().map((level) => ({ name: level, label: level })) }))
  const number = (key: string) => Float64Array.from(rows, (row) => Number(row[key]))
  const mentions = number('mentions')
  const freedom = Float64Array.from(rows, (row, c) => (row.variance === '' ? 0 : mentions[c] - 1))
  const step = Int32Array.from(times, (time) => (time - first) / (7 * day))
  const venues = factors[0].levels.length
  const periodOf = Int32Array.from(middle, (date) => months.indexOf(date.slice(0, 7)))
  const authors = number('authors')
  const [byStep, byStepVenue] = [new Float64Array(count), new Float64Array(count * venues)]
  rows.forEach((row, c) => {
    byStep[step[c]] += authors[c]
    byStepVenue[step[c] * venues + factors[0].levels.findIndex(({ name }) => name === row.venue)] += authors[c]
  })
  const total = mentions.reduce((a, b) => a + b, 0)
  return {
    timeline: {
      grid: 'week', stepDays: 7, steps, lastMention: steps[count - 1], quietDays: 6, lastDays: steps.map((step) => iso(Date.parse(step) + 6 * day)), periods, periodOf,
      inBase: Uint8Array.from(middle, (date) => (date >= base.from && date <= base.to ? 1 : 0)),
      base, current: periods.length - 1, review: periods[periods.length - 1],
    },
    factors,
    cells: {
      count: rows.length, step,
      levels: factors.map(({ name, levels }) => Int32Array.from(rows, (row) => levels.findIndex((level) => level.name === row[name]))),
      mentions, authors, mean: number('mean'),
      squares: Float64Array.from(rows, (row, c) => freedom[c] * Number(row.variance)), freedom,
      clustering: new Float64Array(rows.length).fill(1), deff: number('deff'),
    },
    variation: Array.from({ length: venues }, () => null),
    hindsight: null, labels: null, noLabels: null, staying: [], extremes: [], pull: [], segments: null,
    concentration: [],
    authors: {
      exact: false, byStep, byStepVenue, byPeriod: new Float64Array(periods.length),
      byPeriodLevel: factors.map(({ levels }) => new Float64Array(periods.length * levels.length)),
    },
    accounting: {
      received: rows.length, rejected: 0, duplicates: 0, outOfScope: 0, modelled: rows.length, reasons: {}, unread: [], unmapped: [],
      inputs: [], withAuthor: new Float64Array(venues).fill(total), readyMade: true,
    },
  }
}

/** The reference account of 26 weeks, whose exact and sampled posteriors were made by independent programs. */
export function referenceTables(): IntakeTables {
  return tablesFromCells(readFileSync(new URL('../reference/mix-model-cells.csv', import.meta.url), 'utf8'), { from: '2025-03-03', to: '2025-05-25' })
}
