import type { SurveyReading } from '../../model/inputs/small-inputs.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { byText, foldValue } from '../intake/level-names.ts'
import type { RawSurvey, RawWave } from './raw-inputs.ts'
import type { SurveyRow } from './survey-row.ts'

/** Waves, metrics and segments from rows that are sound each and agree with one another. */
export function surveyOfRows(rows: readonly SurveyRow[], labels: Readonly<Record<string, string>>): Omit<RawSurvey, 'headline'> {
  const metrics = namesOf(rows.map(({ metric }) => metric))
  const segments = namesOf(rows.map(({ segment }) => segment).filter((segment) => segment !== ''))
  const waves = namesOf(rows.map(({ wave }) => wave)).names
  const label = new Map(Object.entries(labels).map(([metric, given]) => [foldValue(metric), given]))
  const reading = (row: SurveyRow): SurveyReading => ({
    metric: metrics.indexOf(row.metric), segment: segments.indexOf(row.segment),
    base: row.base, effectiveBase: row.effectiveBase, value: row.value, sd: row.sd,
  })
  const rowsOfWave = groupedBy(rows, ({ wave }) => wave)
  const rowsOfMetric = groupedBy(rows, ({ metric }) => metric)
  return {
    metrics: metrics.names.map((name) => ({ name, label: label.get(foldValue(name)) ?? plainLabel(name), kind: rowsOfMetric(name)[0]!.kind })),
    segments: segments.names,
    waves: waves.map((name): RawWave => {
      const own = rowsOfWave(name)
      return { name, start: own[0]!.start, end: own[0]!.end, readings: own.map(reading) }
    }).sort((a, b) => byText(a.start, b.start) || byText(a.end, b.end)),
  }
}

/** Rows that do not agree with one before them. */
export function clashesOf(rows: readonly SurveyRow[]): readonly Fault[] {
  const fieldwork = (row: SurveyRow): string => `${row.start} to ${row.end}`
  return [
    ...clashes(rows, (row) => [row.wave, row.metric, row.segment], () => true, (row, first) => faultOf('survey-twice', row.place, {
      what: `wave \`${row.wave}\`, metric \`${row.metric}\`, ${row.segment === '' ? 'everyone' : `segment \`${row.segment}\``}`, first: first.place,
    })),
    ...clashes(rows, (row) => [row.wave], (row, first) => fieldwork(row) !== fieldwork(first), (row, first) => faultOf('survey-fieldwork', row.place, {
      wave: row.wave, dates: fieldwork(row), other: fieldwork(first), first: first.place,
    })),
    ...clashes(rows, (row) => [row.metric], (row, first) => row.kind !== first.kind, (row, first) => faultOf('survey-kind', `${row.place} kind`, {
      metric: row.metric, kind: row.kind, other: first.kind, first: first.place,
    })),
  ]
}

/** Rows that clash with the last one of the same key, so that a run of rows with the same fault is told once. */
function clashes(
  rows: readonly SurveyRow[], keyOf: (row: SurveyRow) => readonly string[], clash: (row: SurveyRow, last: SurveyRow) => boolean, fault: (row: SurveyRow, last: SurveyRow) => Fault,
): readonly Fault[] {
  const lastOf = new Map<string, SurveyRow>()
  return rows.flatMap((row) => {
    const key = JSON.stringify(keyOf(row).map(foldValue))
    const last = lastOf.get(key)
    lastOf.set(key, row)
    return last !== undefined && clash(row, last) ? [fault(row, last)] : []
  })
}

interface Names {
  /** As first written, in the order of their first appearance. */
  readonly names: readonly string[]
  /** -1 for none of them; case and spacing do not tell names apart. */
  readonly indexOf: (name: string) => number
}

function namesOf(values: readonly string[]): Names {
  const first = new Map<string, string>()
  for (const value of values) if (!first.has(foldValue(value))) first.set(foldValue(value), value)
  const index = new Map([...first.keys()].map((key, at) => [key, at]))
  return { names: [...first.values()], indexOf: (name) => index.get(foldValue(name)) ?? -1 }
}

/** Rows by a name that they have in common; case and spacing do not tell names apart. */
function groupedBy(rows: readonly SurveyRow[], nameOf: (row: SurveyRow) => string): (name: string) => readonly SurveyRow[] {
  const groups = new Map<string, SurveyRow[]>()
  for (const row of rows) {
    const key = foldValue(nameOf(row))
    const group = groups.get(key)
    if (group === undefined) groups.set(key, [row])
    else group.push(row)
  }
  return (name) => groups.get(foldValue(name)) ?? []
}

/** @example plainLabel('overall_satisfaction') // => 'Overall satisfaction' */
function plainLabel(name: string): string {
  const spaced = name.replace(/[_-]+/g, ' ').trim()
  return spaced === '' ? name : spaced[0]!.toUpperCase() + spaced.slice(1)
}
