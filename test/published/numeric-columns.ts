import { readFileSync } from 'node:fs'

/** The columns of a CSV file of `data/` by name; every field must be a number. */
export function numericColumns(name: string): Record<string, Float64Array> {
  const [header, ...rows] = readFileSync(new URL(`data/${name}`, import.meta.url), 'utf8').trim().split('\n').map((line) => line.split(','))
  return Object.fromEntries(header.map((column, j) => [column, Float64Array.from(rows, (row, i) => {
    const value = Number(row[j])
    if (row[j] === '' || Number.isNaN(value)) throw new Error(`Unexpected ${row[j]} at ${name}:${i + 2} ${column}, expected a number`)
    return value
  })]))
}
