import { MachineFault } from '../faults/fault.ts'
import type { UnpackedBrowser } from './unpack-browser.ts'

/** A browser to start; `libraries` and `fontConfiguration` only where it came packaged. */
export type FoundBrowser = { readonly executable: string } & Partial<UnpackedBrowser>

/** What the search may ask of the machine: passed in, so that a test can describe any machine. */
export interface Machine {
  readonly platform: string
  readonly architecture: string
  /** What the caller asks for: `--browser` or, failing that, the environment variable TARELINE_BROWSER. */
  readonly asked: string | undefined
  /** Where the printing library expects its own pinned browser. */
  readonly pinned: string | undefined
  readonly isProgram: (path: string) => boolean
  readonly unpack: () => Promise<UnpackedBrowser>
}

const installed: Readonly<Record<string, readonly string[]>> = {
  linux: [
    '/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome', '/usr/bin/google-chrome-stable', '/usr/bin/chrome',
    '/opt/google/chrome/chrome', '/usr/bin/microsoft-edge', '/opt/microsoft/msedge/msedge', '/snap/bin/chromium',
  ],
  darwin: [
    '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome', '/Applications/Chromium.app/Contents/MacOS/Chromium',
    '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
  ],
  win32: [
    'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe', 'C:\\Program Files (x86)\\Google\\Chrome\\Application\\chrome.exe',
    'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe', 'C:\\Program Files\\Microsoft\\Edge\\Application\\msedge.exe',
  ],
}

/**
 * The browser to print with: the one asked for; the library's pinned one; the packaged one (Linux, x64); an installed one.
 * A browser that is asked for and not there is a fault, never silently replaced by another.
 *
 * @throws {MachineFault} `browser-missing`, naming everything tried and the mend
 */
export async function findBrowser(machine: Machine): Promise<FoundBrowser> {
  if (machine.asked !== undefined) {
    if (machine.isProgram(machine.asked)) return { executable: machine.asked }
    throw missing([`${machine.asked} (asked for; no such program)`])
  }
  const tried: string[] = []
  if (machine.pinned !== undefined) {
    if (machine.isProgram(machine.pinned)) return { executable: machine.pinned }
    tried.push(machine.pinned)
  }
  const packaged = await packagedBrowser(machine)
  if (typeof packaged !== 'string') return packaged
  tried.push(packaged)
  for (const executable of installed[machine.platform] ?? []) {
    if (machine.isProgram(executable)) return { executable }
    tried.push(executable)
  }
  throw missing(tried)
}

async function packagedBrowser(machine: Machine): Promise<FoundBrowser | string> {
  if (machine.platform !== 'linux' || machine.architecture !== 'x64') return `the packaged Chromium (for linux x64; this is ${machine.platform} ${machine.architecture})`
  try {
    return await machine.unpack()
  } catch (fault) {
    return `the packaged Chromium (could not be unpacked: ${fault instanceof Error ? fault.message : String(fault)})`
  }
}

function missing(tried: readonly string[]): MachineFault {
  return new MachineFault({
    code: 'browser-missing',
    place: 'this machine',
    message: `Unexpected absence of a browser to print with, expected one of: ${tried.join('; ')}.`,
    mend: 'Install Chromium, Chrome or Edge, or name one with --browser PATH or TARELINE_BROWSER=PATH; or build with --no-pdf.',
  })
}
