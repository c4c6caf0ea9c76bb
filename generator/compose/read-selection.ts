import { parseCondition } from './condition.ts'
import type { Condition } from './condition.ts'
import { nearest } from './faults.ts'
import type { Placed, Reporter } from './faults.ts'
import { parsePath } from './path.ts'
import type { Path } from './path.ts'
import { orders } from './selection.ts'
import type { Order, Selection } from './selection.ts'

export const selectionKeys = ['of', 'where', 'by', 'against', 'order', 'most', 'last'] as const

type Given = Readonly<Record<string, string | null | undefined>>

/** Read a path of an attribute; what is no path is reported. */
export function readPath(text: string, at: Placed, reporter: Reporter): Path | undefined {
  const path = parsePath(text)
  if (!path) reporter.report(at, 'path-invalid', `path "${text}"`, 'names with dots between', 'Write it like opinion.change.mean or parts[part=opinion].estimate.')
  return path
}

/** Read a condition of an attribute; what is none is reported. */
export function readCondition(text: string, at: Placed, reporter: Reporter): Condition | undefined {
  const condition = parseCondition(text)
  if (!condition) {
    reporter.report(at, 'condition-invalid', `condition "${text}"`, 'PATH exists, PATH is VALUE, PATH < VALUE, some LIST: ...',
      'Write clauses joined by `and` or by `or`, not by both.')
  }
  return condition
}

/** Read `of`, `where`, `by`, `against`, `order`, `most`, `last`; undefined, and reported, where one of them is wrong. */
export function readSelection(given: Given, at: Placed, reporter: Reporter): Selection | undefined {
  const of = readPath(given['of'] ?? '', at, reporter)
  const by = optional(given['by'], (text) => readPath(text, at, reporter))
  const against = optional(given['against'], (text) => readPath(text, at, reporter))
  const where = optional(given['where'], (text) => readCondition(text, at, reporter))
  const order = optional(given['order'], (text) => readOrder(text, at, reporter))
  const most = optional(given['most'], (text) => readMost('most', text, at, reporter))
  const last = optional(given['last'], (text) => readMost('last', text, at, reporter))
  if (!of || [by, against, where, order, most, last].some((part) => part.wrong)) return undefined
  return {
    of,
    ...(by.value && { by: by.value }), ...(against.value && { against: against.value }),
    ...(where.value && { where: where.value }),
    ...(order.value && { order: order.value }), ...(most.value && { most: most.value }), ...(last.value && { last: last.value }),
  }
}

function optional<T>(text: string | null | undefined, read: (text: string) => T | undefined): { readonly value?: T, readonly wrong: boolean } {
  if (text === null || text === undefined) return { wrong: false }
  const value = read(text)
  return value === undefined ? { wrong: true } : { value, wrong: false }
}

function readOrder(text: string, at: Placed, reporter: Reporter): Order | undefined {
  const order = orders.find((known) => known === text)
  if (!order) reporter.report(at, 'attribute-invalid', `order "${text}"`, orders.join(', '), nearest(text, orders))
  return order
}

function readMost(name: string, text: string, at: Placed, reporter: Reporter): number | undefined {
  if (/^[1-9]\d{0,3}$/.test(text)) return Number(text)
  reporter.report(at, 'attribute-invalid', `${name} "${text}"`, 'a whole number from 1', `Write it like ${name}=3.`)
  return undefined
}
