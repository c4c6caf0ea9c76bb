/** The maximum of a smooth function of a few variables, by Newton's method on central differences: for tests against published maxima. */
export function maximise(f: (x: readonly number[]) => number, start: readonly number[], step = 1e-3): readonly number[] {
  let x = [...start]
  const at = (moves: readonly (readonly [number, number])[]) => f(x.map((value, i) => moves.reduce((total, [k, by]) => (k === i ? total + by : total), value)))
  for (let iteration = 0; iteration < 50; iteration++) {
    const gradient = x.map((_, i) => (at([[i, step]]) - at([[i, -step]])) / (2 * step))
    const hessian = x.map((_, i) => x.map((__, j) => (at([[i, step], [j, step]]) - at([[i, step], [j, -step]]) - at([[i, -step], [j, step]]) + at([[i, -step], [j, -step]])) / (4 * step * step)))
    const move = solve(hessian, gradient).map((m) => Math.max(-0.5, Math.min(0.5, -m)))
    x = x.map((value, i) => value + move[i])
    if (move.every((m) => Math.abs(m) < 1e-9)) break
  }
  return x
}

/** Gaussian elimination of a system of a few equations. */
function solve(matrix: readonly (readonly number[])[], right: readonly number[]): number[] {
  const rows = matrix.map((row, i) => [...row, right[i]])
  rows.forEach((row, i) => {
    for (let k = i + 1; k < rows.length; k++) {
      const factor = rows[k][i] / row[i]
      for (let j = i; j < rows[k].length; j++) rows[k][j] -= factor * row[j]
    }
  })
  const x = new Array<number>(rows.length).fill(0)
  for (let i = rows.length - 1; i >= 0; i--) x[i] = (rows[i][rows.length] - x.reduce((total, value, j) => total + (j > i ? rows[i][j] * value : 0), 0)) / rows[i][i]
  return x
}
