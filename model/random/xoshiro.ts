const golden = 0x9e3779b9

/** Output function of splitmix32, a bijection of 32-bit words (after Steele, Lea and Flood 2014; multipliers found by Wellons's search). */
function mix(word: number): number {
  let z = Math.imul(word ^ (word >>> 16), 0x21f0aaad)
  z = Math.imul(z ^ (z >>> 15), 0x735a2d97)
  return z ^ (z >>> 15)
}

/**
 * The four words of state for one stream of a seed, each a chain of splitmix32 over (lane, seed, stream). Each link of
 * the chain is a bijection of the word it takes in, so two streams of one seed, below 2^32, differ in all four words.
 *
 * @param seed - integer in [0, 2^53)
 * @param stream - integer in [0, 2^53)
 * @returns shape (4), never all zero
 */
export function seedState(seed: number, stream: number): Int32Array {
  const words = [high(seed), low(seed), high(stream), low(stream)]
  const state = Int32Array.from([1, 2, 3, 4], (lane) =>
    words.reduce((chain, word) => mix((chain + golden + word) | 0), mix(Math.imul(lane, golden))))
  if (state.every((word) => word === 0)) state[0] = 1
  return state
}

const low = (whole: number) => whole | 0
const high = (whole: number) => Math.floor(whole / 2 ** 32) | 0

/**
 * One step of xoshiro128** 1.1: period 2^128 - 1.
 *
 * @param state - shape (4), moved on in place
 * @returns 32 random bits as a signed integer
 * @see Blackman and Vigna (2021), Scrambled linear pseudorandom number generators, ACM TOMS 47(4), first published 2018
 */
export function nextWord(state: Int32Array): number {
  const s1 = state[1]
  const scaled = Math.imul(s1, 5)
  const word = Math.imul((scaled << 7) | (scaled >>> 25), 9)
  const s2 = state[2] ^ state[0]
  const s3 = state[3] ^ s1
  state[1] = s1 ^ s2
  state[0] ^= s3
  state[2] = s2 ^ (s1 << 9)
  state[3] = (s3 << 11) | (s3 >>> 21)
  return word
}
