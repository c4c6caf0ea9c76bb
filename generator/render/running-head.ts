import type { Words } from '../words/words.ts'

/** Stand in the wording where only the printer knows the number. */
const marks = { page: '⟨page⟩', pages: '⟨pages⟩' } as const

/**
 * Running head and foot, as margin boxes of the printed page: title on top from the second page on, `page x of y` below.
 * The words come from the catalogue, so this part of the style sheet is made for each review.
 */
export function runningHead(title: string, words: Words): string {
  const foot = words.say('page-of', { page: marks.page, pages: marks.pages }).split(/(⟨\w+⟩)/u).filter((part) => part !== '')
    .map((part) => (part === marks.page ? 'counter(page)' : part === marks.pages ? 'counter(pages)' : cssString(part))).join(' ')
  return `@page{@top-left{content:${cssString(title)}}@bottom-right{content:${foot}}}@page:first{@top-left{content:none}}`
}

/** CSS Syntax 3, 4.3.5: everything but plain letters, digits and spaces is escaped, so that no title can end the string or the element. */
export function cssString(text: string): string {
  return `"${text.replace(/[^\p{L}\p{N} ]/gu, (character) => `\\${(character.codePointAt(0) ?? 0).toString(16)} `)}"`
}
