import { day, isoDate } from './calendar.ts'
import type { Draws } from './seeded-draws.ts'
import type { Week } from './story.ts'
import { opinionOver } from './survey.ts'

/** Passengers of Skerrow Ferries beside all ferry passengers of the region, by the month. */
const months = 30
const start = { passengers: 182_000, market: 655_000 }
/** Growth of passengers that goes with growth of the market by 1, and with a rise of opinion by a point in the month before. */
const effects = { market: 0.9, opinion: 0.006 }
/** Standard deviations of monthly growth. */
const unexplained = { passengers: 0.024, market: 0.018 }
/** Of the market over the year: its height in July over the mean, as a logarithm. */
const season = 0.28
const yearlyGrowth = 0.02

/** The lines of outcome/passengers.csv. */
export function outcomeLines(story: readonly Week[], draws: Draws): readonly string[] {
  const firstDay = (month: number): number => Date.UTC(2024, 4 + month, 1)
  const opinion = Array.from({ length: months }, (_, month) => opinionOver(story, firstDay(month), firstDay(month + 1) - day))
  const lines = ['date,value,market']
  let { passengers, market } = start
  for (let month = 0; month < months; month++) {
    if (month > 0) {
      const marketGrowth = seasonal(month) - seasonal(month - 1) + yearlyGrowth / 12 + unexplained.market * draws.normal()
      const moved = month > 1 ? opinion[month - 1] - opinion[month - 2] : 0
      market *= Math.exp(marketGrowth)
      passengers *= Math.exp(effects.market * marketGrowth + effects.opinion * moved + unexplained.passengers * draws.normal())
    }
    lines.push([isoDate(firstDay(month)), Math.round(passengers), Math.round(market)].join(','))
  }
  return lines
}

/** Months count from May: July is the third. */
function seasonal(month: number): number {
  return season * Math.cos((2 * Math.PI * (month - 2)) / 12)
}
