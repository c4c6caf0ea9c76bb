import { nextWord } from './xoshiro.ts'

/**
 * Standard normal draws by the ziggurat of Marsaglia and Tsang (2000), J. Statistical Software 5(8), in the form of
 * Doornik (2005), An improved ziggurat method to generate normal random samples: the layer and the position within it
 * come from different bits, which the original did not see to.
 */
const layers = 128
/** Where the tail begins, and the area of each layer: `edges` closes at 0 with these (a test shows it). */
const tailStart = 3.442619855899
const layerArea = 9.91256303526217e-3

const density = (x: number) => Math.exp(-0.5 * x * x)

/** Shape (129): right edge of each layer, widest first; the bottom one is as wide as its area makes it with the tail laid flat. */
export const edges = layerEdges()
/** Shape (128): the part of a layer's width that lies wholly under the density. */
const inner = Float64Array.from({ length: layers }, (_, layer) => edges[layer + 1] / edges[layer])

function layerEdges(): Float64Array {
  const x = new Float64Array(layers + 1)
  x[0] = layerArea / density(tailStart)
  x[1] = tailStart
  for (let layer = 2; layer < layers; layer += 1) {
    x[layer] = Math.sqrt(-2 * Math.log(layerArea / x[layer - 1] + density(x[layer - 1])))
  }
  return x
}

/** A uniform in (0, 1): multiples of 2^-53, zero left out. */
export function drawUniform(state: Int32Array): number {
  for (;;) {
    const upper = nextWord(state) >>> 11
    const whole = upper * 4294967296 + (nextWord(state) >>> 0)
    if (whole > 0) return whole * 2 ** -53
  }
}

/** @param state - shape (4), of xoshiro128**, moved on in place */
export function drawNormal(state: Int32Array): number {
  for (;;) {
    const upper = nextWord(state)
    const layer = upper & (layers - 1)
    const position = 2 * (((upper >>> 11) * 4294967296 + (nextWord(state) >>> 0) + 0.5) * 2 ** -53) - 1
    if (Math.abs(position) < inner[layer]) return position * edges[layer]
    if (layer === 0) return drawTail(state, position < 0)
    const x = position * edges[layer]
    const ceiling = density(edges[layer])
    if (ceiling + drawUniform(state) * (density(edges[layer + 1]) - ceiling) < density(x)) return x
  }
}

/** Beyond `tailStart`: Marsaglia (1964), by rejection from an exponential. */
function drawTail(state: Int32Array, negative: boolean): number {
  for (;;) {
    const x = -Math.log(drawUniform(state)) / tailStart
    const y = -Math.log(drawUniform(state))
    if (2 * y >= x * x) return negative ? -(tailStart + x) : tailStart + x
  }
}
