import { expect, test } from 'vitest'
import { adaptiveIntegral } from '../../../model/statistics/adaptive-integral.ts'

test('undivided, Kronrod\'s 15 nodes integrate powers up to 22 to rounding, and not the 24th', () => {
  for (let power = 0; power <= 23; power += 1) expect(adaptiveIntegral((x) => x ** power, 0, 1, 1)).toBeCloseTo(1 / (power + 1), 14)
  expect(Math.abs(adaptiveIntegral((x) => x ** 24, -1, 1, 1) - 2 / 25)).toBeGreaterThan(1e-15)
  expect(Math.abs(adaptiveIntegral((x) => x ** 40, -1, 1, 1) - 2 / 41)).toBeGreaterThan(1e-10)
})

test('its error is judged by Gauss\'s seven nodes, which integrate powers up to 13: those are never divided, the 14th is', () => {
  const calls = (power: number) => {
    let count = 0
    adaptiveIntegral((x) => { count += 1; return x ** power }, -1, 1, 1e-13)
    return count
  }
  expect(calls(12)).toBe(15)
  expect(calls(14)).toBeGreaterThan(15)
})

test('a narrow peak and a corner inside are found by halving', () => {
  const peak = (x: number) => 1 / (1e-6 + (x - 0.3) ** 2)
  expect(adaptiveIntegral(peak, 0, 1, 1e-8) / ((Math.atan(700) + Math.atan(300)) * 1000)).toBeCloseTo(1, 11)
  expect(adaptiveIntegral((x) => Math.abs(x - 0.3), 0, 1, 1e-12)).toBeCloseTo(0.29, 11)
  expect(adaptiveIntegral((x) => Math.abs(x - 0.3), 0, 1, 1)).not.toBeCloseTo(0.29, 6)
})

test('turned round the sign turns; what is no integral is refused', () => {
  expect(adaptiveIntegral(Math.exp, 1, 0, 1e-9)).toBeCloseTo(1 - Math.E, 13)
  expect(() => adaptiveIntegral(Math.exp, 0, Infinity, 1e-9)).toThrow('to Infinity')
  expect(() => adaptiveIntegral(Math.exp, 0, 1, 0)).toThrow('to 0')
})
