import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { nearest } from '../../compose/faults.ts'
import type { JsonPath, Report } from './check-own-chart.ts'
import { isObject, type Json } from './chart-spec.ts'

/** What is used of the JSON Schema that Vega-Lite ships (draft 7). */
interface Schema {
  readonly $ref?: string
  readonly anyOf?: readonly Schema[]
  readonly type?: string | readonly string[]
  readonly enum?: readonly Json[]
  readonly const?: Json
  readonly properties?: Readonly<Record<string, Schema>>
  readonly additionalProperties?: boolean | Schema
  readonly items?: Schema | readonly Schema[]
}

interface Whole extends Schema { readonly definitions: Readonly<Record<string, Schema>> }

/** What a chart of an account may not use is no help to a misspelt name either. */
export interface Refused {
  readonly keys: ReadonlySet<string>
  readonly values: ReadonlySet<string>
}

let whole: Whole | undefined

/** Read once, where an account has a chart: the file is two megabytes. */
function vegaLite(): Whole {
  whole ??= JSON.parse(readFileSync(fileURLToPath(import.meta.resolve('vega-lite/vega-lite-schema.json')), 'utf8')) as Whole
  return whole
}

/**
 * Names that Vega-Lite knows nothing of: keys and, where only certain words are allowed, values, each told where it stands. A key is known if any of
 * the forms that a part may have knows it: what a form needs, and whether keys go together, is left to Vega-Lite.
 *
 * @param spec - a specification, or what is laid over one (a merge patch, in which null takes away)
 * @param from - its path in the file
 */
export function checkNames(spec: Json, from: JsonPath, refused: Refused, report: Report): void {
  walk(spec, formsOf([vegaLite()]), from)

  function walk(value: Json, forms: readonly Schema[], path: JsonPath): void {
    if (value === null || forms.some(takesAnything)) return
    if (Array.isArray(value)) walkList(value as readonly Json[], forms, path)
    else if (isObject(value)) walkKeys(Object.entries(value), forms, path)
    else checkValue(value as string | number | boolean, forms, path)
  }

  function walkList(values: readonly Json[], forms: readonly Schema[], path: JsonPath): void {
    const items = formsOf(forms.flatMap(({ items: schema }) => schema ?? []))
    if (!forms.some((form) => hasType(form, 'array'))) report(path, 'chart-value', { value: 'a list', expected: said(forms) })
    else if (items.length > 0) values.forEach((value, at) => { walk(value, items, [...path, at]) })
  }

  function walkKeys(entries: readonly (readonly [string, Json])[], forms: readonly Schema[], path: JsonPath): void {
    const objects = forms.filter((form) => hasType(form, 'object'))
    if (objects.length === 0) return report(path, 'chart-value', { value: 'an object', expected: said(forms) })
    const known = [...new Set(objects.flatMap(({ properties = {} }) => Object.keys(properties)))]
    for (const [key, value] of entries) {
      if (refused.keys.has(key) || key === 'data') continue
      const named = objects.flatMap(({ properties = {} }) => (Object.hasOwn(properties, key) ? [properties[key]] : []))
      const rest = objects.flatMap(({ additionalProperties: more = true }) => (more === false ? [] : more === true ? [{}] : [more]))
      if (named.length > 0) walk(value, formsOf(named), [...path, key])
      else if (rest.length > 0) walk(value, formsOf(rest), [...path, key])
      else report([...path, key], 'chart-key-unknown', { key, nearest: nearest(key, known.filter((name) => !refused.keys.has(name))) })
    }
  }

  function checkValue(value: string | number | boolean, forms: readonly Schema[], path: JsonPath): void {
    const words = forms.flatMap(wordsOf)
    if (words.includes(value) || forms.some((form) => wordsOf(form).length === 0 && hasType(form, typeof value))) return
    const allowed = words.filter((word) => typeof word === 'string' && !refused.values.has(word)) as readonly string[]
    const expected = typeof value === 'string' && allowed.length > 0 ? nearest(value, allowed) : said(forms)
    report(path, 'chart-value', { value: JSON.stringify(value), expected })
  }
}

/** The forms that a part may have: references and alternatives resolved. */
function formsOf(schemas: readonly Schema[]): readonly Schema[] {
  const found = new Set<Schema>()
  const resolve = (schema: Schema): void => {
    if (found.has(schema)) return
    found.add(schema)
    if (schema.$ref !== undefined) resolve(vegaLite().definitions[decodeURIComponent(schema.$ref.replace('#/definitions/', ''))])
    schema.anyOf?.forEach(resolve)
  }
  schemas.forEach(resolve)
  return [...found].filter(({ $ref, anyOf }) => $ref === undefined && anyOf === undefined)
}

function wordsOf(form: Schema): readonly Json[] {
  return form.const === undefined ? form.enum ?? [] : [form.const]
}

function takesAnything(form: Schema): boolean {
  return form.type === undefined && form.properties === undefined && wordsOf(form).length === 0
}

function hasType({ type }: Schema, name: string): boolean {
  const types = [type ?? []].flat()
  return types.includes(name) || (name === 'number' && types.includes('integer'))
}

const kinds: Readonly<Record<string, string>> = { array: 'a list', object: 'an object', string: 'a text', number: 'a number', integer: 'a number', boolean: 'true or false', null: 'null' }

/** What kind of value is wanted, in words. */
function said(forms: readonly Schema[]): string {
  const wanted = new Set(forms.flatMap(({ type }) => [type ?? []].flat()).map((name) => kinds[name] ?? name))
  return `Write ${[...wanted].join(' or ')}.`
}
