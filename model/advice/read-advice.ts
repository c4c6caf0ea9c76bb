import type { Findings } from '../findings/schema.ts'
import type { BenchmarkMargin } from '../inputs/small-inputs.ts'
import type { Reading } from '../reading/context.ts'
import { helpsBy, type RuledAdvice } from './ruled-advice.ts'
import { adviseCoder, adviseEveryone, adviseSurvey } from './standing-advice.ts'
import { gainOf, ofLevelAt, ofNextChange, type Gain, type Outlook } from './hearing.ts'
import { adviseSegments } from './segments.ts'
import { usualCost } from './usual-cost.ts'

/** The findings that advice rests on. */
export type Grounds = Pick<Findings, 'speaking' | 'benchmark' | 'importance' | 'survey' | 'coder' | 'interval'>

/** Topics talked of so much less than they matter are worth asking about; as a share. */
const littleTalked = 0.02

/**
 * What to do to hear more kinds of people: the fall of a posterior standard deviation per unit of cost ranks what can be computed; what can't
 * stands behind it in the order of the program, and last what is computed but hardly helps.
 */
export function readAdvice(outlook: Outlook, grounds: Grounds, margins: readonly BenchmarkMargin[] | null, smallestGroup: number): RuledAdvice[] {
  const computed = [...adviseVenues(outlook), ...adviseTopics(outlook, grounds), ...adviseSegments(outlook.reading, margins, grounds, smallestGroup)]
    .sort((a, b) => (b.gain_per_cost ?? 0) - (a.gain_per_cost ?? 0))
  return [
    ...computed.filter(({ helps }) => helps === 'clearly'),
    ...adviseSurvey(grounds), ...adviseCoder(grounds), ...adviseEveryone(outlook.reading, grounds, computed.length > 0),
    ...computed.filter(({ helps }) => helps === 'hardly'),
  ]
}

function adviseVenues(outlook: Outlook): RuledAdvice[] {
  const { reading } = outlook
  return reading.tables.factors[0].levels.flatMap(({ label, costPerAuthor }, v) => {
    const heard = heardNow(reading, 0, v)
    const gain = gainOf(outlook, ofNextChange, 0, v, heard)
    const cost = { each: costPerAuthor ?? 1, given: costPerAuthor !== undefined }
    return gain === null ? [] : [hear('hear-venue', 'venue', label, gain, 'next-change', cost, { venue: label, heard })]
  })
}

function adviseTopics(outlook: Outlook, { importance }: Grounds): RuledAdvice[] {
  const { reading } = outlook
  const f = reading.tables.factors.findIndex(({ name }) => name === 'topic')
  if (importance === null || f < 0) return []
  const { levels } = reading.tables.factors[f]
  const shares = Float64Array.from(levels, ({ name }) => importance.topics.find(({ topic }) => topic === name)?.importance ?? 0)
  return importance.topics.flatMap(({ topic, label, importance: matters, talk }) => {
    const level = levels.findIndex(({ name }) => name === topic)
    if (level < 0 || matters - (talk ?? 0) < littleTalked) return []
    const gain = gainOf(outlook, ofLevelAt(reading, shares), f, level, heardNow(reading, f, level))
    return gain === null ? [] : [hear('hear-topic', 'topic', label, gain, 'importance-level', usualCost(reading), { topic: label, talk: talk ?? 0, importance: matters })]
  })
}

function hear(
  code: string, kind: RuledAdvice['where_kind'], where: string, { authors, fall, widthBefore, widthAfter }: Gain, of: RuledAdvice['gain_of'],
  cost: { readonly each: number; readonly given: boolean }, figures: RuledAdvice['figures'],
): RuledAdvice {
  const total = authors * cost.each
  const gainShare = (widthBefore - widthAfter) / widthBefore
  return {
    code, where, where_kind: kind, how_many: authors, helps: helpsBy(gainShare), gain_share: gainShare, gain: fall, gain_of: of, cost: total, cost_given: cost.given, gain_per_cost: fall.mean / total,
    figures: { ...figures, authors, width_before: widthBefore, width_after: widthAfter, cost: total },
  }
}

function heardNow({ tables: { authors, factors, timeline } }: Reading, factor: number, level: number): number {
  return authors.byPeriodLevel[factor][timeline.current * factors[factor].levels.length + level]
}
