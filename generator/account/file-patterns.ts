import { readdir, realpath, stat } from 'node:fs/promises'
import path from 'node:path'

export type Found =
  | { readonly kind: 'files'; readonly files: readonly string[] }
  | { readonly kind: 'none' }
  /** The pattern or a match of it leaves the folder. */
  | { readonly kind: 'outside'; readonly path: string }

/**
 * The files inside a folder that a pattern matches: `*` and `?` inside a name, `**` for any folders between.
 *
 * @param folder - absolute, links resolved
 * @param pattern - relative, with forward slashes
 * @returns paths relative to the folder with forward slashes, sorted by code unit; names that begin with a dot only if the pattern's do
 */
export async function findFiles(folder: string, pattern: string): Promise<Found> {
  const parts = pattern.split('/').filter((part) => part !== '' && part !== '.')
  if (path.isAbsolute(pattern) || /^[A-Za-z]:|\\|\0/.test(pattern) || parts.includes('..')) return { kind: 'outside', path: pattern }
  const files = (await walk(folder, '', parts)).sort((a, b) => (a < b ? -1 : 1))
  for (const file of files) {
    const real = await realpath(path.join(folder, file))
    if (!real.startsWith(folder + path.sep)) return { kind: 'outside', path: file }
  }
  return files.length === 0 ? { kind: 'none' } : { kind: 'files', files: [...new Set(files)] }
}

/** Whether a path is a folder inside the account folder. */
export async function findFolder(folder: string, name: string): Promise<Found> {
  const target = path.resolve(folder, name)
  if (path.isAbsolute(name) || !target.startsWith(folder + path.sep)) return { kind: 'outside', path: name }
  const info = await stat(target).catch(() => undefined)
  if (!info?.isDirectory()) return { kind: 'none' }
  return (await realpath(target)).startsWith(folder + path.sep) ? { kind: 'files', files: [name] } : { kind: 'outside', path: name }
}

async function walk(folder: string, inside: string, parts: readonly string[]): Promise<string[]> {
  const [part, ...rest] = parts
  if (part === undefined) return []
  const entries = await readdir(path.join(folder, inside)).catch(() => [])
  const found: string[] = part === '**' ? await walk(folder, inside, rest) : []
  const matcher = nameMatcher(part === '**' ? '*' : part)
  for (const name of entries.filter((entry) => matcher.test(entry))) {
    const relative = inside === '' ? name : `${inside}/${name}`
    const info = await stat(path.join(folder, relative)).catch(() => undefined)
    if (part === '**') {
      // A link could lead back up: `**` follows folders only.
      const real = info?.isDirectory() === true && await realpath(path.join(folder, relative)) === path.join(folder, relative)
      if (real) found.push(...await walk(folder, relative, parts))
    } else if (rest.length === 0) {
      if (info?.isFile() === true) found.push(relative)
    } else if (info?.isDirectory() === true) found.push(...await walk(folder, relative, rest))
  }
  return found
}

function nameMatcher(pattern: string): RegExp {
  const body = pattern.replace(/[.+^${}()|[\]]/g, '\\$&').replace(/\*+/g, '[^/]*').replace(/\?/g, '[^/]')
  return new RegExp(`^${/^[*?]/.test(pattern) ? '(?!\\.)' : ''}${body}$`, 'u')
}
