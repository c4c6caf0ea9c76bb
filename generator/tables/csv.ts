import type { Cell, Table } from './table.ts'

/**
 * A table as CSV (RFC 4180: CRLF, a header row, quotes doubled), UTF-8 without byte-order mark.
 * Numbers are written in full and with a point; an absent value is an empty field.
 * Text that a spreadsheet would take for a formula gets a leading apostrophe: labels come from outside.
 */
export function toCsv(table: Table): string {
  const header = table.columns.map(({ key }) => field(key))
  const rows = table.rows.map((row) => table.columns.map(({ key }) => field(row[key] ?? null)))
  return [header, ...rows].map((fields) => `${fields.join(',')}\r\n`).join('')
}

function field(cell: Cell): string {
  if (cell === null) return ''
  if (typeof cell !== 'string') return String(cell)
  const safe = /^[\s]*[=+\-@]|^[\t\r]/.test(cell) ? `'${cell}` : cell
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}
