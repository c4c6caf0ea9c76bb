import { ModelError } from '../model-error.ts'
import { nextWord, seedState } from './xoshiro.ts'
import { drawNormal, drawUniform } from './ziggurat.ts'

/** Where all randomness comes from: passed in, never global. Every method moves the stream on. */
export interface Generator {
  /** In (0, 1), both ends left out; 53 random bits. */
  uniform(): number
  /** Standard normal. */
  normal(): number
  /** Overwrite every element with a standard normal draw: the same draws as `normal` called in turn. */
  fillNormal(target: Float64Array): void
  /** Each of 0 ... n - 1 equally likely, without bias; `integer-range` unless n is a whole number in [1, 2^32]. */
  integer(n: number): number
  /** Put the elements in random order, in place; every order equally likely. */
  shuffle(target: Shuffleable): void
}

/** Any array that can be put in order in place. */
export interface Shuffleable<T = unknown> {
  readonly length: number
  [index: number]: T
}

/**
 * A seeded generator: xoshiro128**, seeded through splitmix32; normals by ziggurat. The same (seed, stream) gives the
 * same draws on any machine; other streams of a seed serve as independent sources.
 *
 * @param seed - whole number in [0, 2^53)
 * @param stream - whole number in [0, 2^53): one per chain, chunk or purpose
 * @throws {ModelError} `seed-invalid`
 * @example createGenerator(20261001, 0).integer(6) + 1 // => a throw of a die, always the same
 */
export function createGenerator(seed: number, stream: number): Generator {
  for (const [name, value] of [['seed', seed], ['stream', stream]] as const) {
    if (!Number.isSafeInteger(value) || value < 0) {
      throw new ModelError('seed-invalid', `Unexpected ${name} ${value}, expected a whole number in [0, 2^53)`)
    }
  }
  const state = seedState(seed, stream)
  const integer = (n: number) => drawInteger(state, n)
  return {
    uniform: () => drawUniform(state),
    normal: () => drawNormal(state),
    fillNormal: (target) => {
      for (let i = 0; i < target.length; i += 1) target[i] = drawNormal(state)
    },
    integer,
    shuffle: (target) => {
      for (let last = target.length - 1; last > 0; last -= 1) swap(target, last, integer(last + 1))
    },
  }
}

/** Words in the last, incomplete run of n are drawn again, or small values would be favoured. */
function drawInteger(state: Int32Array, n: number): number {
  if (!Number.isInteger(n) || n < 1 || n > 4294967296) {
    throw new ModelError('integer-range', `Unexpected number of values ${n}, expected a whole number in [1, 2^32]`)
  }
  const limit = 4294967296 - (4294967296 % n)
  for (;;) {
    const word = nextWord(state) >>> 0
    if (word < limit) return word % n
  }
}

function swap(target: Shuffleable, one: number, other: number): void {
  const kept = target[one]
  target[one] = target[other]
  target[other] = kept
}
