import { day, isoDate } from '../making/calendar.ts'
import type { Draws } from '../making/seeded-draws.ts'
import { opinionOver } from './story.ts'

/** Four quarterly waves of an online survey among cyclists: too few to say whether they follow the posts. */
const fieldwork = [
  { wave: '2025-Q4', start: Date.UTC(2025, 10, 10), base: 262 },
  { wave: '2026-Q1', start: Date.UTC(2026, 1, 9), base: 248 },
  { wave: '2026-Q2', start: Date.UTC(2026, 4, 11), base: 255 },
  { wave: '2026-Q3', start: Date.UTC(2026, 7, 10), base: 241 },
] as const
const daysInField = 12
/** The answers are worth so much of what they would be unweighted. */
const efficiency = 0.85
/** Owners of a Pellwick in each wave: fewer than are shown, but in the last wave, where they are marked. */
const owners = [26, 28, 24, 41] as const

/** Expected share of people: at no opinion at all, added for a point of opinion, added among owners. */
const metrics = {
  sympathy: { at: 0.34, perPoint: 0.011, owners: 0.24 },
  awareness: { at: 0.47, perPoint: 0, owners: 0.5 },
  recommendation: { at: 0.27, perPoint: 0.008, owners: 0.2 },
} as const
const names = Object.keys(metrics) as (keyof typeof metrics)[]

/** The lines of survey/wellen.csv; answers are drawn as a sample's are, on the effective base. */
export function waveLines(draws: Draws): readonly string[] {
  const rows = fieldwork.flatMap(({ wave, start, base }, index) => {
    const end = start + (daysInField - 1) * day
    const opinion = opinionOver(start, end)
    return names.flatMap((metric) => {
      const expected = metrics[metric].at + metrics[metric].perPoint * opinion
      const line = (segment: string, asked: number, share: number): string => {
        const effective = Math.round(asked * efficiency)
        return [wave, isoDate(start), isoDate(end), metric, segment, asked, effective, drawnShare(share, effective, draws).toFixed(3), 'share'].join(',')
      }
      return [line('', base, expected), line('Besitzer', owners[index], Math.min(0.97, expected + metrics[metric].owners))]
    })
  })
  return ['wave,field_start,field_end,metric,segment,base,effective_base,value,kind', ...rows]
}

function drawnShare(probability: number, people: number, draws: Draws): number {
  return Array.from({ length: people }, () => draws.chance(probability)).filter(Boolean).length / people
}
