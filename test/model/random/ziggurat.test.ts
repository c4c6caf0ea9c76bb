import { expect, test } from 'vitest'
import { seedState } from '../../../model/random/xoshiro.ts'
import { drawNormal, edges } from '../../../model/random/ziggurat.ts'
import { mean, sampleVariance } from '../../../model/statistics/moments.ts'
import { normalCdf, normalDensity } from '../../../model/statistics/normal.ts'

// Doornik (2005), section 2, constants for 128 layers; recalled from memory, and verified here: the layers close exactly
// at the mode, and each holds the area of the bottom one.
const start = 3.442619855899
const area = 9.91256303526217e-3
const density = (x: number) => Math.exp(-0.5 * x * x)

/** Simpson's rule for the density over [start, 12]. */
function tailArea(): number {
  const steps = 20_000
  const h = (12 - start) / steps
  let sum = density(start) + density(12)
  for (let i = 1; i < steps; i += 1) sum += (i % 2 === 1 ? 4 : 2) * density(start + i * h)
  return (sum * h) / 3
}

test('the bottom layer and its tail hold the area of a layer', () => {
  expect(start * density(start) + tailArea()).toBeCloseTo(area, 13)
})

const layerAreas = Array.from({ length: 127 }, (_, i) => edges[i + 1] * (density(edges[i + 2]) - density(edges[i + 1])))

test('every layer has the same area', () => {
  for (const layer of layerAreas.slice(0, -1)) expect(Math.abs(layer / area - 1)).toBeLessThan(1e-12)
})

test('the top layer, which takes up the rounding of the two constants, closes at the mode to 2e-9 of its area', () => {
  expect(edges[128]).toBe(0)
  expect(Math.abs(layerAreas[126] / area - 1)).toBeLessThan(2e-9)
})

test('it can fail: a start moved by 1e-6 does not hold the area', () => {
  expect(Math.abs((start + 1e-6) * density(start + 1e-6) + tailArea() - area)).toBeGreaterThan(1e-9)
})

test('beyond the start draws fall off as the normal tail does: mean and variance of the excess within 3.5 standard errors', () => {
  const state = seedState(8, 0)
  const excess: number[] = []
  for (let i = 0; i < 4_000_000; i += 1) {
    const beyond = Math.abs(drawNormal(state)) - start
    if (beyond > 0) excess.push(beyond)
  }
  // Moments of a normal above `start`: hazard h = f / (1 - F), mean excess h - start, variance 1 - h (h - start).
  const hazard = normalDensity(start) / normalCdf(-start)
  const variance = 1 - hazard * (hazard - start)
  expect(Math.abs(excess.length - 8_000_000 * normalCdf(-start))).toBeLessThan(3.5 * Math.sqrt(8_000_000 * normalCdf(-start)))
  expect(Math.abs(mean(excess) - (hazard - start))).toBeLessThan(3.5 * Math.sqrt(variance / excess.length))
  expect(Math.abs(sampleVariance(excess) / variance - 1)).toBeLessThan(3.5 * Math.sqrt(6 / excess.length))
})
