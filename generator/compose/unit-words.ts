import type { Unit } from '../../model/findings/parts-schema.ts'
import type { Kind } from '../words/forms.ts'

const kinds: Readonly<Record<Exclude<Kind, 'any'> | 'object' | 'boolean', string>> = {
  number: 'a number', string: 'a text', estimate: 'an interval', list: 'a list', level: 'an item with a label', shift: 'a share that moved', span: 'a stretch of days', restatable: 'opinion with the period before',
  fieldwork: 'a wave with its fieldwork', event: 'an event', spans: 'the outcome', object: 'a group of figures', boolean: 'true or false',
}

const units: Readonly<Record<Unit, string>> = {
  points: 'points', percent: 'percent of 100 or percentage points', share: 'shares of 1', probability: 'probabilities', p: 'p-values', count: 'whole things', number: 'plain numbers',
  steps: 'steps of the grid', days: 'days', metric: 'what the metric of the survey is counted in',
}

/** What faults call a kind of value: `an interval`. */
export function kindWords(kind: string): string {
  return isKey(kinds, kind) ? kinds[kind] : 'a value without a form'
}

/** What faults call a unit: `points`. */
export function unitWords(unit: string): string {
  return isKey(units, unit) ? units[unit] : unit
}

function isKey<T extends object>(words: T, key: string): key is keyof T & string {
  return Object.hasOwn(words, key)
}
