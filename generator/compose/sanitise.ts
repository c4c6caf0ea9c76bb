import { sanitize } from 'hast-util-sanitize'
import type { Schema } from 'hast-util-sanitize'
import type { Root } from 'hast'

/** All that a review may hold. Written out, not derived from a default, so that nothing comes in unseen. */
const schema: Schema = {
  tagNames: [
    'section', 'div', 'span', 'nav', 'h1', 'h2', 'h3', 'h4', 'p', 'strong', 'em', 'code', 'pre', 'br', 'hr', 'blockquote', 'a', 'ul', 'ol', 'li',
    'dl', 'dt', 'dd', 'figure', 'figcaption', 'table', 'caption', 'thead', 'tbody', 'tr', 'th', 'td', 'del',
  ],
  attributes: {
    '*': ['id', 'className', 'role', 'ariaLabel', 'lang'],
    a: ['href'],
    figure: ['dataChart', 'dataAlt'],
    div: ['tabIndex', 'dataTable'],
    th: ['scope', 'align'],
    td: ['align'],
    ol: ['start'],
  },
  protocols: { href: ['https', 'http', 'mailto'] },
  clobber: [],
  clobberPrefix: '',
  strip: ['script', 'style'],
}

/** The tree without anything that the schema does not name; the last step, whatever came before. */
export function sanitise(tree: Root): Root {
  const clean = sanitize(tree, schema)
  return clean.type === 'root' ? clean : { type: 'root', children: clean.type === 'doctype' ? [] : [clean] }
}
