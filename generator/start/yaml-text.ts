/** Names that YAML takes for something else than text. */
const notText = /^(null|true|false|yes|no|on|off|y|n)$/i

/**
 * A text as YAML takes it, whatever it holds: plain where that is safe, in double quotes otherwise.
 *
 * @example yamlText('on board') // => 'on board'
 * @example yamlText(': {') // => '": {"'
 */
export function yamlText(text: string): string {
  if (/^\p{L}[\p{L}\p{N}_]*([ -][\p{L}\p{N}_]+)*$/u.test(text) && text.length <= 80 && !notText.test(text)) return text
  return JSON.stringify(text).replace(unseen, (character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`)
}

/** Characters that are not seen, part lines or turn the direction of writing. */
const unseen = /[\u007f-\u009f\u00ad\u061c\u200b-\u200f\u2028-\u202f\u2060-\u206f\ufeff\ufff9-\uffff]/g
const mostTold = 60

/** A text from the data as it stands in a comment: on one line, short, nothing unseen in it. */
export function inComment(text: string, most = mostTold): string {
  const plain = text.replace(/\p{C}+|[\u2028\u2029]+/gu, ' ').replace(/\s+/g, ' ').trim()
  const characters = [...plain]
  return characters.length > most ? `${characters.slice(0, most - 3).join('')}...` : plain
}

/** A line longer than this does not push the comments of the others aside. */
const longest = 90

/** Lines with comments behind them, in one column. */
export function withComments(lines: readonly (readonly [line: string, comment?: string])[]): string {
  const column = Math.max(0, ...lines.filter(([line, comment]) => comment !== undefined && line.length <= longest).map(([line]) => line.length))
  return lines.map(([line, comment]) => (comment === undefined ? line : `${line.padEnd(column)}   # ${comment}`)).join('\n')
}
