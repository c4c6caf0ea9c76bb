import { readFile } from 'node:fs/promises'
import { hostname } from 'node:os'

/** Of a process: its number, the machine's name, and what `processStart` said of it. */
export interface NotedProcess {
  readonly pid: number
  readonly host: string
  readonly started: string | null
}

/**
 * When a process of this machine began, as a mark that no later process of the same number has: numbers are given again, after a restart of the machine
 * or of a container often the same ones.
 *
 * @returns null where the system does not tell (it does on Linux)
 */
export async function processStart(pid: number): Promise<string | null> {
  try {
    const [boot, stat] = await Promise.all([readFile('/proc/sys/kernel/random/boot_id', 'utf8'), readFile(`/proc/${pid}/stat`, 'utf8')])
    // proc(5): field 22, in clock ticks since the machine was started; the name before it may hold anything, and ends with the last bracket
    return `${boot.trim()} ${stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19]}`
  } catch {
    return null
  }
}

/** Whether a process has ended; of one on another machine that can't be known: it counts as running. */
export async function isGone({ pid, host, started }: NotedProcess): Promise<boolean> {
  if (host !== hostname()) return false
  if (!isRunning(pid)) return true
  const now = await processStart(pid)
  return started !== null && now !== null && now !== started
}

function isRunning(pid: number): boolean {
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    // one of another user may not be asked, and is there
    return (error as NodeJS.ErrnoException).code !== 'ESRCH'
  }
}
