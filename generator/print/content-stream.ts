/** One operation of a content stream: its operator, and where it stands in the source with its operands. */
export interface Operation {
  readonly operator: string
  readonly start: number
  readonly end: number
}

/** Literal strings, hexadecimal strings, dictionaries' brackets, arrays' brackets, names, and everything else between white space. */
const token = /\((?:[^()\\]|\\[\s\S]|\((?:[^()\\]|\\[\s\S])*\))*\)|<<|>>|<[0-9A-Fa-f\s]*>|\[|\]|\/[^\s()<>[\]/]*|[^\s()<>[\]/]+/g
const operatorForm = /^[A-Za-z'"][A-Za-z0-9*'"]*$/

/**
 * Split a content stream (ISO 32000-1, 7.8.2) into its operations. Inline images are not expected: Chromium writes none.
 *
 * @param source - the stream, decoded, one character per byte
 */
export function operationsOf(source: string): readonly Operation[] {
  const operations: Operation[] = []
  let start = -1
  for (const match of source.matchAll(token)) {
    if (start < 0) start = match.index
    const text = match[0]
    if (!operatorForm.test(text) || text === 'true' || text === 'false' || text === 'null') continue
    operations.push({ operator: text, start, end: match.index + text.length })
    start = -1
  }
  return operations
}
