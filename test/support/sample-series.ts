import type { Estimate } from '../../model/findings/schema.ts'

/** The invented course of opinion behind `sampleFindings`: smooth functions of the step, so that a figure can be told in advance. */
const stepCount = 130

/** ISO date of a step: weeks from Monday 6 May 2024 to Monday 26 October 2026. */
export function stepDate(step: number): string {
  return new Date(Date.UTC(2024, 4, 6 + 7 * step)).toISOString().slice(0, 10)
}

/** Name of the month that holds the step's midpoint. */
export function periodOf(step: number): string {
  return new Date(Date.UTC(2024, 4, 6 + 7 * step, 84)).toISOString().slice(0, 7)
}

export const steps = Array.from({ length: stepCount }, (_, step) => step)
export const periodNames = [...new Set(steps.map(periodOf))]
export const stepsOf = (period: string): number[] => steps.filter((step) => periodOf(step) === period)
export const baseSteps = steps.slice(0, 52)

/** An estimate with a half-width at 90 %. */
export function around(mean: number, half: number): Estimate {
  return { mean, low: mean - half, high: mean + half, sd: half / 1.645 }
}

export function average(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length
}

/** Mix-adjusted opinion, in points: level ground, then a rise of about six points that quickens at the end. */
export function opinionAt(step: number): number {
  return 19 + 1.2 * Math.sin(step / 8) + 4 / (1 + Math.exp((100 - step) / 6)) + (step > 123 ? (step - 123) * 0.75 : 0)
}

/** A repeatable stand-in for noise, in [-1, 1]. */
export function ripple(step: number, salt: number): number {
  return Math.sin(step * 12.9898 + salt * 78.233) * Math.cos(step * 4.1 + salt)
}
