import type { RunningText } from './running-text.ts'

/** What charts are drawn with: sizes in px, colours and named looks. */
export interface ChartTheme {
  readonly font: string
  readonly font_size: number
  readonly widths: Sizes
  /** Labels longer than this many px are broken into lines. */
  readonly label_widths: Sizes
  readonly ink: string
  readonly quiet: string
  readonly rule: string
  readonly paper: string
  /** Of a mark that names no look. */
  readonly accent: string
  /** Of series that name no looks, in turn. */
  readonly series: readonly string[]
  /** Levels of a mix, from dark to light. */
  readonly shares: readonly string[]
  /** Looks by name, as Vega-Lite's `style` takes them. */
  readonly styles: Readonly<Record<string, Readonly<Record<string, string | number>>>>
}

export type DrawingSize = 'wide' | 'narrow'
type Sizes = Readonly<Record<DrawingSize, number>>

/** How far each character of a typeface moves the pen. */
export interface AdvanceTable {
  /** Units of `advances` in an em. */
  readonly perEm: number
  /** The characters that are known, in the order of `advances`. */
  readonly characters: string
  /** By weight: 400, 600 and 700. */
  readonly advances: Readonly<Record<string, readonly number[]>>
}

/** One embedded face: a static one, so that it prints as TrueType or CFF; a variable one would become Type 3. */
export interface Face {
  readonly weight: number
  /** Which characters it serves, as CSS writes it. */
  readonly range: string
  readonly form: 'woff2' | 'truetype' | 'opentype'
  readonly bytes: Uint8Array
}

/** A typeface as the page uses it. */
export interface Typeface {
  /** What the style sheet and the drawings call it. */
  readonly family: string
  /** What CSS falls back to. */
  readonly generic: 'serif' | 'sans-serif'
  readonly faces: readonly Face[]
  readonly advances: AdvanceTable
}

/** A picture that stands for who made the review: checked, cleaned, and with its height on the page. */
export interface Logo {
  /** `data:image/png;base64,...` or `data:image/svg+xml;base64,...`. */
  readonly address: string
  readonly alt: string
  readonly heightMm: number
}

export type Paper = 'A4' | 'letter'

/** What stands in the margins of every page; null: what the house puts there, from the catalogue. */
export interface Running {
  readonly head: RunningText | null
  readonly foot: RunningText | null
}

/** How a review looks. */
export interface Theme {
  /** Style sheets, the colours as custom properties first. */
  readonly css: string
  readonly faces: readonly Face[]
  readonly advances: AdvanceTable
  readonly chart: ChartTheme
  readonly paper: Paper
  readonly logo: Logo | null
  readonly cover: boolean
  readonly running: Running
  /** What was read of the account: theme.yaml, logo and font files, relative to its folder. */
  readonly files: readonly string[]
}
