import type { Draws } from './seeded-draws.ts'
import { topics, type Topic } from './story.ts'

/** Of 400 customers: a mark from 1 to 10 for Skerrow Ferries overall, and one for each topic. */
const respondents = 400

interface Driver {
  /** Mean of the marks. */
  readonly mean: number
  /** Added to the overall mark for every mark of the topic. */
  readonly effect: number
}

export const drivers: Record<Topic, Driver> = {
  booking: { mean: 7.1, effect: 0.06 },
  fares: { mean: 5.4, effect: 0.2 },
  onboard: { mean: 6.8, effect: 0.36 },
  punctuality: { mean: 5.9, effect: 0.16 },
  staff: { mean: 7.4, effect: 0.24 },
  weather: { mean: 6.2, effect: 0.08 },
}
const overallMean = 6.6
/** Standard deviations of a topic's marks, and of what the topics do not explain. */
const spread = { topic: 1.9, unexplained: 1.2 }
/** Who likes one thing likes the others: the part of the variance of marks that they have in common. */
const common = 0.3
const unanswered = 0.006

/** The lines of importance/drivers.csv. */
export function driverLines(draws: Draws): readonly string[] {
  return [['overall', ...topics].join(','), ...Array.from({ length: respondents }, () => respondentLine(draws))]
}

function respondentLine(draws: Draws): string {
  const contentment = draws.normal()
  const marks = topics.map((topic) => mark(drivers[topic].mean + spread.topic * (Math.sqrt(common) * contentment + Math.sqrt(1 - common) * draws.normal())))
  const explained = topics.reduce((sum, topic, index) => sum + drivers[topic].effect * (marks[index] - drivers[topic].mean), 0)
  const overall = mark(overallMean + explained + spread.unexplained * draws.normal())
  return [overall, ...marks.map((each) => (draws.chance(unanswered) ? '' : each))].join(',')
}

function mark(value: number): number {
  return Math.min(10, Math.max(1, Math.round(value)))
}
