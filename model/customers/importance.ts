import type { Findings } from '../findings/schema.ts'
import type { ImportanceInput } from '../inputs/small-inputs.ts'
import { average, combine, difference, sum } from '../reading/draw-columns.ts'
import type { Reading } from '../reading/context.ts'
import { correlation } from '../statistics/correlation.ts'
import { dissimilarityIndex } from '../statistics/dissimilarity.ts'
import { relativeWeights } from '../statistics/relative-weights.ts'

type Importance = NonNullable<Findings['importance']>
const percent = 100

/** Weights of the topics, summing to 1. */
interface Weighed {
  readonly topics: readonly string[]
  readonly weights: readonly number[]
  readonly respondents: number | null
  readonly explained: number | null
}

/**
 * What is talked of beside what matters: the share of the period's mentions of each topic and its importance, stated or by relative weights
 * (Johnson 2000), and mix-adjusted opinion with topics at their importance.
 *
 * @returns null where topics are no factor, none of them has an importance and mentions, or the answers can't be told apart
 */
export function readImportance(reading: Reading, input: ImportanceInput, smallestGroup: number): Importance | null {
  const { tables: { factors, authors, timeline }, columns, centre, adjusted, summary, periodSteps, previousSteps } = reading
  const f = factors.findIndex(({ name }) => name === 'topic')
  const weighed = input.kind === 'stated' ? stated(input) : byRespondents(input)
  if (f < 0 || weighed === null) return null
  const { levels } = factors[f]
  const at = weighed.topics.map((topic) => levels.findIndex(({ name }) => name === topic))
  const mentions = at.map((level) => (level < 0 ? 0 : mentionsOf(reading, f, level)))
  const all = mentions.reduce((total, count) => total + count, 0)
  const seen = weighed.weights.reduce((total, weight, i) => total + (at[i] < 0 ? 0 : weight), 0)
  if (all === 0 || seen === 0) return null
  const talk = mentions.map((count) => count / all)
  const shares = Float64Array.from(levels, (_, l) => weighed.weights.reduce((total, weight, i) => total + (at[i] === l ? weight : 0), 0) / seen)
  // A with the topics' centre at the target mix replaced by the one at their importance
  const moved = difference(combine(columns.offset[f], shares, columns.count), centre[f])
  const level = sum(average(periodSteps.map((t) => adjusted[t])), moved)
  const before = previousSteps === null ? null : sum(average(previousSteps.map((t) => adjusted[t])), moved)
  return {
    source: input.kind === 'stated' ? 'stated' : 'relative-weights', respondents: weighed.respondents, explained: weighed.explained,
    topics: weighed.topics.map((topic, i) => {
      const heard = at[i] < 0 ? 0 : authors.byPeriodLevel[f][timeline.current * levels.length + at[i]]
      const shown = heard === 0 || heard >= smallestGroup
      return {
        topic, label: levels[at[i]]?.label ?? topic, importance: weighed.weights[i], talk: shown ? talk[i] : null, authors: shown ? heard : null,
        gap: shown ? percent * (talk[i] - weighed.weights[i]) : null,
      }
    }),
    dissimilarity: dissimilarityIndex(talk, weighed.weights),
    level: summary.estimate(level), change: before === null ? null : summary.estimate(difference(level, before)),
  }
}

function mentionsOf({ tables: { cells, timeline } }: Reading, factor: number, level: number): number {
  let mentions = 0
  for (let c = 0; c < cells.count; c++) if (timeline.periodOf[cells.step[c]] === timeline.current && cells.levels[factor][c] === level) mentions += cells.mentions[c]
  return mentions
}

function stated({ topics }: Extract<ImportanceInput, { kind: 'stated' }>): Weighed {
  return { topics: topics.map(({ topic }) => topic), weights: topics.map(({ weight }) => weight), respondents: null, explained: null }
}

/** null where an answer does not vary, or topics are answered alike. */
function byRespondents({ topics, overall, ratings }: Extract<ImportanceInput, { kind: 'respondents' }>): Weighed | null {
  const between = ratings.flatMap((one) => ratings.map((other) => correlation(one, other)))
  const response = ratings.map((rating) => correlation(rating, overall))
  if (between.includes(null) || response.includes(null)) return null
  const found = relativeWeights(between.map((r) => r ?? 0), response.map((r) => r ?? 0))
  if (found.weights === null || !(found.explained > 0)) return null
  return { topics, weights: [...found.weights].map((weight) => weight / found.explained), respondents: overall.length, explained: found.explained }
}
