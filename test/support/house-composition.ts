import { readdirSync } from 'node:fs'
import type { Element } from 'hast'
import { toString } from 'hast-util-to-string'
import { visit } from 'unist-util-visit'
import { compose } from '../../generator/compose/compose.ts'
import type { Document } from '../../generator/compose/document.ts'
import { loadTemplate } from '../../generator/compose/load-template.ts'
import { tablesOf } from '../../generator/tables/tables-of.ts'
import type { Findings } from '../../model/findings/schema.ts'
import { houseWords, templatesFolder } from './house-words.ts'

const words = await houseWords()
const template = await loadTemplate(templatesFolder)
export const houseCharts = readdirSync(`${templatesFolder}/charts`).map((file) => file.replace(/\.json$/, ''))
export const houseTemplate = template

/** The house template, filled from findings. */
export function composeHouse(findings: Findings): Document {
  return compose({ template, words, findings, tables: tablesOf(findings), charts: houseCharts })
}

/** The text of a section, by its name; blocks are parted by spaces. */
export function sectionText(document: Document, name: string): string {
  let text = ''
  visit(document.tree, 'element', (element) => {
    if (element.tagName === 'section' && element.properties['id'] === name) text = spaced(element).replace(/\s+/g, ' ').trim()
  })
  return text
}

/** Every element of a name. */
export function elementsOf(document: Document, tagName: string): readonly Element[] {
  const found: Element[] = []
  visit(document.tree, 'element', (element) => {
    if (element.tagName === tagName) found.push(element)
  })
  return found
}

const inLine = new Set(['a', 'strong', 'em', 'span', 'code'])

function spaced(element: Element): string {
  const text = element.children.map((child) => child.type === 'element' ? spaced(child) : toString(child)).join('')
  return inLine.has(element.tagName) ? text : ` ${text} `
}
