import type { Estimate } from '../findings/schema.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import type { RuledAdvice } from '../advice/ruled-advice.ts'
import type { Definition } from './definition.ts'

/** What an account has sealed before the review that is being made: earlier periods, and earlier reviews of the same one. */
export interface Past {
  /** What figures mean in the review that is being made; its base is that of the tables. */
  readonly definition: Omit<Definition, 'base'>
  /** What the review is made with. */
  readonly program: MadeBy
  /** In the order of sealing, at least one. */
  readonly reviews: readonly SealedReview[]
}

export interface MadeBy {
  readonly version: string
  /** SHA-256 of the model's code. */
  readonly model: string
}

/** A sealed review, as far as a later one looks back at it. */
export interface SealedReview {
  /** Of the seal: `2026-10`, or `2026-10.r2`. */
  readonly name: string
  readonly period: string
  /** 1 when the period was first sealed. */
  readonly revision: number
  /** Why it was revised; null for the first. */
  readonly reason: string | null
  /** ISO date. */
  readonly sealedOn: string
  readonly madeBy: MadeBy
  /** Hash of its manifest: stands for everything that was sealed. */
  readonly manifest: string
  readonly told: SealedFigures
  /** null where the account file of then can't be read any more. */
  readonly definition: Definition | null
  readonly tables: IntakeTables
}

/** Figures of a sealed review that later ones speak of. */
export interface SealedFigures {
  /** Mix-adjusted opinion of its period, and its change. */
  readonly level: Estimate
  readonly change: Estimate | null
  readonly interval: number
  /** What the coding audit said, as text: `auditOf`. */
  readonly audit: string
  readonly advice: readonly SealedAdvice[]
}

/** A coding audit as one text: two reviews with the same one undo the coder's errors alike. */
export function auditOf({ status, venues }: AuditSeen): string {
  return JSON.stringify([status === 'applied', venues.map(({ venue, codings, agreement }) => [venue, codings, agreement])])
}

interface AuditSeen {
  readonly status: string
  readonly venues: readonly { readonly venue: string; readonly codings: number; readonly agreement: number }[]
}

/** Advice as it was given, with the words of then. */
export interface SealedAdvice extends Pick<RuledAdvice, 'code' | 'where' | 'where_kind' | 'how_many' | 'helps' | 'figures'> {
  readonly action: string
  readonly success: string
}
