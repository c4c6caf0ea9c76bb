import { isUtf8 } from 'node:buffer'
import { faultOf } from '../../faults/catalogue.ts'
import { InputFault } from '../../faults/fault.ts'
import { type NamedFile, readBounded } from '../bounded-file.ts'
import type { Logo } from '../theme.ts'
import { cleanPng } from './clean-png.ts'
import { cleanSvgLogo } from './clean-svg-logo.ts'

const mostBytes = { png: 1_000_000, svg: 200_000 } as const

/**
 * Read, check and clean a logo. Either kind goes into the review as an address of data inside an `img`, where a browser runs nothing and loads nothing.
 *
 * @throws {InputFault} at the logo's place in theme.yaml, or at the line of the drawing
 */
export async function readLogo(file: NamedFile, alt: string, heightMm: number): Promise<Logo> {
  const isDrawing = file.path.toLowerCase().endsWith('.svg')
  const bytes = await readBounded(file, ['.svg', '.png'], isDrawing ? mostBytes.svg : mostBytes.png)
  const [kind, clean] = isDrawing ? ['svg+xml', drawing(file, bytes)] as const : ['png', picture(file, bytes)] as const
  return { address: `data:image/${kind};base64,${Buffer.from(clean).toString('base64')}`, alt, heightMm }
}

function picture(file: NamedFile, bytes: Uint8Array): Uint8Array {
  const cleaned = cleanPng(bytes)
  if ('bytes' in cleaned) return cleaned.bytes
  throw new InputFault([faultOf('theme-picture', file.place, { ...cleaned, found: `${cleaned.found} in \`${file.path}\`` })])
}

function drawing(file: NamedFile, bytes: Uint8Array): Uint8Array {
  const cleaned = isUtf8(bytes) ? cleanSvgLogo(Buffer.from(bytes).toString('utf8')) : [{ found: 'bytes that are not UTF-8', expected: 'SVG in UTF-8', mend: 'Save the logo in UTF-8.' }]
  if (typeof cleaned === 'string') return Buffer.from(cleaned)
  throw new InputFault(cleaned.map(({ line, column, ...details }) => faultOf('theme-drawing', line === undefined ? file.path : `${file.path}:${line}:${column}`, details)))
}
