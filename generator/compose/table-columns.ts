/** A column of a printed table: one column of the figures, or the two bounds of an interval. */
export interface PrintedColumn {
  readonly keys: readonly [string] | readonly [low: string, high: string]
}

/** Read `label, mentions, level_low..level_high`. */
export function parseColumns(text: string): readonly PrintedColumn[] {
  return text.split(',').map((column) => column.trim()).filter((column) => column !== '').map((column) => {
    const [first = '', second] = column.split('..')
    return { keys: second === undefined ? [first] : [first, second] }
  })
}

/** The message that words a column's header: `column-mentions`; every interval has the same, save that of a change beside one of a level and one that was told earlier. */
export function columnHeader({ keys }: PrintedColumn): string {
  if (keys[0] === 'change_low') return 'column-change-interval'
  if (keys[0] === 'told_low') return 'column-told-interval'
  return keys.length === 2 ? 'column-interval' : `column-${keys[0]}`
}
