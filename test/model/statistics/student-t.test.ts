import { describe, expect, test } from 'vitest'
import { ModelError } from '../../../model/model-error.ts'
import { normalCdf } from '../../../model/statistics/normal.ts'
import { studentCdf } from '../../../model/statistics/student-t.ts'

const relative = (found: number, expected: number) => Math.abs(found / expected - 1)

/** Probability between -t and t by the finite series of Abramowitz and Stegun (1964), 26.7.3 and 26.7.4; its own rounding grows with the freedom. */
function finiteSeries(t: number, freedom: number): number {
  const angle = Math.atan(t / Math.sqrt(freedom))
  const [sine, cosine] = [Math.sin(angle), Math.cos(angle)]
  const odd = freedom % 2 === 1
  let term = odd ? cosine : 1
  let sum = freedom === 1 ? 0 : term
  for (let power = odd ? 3 : 2; power <= freedom - 2; power += 2) {
    term *= ((power - 1) / power) * cosine * cosine
    sum += term
  }
  return odd ? (2 / Math.PI) * (angle + sine * sum) : sine * sum
}

test.each([1, 2, 3, 4, 7, 12, 35, 60, 301, 2001])('freedom %d: between -t and t as the finite series has it', (freedom) => {
  for (let t = 0.05; t < 6; t += 0.13) expect(Math.abs(studentCdf(t, freedom) - studentCdf(-t, freedom) - finiteSeries(t, freedom))).toBeLessThan(3e-14)
})

test('it can fail: one degree of freedom more', () => {
  expect(Math.abs(studentCdf(1, 60) - studentCdf(-1, 60) - finiteSeries(1, 61))).toBeGreaterThan(1e-5)
})

describe('tails to 17 digits by mpmath 1.3.0 (betainc at 40 digits)', () => {
  const cases = [
    [1, 1, 0.25], [1, 2.01, 0.14694953505053956], [1, 10, 0.03172551743055357], [2, 1.99, 0.09243553869237921],
    [2, 2.01, 0.09107468459682058], [2, 4, 0.02859547920896832], [3, 1, 0.19550110947788532], [3, 2.01, 0.06899172979645209],
    [3, 10, 0.0010641995292070751], [10, 1, 0.17044656615102993], [10, 2.01, 0.03608734234645227], [10, 10, 7.947765877982059e-07],
    [30, 1.99, 0.02788625377000479], [30, 2.01, 0.026749158466260445], [30, 4, 0.00019092281804187843], [2.5, 1, 0.20203051363913674],
    [2.5, 2.01, 0.07801975804362109], [2.5, 10, 0.002220747883653712], [2001, 1.99, 0.02336340680219627], [2001, 2.01, 0.022282590564789862],
    [2001, 4, 3.282279937094853e-05], [100000, 1.99, 0.02329682691074334], [100000, 2.01, 0.02221693469507392], [100000, 4, 3.169399877859767e-05],
    [10000000, 1.99, 0.023295481341756404], [10000000, 2.01, 0.022215607832021686], [10000000, 4, 3.167146934508438e-05],
  ] as const
  test.each(cases)('freedom %d, t = -%d', (freedom, t, expected) => { expect(relative(studentCdf(-t, freedom), expected)).toBeLessThan(3e-14) })

  test('far out, where only the exponent is left to round', () => {
    expect(relative(studentCdf(-1e200, 1), 3.1830988618379067e-201)).toBeLessThan(1e-12)
    expect(relative(studentCdf(-40, 2001), 6.644959497812092e-258)).toBeLessThan(1e-12)
  })

  test('it can fail: a t off by 1e-12 would show', () => { expect(relative(studentCdf(-4 * (1 + 1e-12), 30), cases.find(([v, t]) => v === 30 && t === 4)![2])).toBeGreaterThan(1e-12) })
})

test('with growing freedom it becomes the normal, at no more work', () => {
  for (const t of [0.3, 1.5, 1.99, 2.01, 5]) expect(relative(studentCdf(-t, 1e12), normalCdf(-t))).toBeLessThan(1e-9)
  expect(relative(studentCdf(-2.01, 1000), normalCdf(-2.01))).toBeGreaterThan(1e-3)
})

test('it is symmetric, rises through the seam of the two methods, and ends at 0 and 1', () => {
  for (const freedom of [1, 2.5, 9, 4000]) {
    for (let t = -4; t < 4; t += 0.01) {
      expect(studentCdf(t, freedom) + studentCdf(-t, freedom)).toBeCloseTo(1, 14)
      expect(studentCdf(t + 0.01, freedom)).toBeGreaterThan(studentCdf(t, freedom))
    }
    expect([studentCdf(-Infinity, freedom), studentCdf(0, freedom), studentCdf(Infinity, freedom)]).toEqual([0, 0.5, 1])
  }
})

test.each([0, 0.5, Number.NaN, Infinity])('freedom %d is refused', (freedom) => { expect(() => studentCdf(0, freedom)).toThrow(`freedom ${freedom}`) })
test('NaN has no probability', () => { expect(() => studentCdf(Number.NaN, 3)).toThrow(ModelError) })
