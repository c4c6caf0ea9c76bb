import { readdirSync, readFileSync } from 'node:fs'
import { expect, test } from 'vitest'

/** Every `@example EXPRESSION // => VALUE` of these folders is run with all that the folders export in scope. */
const folders = ['random', 'statistics', 'diagnostics']
const root = new URL('../../model/', import.meta.url)

const files = folders.flatMap((folder) => readdirSync(new URL(folder, root)).map((name) => new URL(`${folder}/${name}`, root)))
const modules = await Promise.all(files.map((file) => import(file.href) as Promise<Record<string, unknown>>))
const scope = Object.assign({}, ...modules) as Record<string, unknown>
const run = (expression: string): unknown => new Function(...Object.keys(scope), `return (${expression})`)(...Object.values(scope))

const examples = files.flatMap((file) => {
  const text = readFileSync(file, 'utf8').replace(/\n \*\s+\/\/ =>/g, ' // =>')
  return [...text.matchAll(/@example (.+?) \/\/ => (.+)/g)].map(([, expression, value]) => ({ expression, value }))
})

test.each(examples.filter(({ value }) => !/^[a-z]+ [a-z]/.test(value)))('$expression', ({ expression, value }) => {
  expect(run(expression)).toEqual(run(value))
})

test('there are examples, and one that is wrong would fail', () => {
  expect(examples.length).toBeGreaterThan(15)
  expect(run('mean([1, 2, 6])')).not.toEqual(run('4'))
})
