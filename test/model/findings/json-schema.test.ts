import { readFileSync, writeFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { blankFindings } from '../../../model/findings/blank.ts'
import { findingsJsonSchema } from '../../../model/findings/json-schema.ts'
import { findingsSchema } from '../../../model/findings/schema.ts'

const shipped = new URL('../../../model/findings/findings.schema.json', import.meta.url)

test('the shipped JSON Schema is the one the declaration makes (REWRITE_FIXTURES=yes rewrites it)', () => {
  const made = `${JSON.stringify(findingsJsonSchema(), null, 2)}\n`
  if (process.env.REWRITE_FIXTURES === 'yes') writeFileSync(shipped, made)
  expect(readFileSync(shipped, 'utf8')).toBe(made)
})

test('blank findings have the shape of findings', () => {
  expect(findingsSchema.safeParse(blankFindings).success).toBe(true)
})

test('it can fail: a key too many, an estimate without its interval', () => {
  expect(findingsSchema.safeParse({ ...blankFindings, more: 1 }).success).toBe(false)
  expect(findingsSchema.safeParse({ ...blankFindings, opinion: { ...blankFindings.opinion, period: { mean: 1 } } }).success).toBe(false)
})
