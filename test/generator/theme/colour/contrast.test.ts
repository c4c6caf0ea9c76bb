import { expect, test } from 'vitest'
import { contrast, leastContrast } from '../../../../generator/theme/colour/contrast.ts'

// WCAG 2.2, contrast ratio: 1 to 21; and pairs that its techniques and explanations name (Understanding 1.4.3: #767676 is the lightest grey that passes on white; #777777 has 4.47 and is not to be rounded up)
test.each([
  ['#000000', '#ffffff', 21], ['#ffffff', '#ffffff', 1], ['#767676', '#ffffff', 4.54], ['#777777', '#ffffff', 4.48], ['#ff0000', '#ffffff', 4.0], ['#0000ff', '#ffffff', 8.59], ['#949494', '#ffffff', 3.03],
])('%s on %s is %f', (one, other, published) => {
  expect(contrast(one, other)).toBeCloseTo(published, 2)
  expect(contrast(other, one)).toBe(contrast(one, other))
})

test('#777777 on white does not pass as text, #767676 does', () => {
  expect(contrast('#777777', '#ffffff')).toBeLessThan(leastContrast.text)
  expect(contrast('#767676', '#ffffff')).toBeGreaterThan(leastContrast.text)
})
