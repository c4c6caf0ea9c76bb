/** How the fields of a file with separated values are cut, and what its header names. */
export interface CsvForm {
  readonly delimiter: string
  readonly quote: string
  readonly header: readonly string[]
}

export interface StatedForm {
  readonly delimiter: string | null
  readonly quote: string | null
}

const delimiters = [',', ';', '\t', '|']
const quotes = ['"', "'"]

/**
 * The form under which the header names most of the wanted columns; what the account states is not guessed.
 * Guessing from the header is safe because the account says what must be in it.
 *
 * @param start - the beginning of the file, at least its first record, without a byte order mark
 */
export function csvForm(start: string, wanted: readonly string[], stated: StatedForm): CsvForm {
  const forms = (stated.delimiter === null ? delimiters : [stated.delimiter]).flatMap((delimiter) =>
    (stated.quote === null ? quotes : [stated.quote]).map((quote): CsvForm => ({ delimiter, quote, header: firstRecord(start, delimiter, quote) })))
  const hits = ({ header }: CsvForm): number => wanted.filter((column) => header.includes(column)).length
  return forms.reduce((best, form) => {
    const gain = hits(form) - hits(best)
    return gain > 0 || (gain === 0 && hits(form) === 0 && form.header.length > best.header.length) ? form : best
  })
}

/** The fields of the first record of a text. @example firstRecord('a;"b;c"\n1;2', ';', '"') // => ['a', 'b;c'] */
function firstRecord(text: string, delimiter: string, quote: string): readonly string[] {
  const fields: string[] = []
  let field = ''
  let quoted = false
  for (let at = 0; at < text.length; at++) {
    const character = text[at]!
    if (quoted) {
      if (character !== quote) field += character
      else if (text[at + 1] === quote) { field += quote; at++ } else quoted = false
    } else if (character === quote && field === '') quoted = true
    else if (character === delimiter) { fields.push(field.trim()); field = '' } else if (character === '\n' || character === '\r') {
      if (fields.length > 0 || field !== '') break
    } else field += character
  }
  return [...fields, field.trim()]
}
