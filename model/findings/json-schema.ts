import { z } from 'zod'
import { findingsSchema } from './schema.ts'

/** The JSON Schema (draft 2020-12) of findings.json, made from the type's own declaration. */
export function findingsJsonSchema(): object {
  return { ...z.toJSONSchema(findingsSchema), title: 'tareline-findings/1' }
}
