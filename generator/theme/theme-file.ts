import { isUtf8 } from 'node:buffer'
import { z } from 'zod'
import { describe, type KnownKeys, shapeFaults, unknownKey } from '../account/shape-faults.ts'
import { type KeyPath, placeOf, readPlacedYaml } from '../account/yaml-places.ts'
import { faultOf } from '../faults/catalogue.ts'
import { themeExpectations as expected } from '../faults/catalogue-theme.ts'
import { type Fault, InputFault } from '../faults/fault.ts'
import { type NamedFile, readBounded } from './bounded-file.ts'
import { type GivenColours, givenRoles } from './palette.ts'
import { longestRunning, readRunning, type RunningText, runningPlaces } from './running-text.ts'
import { shippedNames } from './typeface/shipped.ts'

/** Unquoted, it would be a comment to YAML, and nothing. */
const colour = z.custom<string>((given) => typeof given === 'string' && /^#[0-9a-fA-F]{6}$/.test(given), expected.colour).transform((given) => given.toLowerCase())
const text = z.string().trim().min(1, 'text')
const running = z.string().transform((given, context): RunningText => {
  const parts = readRunning(given)
  if (parts === null) context.addIssue({ code: 'custom', message: expected.running(longestRunning, runningPlaces) })
  return parts ?? []
}).optional()

/** The shape of an account's theme.yaml, key by key; what a colour has to reach is in palette-faults.ts. */
const themeShape = {
  colours: z.strictObject(Object.fromEntries(givenRoles.map((role) => [role, colour.optional()])) as Record<typeof givenRoles[number], z.ZodOptional<typeof colour>>).default({}),
  logo: z.strictObject({
    file: text,
    alt: text.refine((given) => given.length <= 200 && !/\p{Cc}/u.test(given), expected.alt),
    height_mm: z.number().min(5, expected.height).max(30, expected.height).default(12),
  }).optional(),
  typeface: z.enum(shippedNames).default('source-sans-3'),
  paper: z.enum(['A4', 'letter']).default('A4'),
  cover: z.boolean().default(false),
  running: z.strictObject({ head: running, foot: running }).default({}),
}
const fontFiles = z.strictObject({ regular: text, semibold: text.optional(), bold: text })

type ThemeKey = keyof typeof themeShape
const themeKeys = Object.keys(themeShape) as readonly ThemeKey[]
const knownKeys: KnownKeys = {
  colours: givenRoles, logo: ['file', 'alt', 'height_mm'], typeface: ['regular', 'semibold', 'bold'], running: ['head', 'foot'],
}

type Entries = { readonly [K in Exclude<ThemeKey, 'typeface'>]: z.output<(typeof themeShape)[K]> } & { readonly typeface: z.output<typeof themeShape.typeface> | z.output<typeof fontFiles> }

/** theme.yaml of an account, checked, with every default filled in. */
export interface ThemeFile {
  readonly entries: Entries
  readonly colours: GivenColours
  /** Where a key stands, e.g. `theme.yaml:3:11 colours.accent`; where it was left out, the nearest thing around it. */
  readonly placeOf: (path: KeyPath) => string
}

/** What a theme says where an account has none. */
export const noThemeFile: ThemeFile = soundFile({}, {}, 'theme.yaml')

const mostBytes = 64_000

/**
 * Read theme.yaml of an account.
 *
 * @throws {InputFault} with every fault that the file has in itself
 */
export async function readThemeFile(file: NamedFile): Promise<ThemeFile> {
  const bytes = await readBounded(file, ['.yaml', '.yml'], mostBytes)
  if (!isUtf8(bytes)) throw new InputFault([faultOf('account-unreadable', file.path, { reason: 'bytes that are not UTF-8' })])
  const { value, places, faults } = readPlacedYaml(Buffer.from(bytes).toString('utf8').replace(/^\uFEFF/, ''), file.path)
  if (faults.length > 0) throw new InputFault(faults)
  if (value === null || typeof value !== 'object' || Array.isArray(value)) throw new InputFault([faultOf('account-value', file.path, { actual: describe(value), expected: 'a map of keys' })])
  return soundFile(value as Readonly<Record<string, unknown>>, places, file.path)
}

function soundFile(given: Readonly<Record<string, unknown>>, places: Readonly<Record<string, string>>, file: string): ThemeFile {
  const faults: Fault[] = Object.keys(given).filter((key) => !themeKeys.includes(key as ThemeKey)).map((key) => unknownKey([key], themeKeys, places))
  const entries: Record<string, unknown> = {}
  for (const key of themeKeys) {
    const isFiles = key === 'typeface' && typeof given[key] === 'object' && given[key] !== null
    const result = (isFiles ? fontFiles : themeShape[key]).safeParse(given[key])
    if (result.success) entries[key] = result.data
    else faults.push(...result.error.issues.flatMap((issue) => shapeFaults(issue, [key], given[key], places, knownKeys)))
  }
  if (faults.length > 0) throw new InputFault(faults)
  const sound = entries as unknown as Entries
  return {
    entries: sound,
    colours: Object.fromEntries(Object.entries(sound.colours).filter(([, value]) => value !== undefined)),
    placeOf: (path) => (Object.hasOwn(places, path[0] ?? '') ? placeOf(places, path) : file),
  }
}
