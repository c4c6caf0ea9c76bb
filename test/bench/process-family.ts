import { readdirSync, readFileSync } from 'node:fs'

/** What a process and all that it has started have used. */
export interface FamilyUse {
  /** The largest sum of memory at any sample, in bytes: PSS (what several share counts once), or RSS where that can't be read. */
  readonly bytes: number
  /** Time on processors, of all together. */
  readonly processorSeconds: number
}

/** proc(5) counts in these; 100 a second on every Linux that node runs on. */
const ticks = 100

/**
 * Sample a process, its children, and theirs, until it has ended. Linux only.
 *
 * @returns asks what was seen so far
 */
export function watchFamily(pid: number, everyMs = 200): () => FamilyUse {
  const used = new Map<number, number>()
  let bytes = 0
  const timer = setInterval(() => {
    const family = familyOf(pid)
    if (family.size === 0) clearInterval(timer)
    for (const [each, seconds] of family) used.set(each, seconds)
    bytes = Math.max(bytes, [...family.keys()].reduce((sum, each) => sum + bytesOf(each), 0))
  }, everyMs)
  timer.unref()
  return () => ({ bytes, processorSeconds: [...used.values()].reduce((sum, seconds) => sum + seconds, 0) })
}

/** Those of the family that run, and the processor seconds of each. */
function familyOf(pid: number): ReadonlyMap<number, number> {
  const all = new Map(readdirSync('/proc').filter((name) => /^\d+$/.test(name)).flatMap((name) => {
    const stat = read(`/proc/${name}/stat`)
    // proc(5): after the name in brackets the state (Z: ended), the parent, and as 14th and 15th fields user and system time
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
    return stat === '' || fields[0] === 'Z' ? [] : [[Number(name), { parent: Number(fields[1]), seconds: (Number(fields[11]) + Number(fields[12])) / ticks }] as const]
  }))
  const isOfFamily = (each: number | undefined): boolean => each === pid || (each !== undefined && each > 1 && isOfFamily(all.get(each)?.parent))
  return new Map([...all].filter(([each]) => isOfFamily(each)).map(([each, { seconds }]) => [each, seconds]))
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
