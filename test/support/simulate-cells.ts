import { dayNumber, isoDate } from '../../generator/calendar/days.ts'
import { periodHolding } from '../../generator/calendar/periods.ts'
import { timeline as timelineOf } from '../../generator/calendar/timeline.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import { drawCells } from './simulated-cells.ts'
import type { MixOverTime, Truth } from './simulated-cells.ts'
import { drawSigmas, drawStates } from './simulated-states.ts'
import type { Paths, Randomness, Sigmas } from './simulated-states.ts'
import { tablesOfCells } from './simulated-tables.ts'

export interface SimulationOptions {
  /** Weekly steps from Monday 1 January 2024; reviews are monthly, the last step lies in the period under review. */
  readonly steps: number
  readonly venues: number
  readonly topics: number
  readonly posters: number
  /** Expected mentions of a step, over all its cells. */
  readonly mentionsPerStep: number
  /** The standard deviations, or `prior`: drawn from the model's own, as simulation-based calibration needs. */
  readonly sigmas: Sigmas | 'prior'
  /** Paths given instead of drawn: opinion, or venues' drifts. */
  readonly paths?: Paths
  /** Relative shares of the levels, at the first and at the last step; straight lines between. Even and still if absent. */
  readonly mix?: Partial<MixOverTime>
  /** Variance of one mention inside its cell; 0.3 if absent. */
  readonly mentionVariance?: number
  /** Base in steps from the first; a third of them if absent. */
  readonly baseSteps?: number
}

export interface Simulation {
  readonly tables: IntakeTables
  readonly truth: Truth
}

/**
 * Draw a table of cells from the model itself (model.md, section 2), with everything that went into it. Levels are named
 * `venue-1`, `topic-1`, `poster-1` and so on, with leading zeros from ten up. Each mention is one author's only one. Cell means are left as drawn, also
 * outside [-1, 1]: a truncated draw would not be the model's.
 *
 * @param random - moved on; the same state gives the same simulation
 */
export function simulateCells(options: SimulationOptions, random: Randomness): Simulation {
  const first = dayNumber('2024-01-01')
  const lastDay = first + 7 * options.steps - 1
  const baseSteps = options.baseSteps ?? Math.max(1, Math.floor(options.steps / 3))
  const timeline = timelineOf({
    grid: 'week', reporting: 'month', base: { from: '2024-01-01', to: isoDate(first + 7 * baseSteps - 1) },
    firstDay: first, lastDay, review: periodHolding('month', lastDay - 3),
  })
  const sigmas = options.sigmas === 'prior' ? drawSigmas(options, random) : options.sigmas
  const states = drawStates(options, sigmas, random)
  const { cells, adjusted } = drawCells({ ...options, sigmas, states, inBase: timeline.inBase }, random)
  return { tables: tablesOfCells(options, timeline, cells), truth: { ...states, adjusted, sigmas } }
}
