/**
 * Wall clocks of the demo's time zone. A wall time is held as the milliseconds that the same reading would have in UTC,
 * so that days and weeks can be counted by division.
 */
export const day = 86_400_000
const week = 7 * day

/** The first Monday of the grid: the week that holds 1 May 2024. */
export const firstMonday = Date.UTC(2024, 3, 29)
export const firstWall = Date.UTC(2024, 4, 1)
/** The first wall time after the data. */
export const endWall = Date.UTC(2026, 10, 1)
export const weeks = Math.ceil((endWall - firstMonday) / week)

export function isoDate(wall: number): string {
  return new Date(wall).toISOString().slice(0, 10)
}

export function isoSeconds(wall: number): string {
  return new Date(wall).toISOString().slice(0, 19)
}

export function weekOf(wall: number): number {
  return Math.floor((wall - firstMonday) / week)
}

/** Middle of a week as wall time: Thursday noon. */
export function middleOf(weekIndex: number): number {
  return firstMonday + (weekIndex + 0.5) * week
}

/** 2026-10 */
export function monthOf(wall: number): string {
  return isoDate(wall).slice(0, 7)
}

/** 2026-Q4 */
export function quarterOf(wall: number): string {
  const date = new Date(wall)
  return `${date.getUTCFullYear()}-Q${Math.floor(date.getUTCMonth() / 3) + 1}`
}

/** The Sunday nights on which clocks change: wall date of the last Sunday of March and of October. */
export function clockChanges(year: number): { readonly spring: number; readonly autumn: number } {
  return { spring: lastSunday(year, 2), autumn: lastSunday(year, 9) }
}

function lastSunday(year: number, month: number): number {
  const last = Date.UTC(year, month + 1, 0)
  return last - new Date(last).getUTCDay() * day
}

/** Milliseconds that wall clocks in western Europe's Atlantic zone are ahead of UTC; of two readings the first. */
export function aheadOfUtc(wall: number): number {
  const { spring, autumn } = clockChanges(new Date(wall).getUTCFullYear())
  const hour = 3_600_000
  return wall >= spring + hour && wall < autumn + 2 * hour ? hour : 0
}
