import { describe, expect, test } from 'vitest'
import { defectCorrelation, effectiveSizeBound, equalSampleSize, standardisedError } from '../../model/statistics/data-defect.ts'

const near = (found: number | null, expected: number, tolerance: number) => { expect(Math.abs((found ?? Number.NaN) - expected)).toBeLessThan(tolerance) }

// Meng (2018), Statistical paradises and paradoxes in big data (I), Annals of Applied Statistics 12:685-726, doi 10.1214/18-AOAS1161SF.
// The number of the identity's equation there, (2.3), is from memory.
const election = (() => {
  const [size, population] = [35829, 136639786]
  const [share, heard] = [62984824 / population, 12284 / size]
  return { size, population, gap: heard - share, sd: Math.sqrt(share * (1 - share)) }
})()

describe('MENG-01: vote for the Republican candidate in the CCES of 2016', () => {
  // README of the R package ddi 0.1.0: -0.003837163. Printed value found; recomputed in R 4.2.2. Tolerance 1e-8.
  test('data defect correlation, effective size and reduction', () => {
    const rho = defectCorrelation(election).value!
    near(rho, -0.003837163, 1e-9)
    near(rho, -0.0038371628845574, 1e-8)
    const fraction = election.size / election.population
    near(fraction, 0.000262214989124763, 1e-12)
    near(effectiveSizeBound(rho, fraction).value, 17.8135688717915, 1e-8)
    near(equalSampleSize(election.gap, 0, election.sd).value, 17.8135688717915, 1e-8)
    near(1 - effectiveSizeBound(rho, fraction).value! / election.size, 0.999502817023311, 1e-8)
  })

  test('it can fail: the spread of the sample for that of the population', () => {
    const heard = 12284 / 35829
    near(defectCorrelation({ ...election, sd: Math.sqrt(heard * (1 - heard)) }).value, -0.00403, 1e-5)
    expect(Math.abs(defectCorrelation({ ...election, sd: Math.sqrt(heard * (1 - heard)) }).value! + 0.003837163)).toBeGreaterThan(1e-4)
  })
})

describe('MENG-03: 2,300,000 voters, one in a hundred, with a correlation of -0.005', () => {
  // Meng (2018), abstract and sections 3 and 4: about 400, a reduction of 99.98 %. Printed value found; recomputed in R 4.2.2. Tolerance 1e-6 against exact.
  const { value } = effectiveSizeBound(-0.005, 0.01)

  test('they are worth 400 interviews', () => {
    near(value, 404.040404040404, 1e-6)
    expect(Math.round(value! / 100) * 100).toBe(400)
    near(1 - value! / 2_300_000, 0.9998, 5e-5)
    near(1 - value! / 2_300_000, 0.999824330259113, 1e-9)
  })

  test('it can fail: f for f / (1 - f)', () => { expect(Math.abs(value! - 0.01 / 0.005 ** 2)).toBeGreaterThan(4) })
})

describe('MENG-04: the identity on a population of a thousand', () => {
  // Meng (2018), the identity. Computed both ways in R 4.2.2. Tolerance 1e-12.
  const found = { size: 200, population: 1000, gap: 130 / 200 - 480 / 1000, sd: Math.sqrt(0.48 * 0.52) }

  test('correlation, product, effective size', () => {
    const rho = defectCorrelation(found).value!
    near(found.sd, 0.499599839871872, 1e-12)
    near(rho, 0.170136163417905, 1e-12)
    near(rho * Math.sqrt(0.8 / 0.2) * found.sd, 0.17, 1e-12)
    near(effectiveSizeBound(rho, 0.2).value, 8.63667820069204, 1e-12)
    near(equalSampleSize(found.gap, 0, found.sd).value, 8.63667820069204, 1e-12)
  })

  test('it can fail: one voice more among those heard', () => {
    expect(Math.abs(defectCorrelation({ ...found, gap: 131 / 200 - 480 / 1000 }).value! - 0.170136163417905)).toBeGreaterThan(1e-3)
  })
})

describe('MENG-06: the error in standard errors of a random sample', () => {
  // Meng (2018), law of large populations: sqrt(N - 1) rho. Formula recalled (from memory); computed. Tolerance 1e-6 relative.
  test('-44.85', () => { near(standardisedError(-0.0038371628845574, 136639786) / -44.8537563967342, 1, 1e-6) })

  test('it can fail: the same defect in a population a tenth as large', () => {
    near(standardisedError(-0.0038371628845574, 13663979) / -44.8537563967342, Math.sqrt(0.1), 1e-6)
  })
})
