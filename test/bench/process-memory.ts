import { readdirSync, readFileSync } from 'node:fs'

/** The memory of a process and of all that it has started. */
export interface MemoryWatch {
  /** The largest sum so far, in bytes. */
  peak(): number
}

/**
 * Sample the memory of a process and its children, and theirs, until it has ended: PSS (what several share counts once), or RSS where that can't be
 * read. Linux only.
 */
export function watchMemory(pid: number, everyMs = 200): MemoryWatch {
  let most = 0
  const timer = setInterval(() => {
    const family = familyOf(pid)
    if (family.length === 0) clearInterval(timer)
    most = Math.max(most, family.reduce((sum, each) => sum + bytesOf(each), 0))
  }, everyMs)
  timer.unref()
  return { peak: () => most }
}

function familyOf(pid: number): readonly number[] {
  const parents = new Map(readdirSync('/proc').filter((name) => /^\d+$/.test(name)).flatMap((name) => {
    const stat = read(`/proc/${name}/stat`)
    // proc(5): field 4 after the name in brackets is the parent; Z is a process that has ended
    const [state, parent] = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
    return stat === '' || state === 'Z' ? [] : [[Number(name), Number(parent)] as const]
  }))
  const isOfFamily = (each: number | undefined): boolean => each === pid || (each !== undefined && each > 1 && isOfFamily(parents.get(each)))
  return [...parents.keys()].filter(isOfFamily)
}

function bytesOf(pid: number): number {
  const kilobytes = (text: string, key: string): number => Number(new RegExp(`^${key}:\\s+(\\d+) kB`, 'm').exec(text)?.[1] ?? 0)
  return 1024 * (kilobytes(read(`/proc/${pid}/smaps_rollup`), 'Pss') || kilobytes(read(`/proc/${pid}/status`), 'VmRSS'))
}

function read(file: string): string {
  try {
    return readFileSync(file, 'utf8')
  } catch {
    return ''
  }
}
