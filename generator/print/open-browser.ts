import { accessSync, constants } from 'node:fs'
import { createRequire } from 'node:module'
import { homedir } from 'node:os'
import { join } from 'node:path'
import type * as Puppeteer from 'puppeteer'
import type { Browser } from 'puppeteer'
import { faultOf } from '../faults/catalogue.ts'
import { MachineFault } from '../faults/fault.ts'
import { findBrowser, type FoundBrowser, type Machine } from './find-browser.ts'
import { browserPackage, unpackBrowser } from './unpack-browser.ts'

export interface BrowserOptions {
  /** Path of a browser to use instead of looking for one. */
  readonly browser?: string | undefined
}

/**
 * Start a browser for printing. It dies with this process; close it with `browser.close()`.
 *
 * @throws {MachineFault} `browser-missing`, `browser-does-not-start` or `printer-unusable`, each with what to do
 */
export async function openBrowser(options: BrowserOptions = {}): Promise<Browser> {
  const puppeteer = printingLibrary()
  const found = await findBrowser(thisMachine(options, puppeteer))
  try {
    return await puppeteer.launch({
      executablePath: found.executable,
      headless: /headless-shell|chromium-\d/.test(found.executable) ? 'shell' : true,
      pipe: true,
      // signals are the command line's: it abandons the draft first; with the process the pipe ends, and with the pipe the browser
      handleSIGINT: false, handleSIGTERM: false, handleSIGHUP: false,
      env: environment(found),
      args: launchArguments(),
    })
  } catch (fault) {
    throw doesNotStart(found.executable, fault instanceof Error ? fault.message : String(fault))
  }
}

/**
 * Loaded when something is printed: it looks for settings in the folders above and at home, which a machine may not let it. Required and
 * not imported: an import that fails halfway rejects a second time, where nobody can catch it.
 */
function printingLibrary(): typeof Puppeteer {
  try {
    return createRequire(import.meta.url)('puppeteer') as typeof Puppeteer
  } catch (error) {
    throw new MachineFault(faultOf('printer-unusable', 'this machine', { reason: error instanceof Error ? error.message.split('\n')[0]! : String(error) }))
  }
}

function thisMachine(options: BrowserOptions, puppeteer: typeof Puppeteer): Machine {
  const asked = options.browser ?? process.env.TARELINE_BROWSER
  return {
    platform: process.platform,
    architecture: process.arch,
    asked: asked === '' ? undefined : asked,
    pinned: pinnedBrowser(puppeteer),
    isProgram,
    unpack: async () => unpackBrowser(await browserPackage(), cacheFolder()),
  }
}

function cacheFolder(): string {
  const stated = process.env.XDG_CACHE_HOME
  return stated === undefined || stated === '' ? join(homedir(), '.cache') : stated
}

function pinnedBrowser(puppeteer: typeof Puppeteer): string | undefined {
  try {
    return puppeteer.executablePath()
  } catch {
    return undefined
  }
}

function isProgram(path: string): boolean {
  try {
    accessSync(path, constants.X_OK)
    return true
  } catch {
    return false
  }
}

function environment(found: FoundBrowser): Record<string, string | undefined> {
  return {
    ...process.env,
    TZ: 'UTC',
    ...(found.libraries === undefined ? {} : { LD_LIBRARY_PATH: found.libraries }),
    ...(found.fontConfiguration === undefined ? {} : { FONTCONFIG_FILE: found.fontConfiguration }),
  }
}

function launchArguments(): string[] {
  return [
    // Hinting rounds advance widths, by up to a tenth, differently from machine to machine.
    '--font-render-hinting=none',
    '--disable-gpu',
    // No name resolves and every connection goes to a port where nobody listens, the loopback ones included.
    '--host-resolver-rules=MAP * ~NOTFOUND',
    '--proxy-server=http://127.0.0.1:9',
    '--proxy-bypass-list=<-loopback>',
    // Chromium refuses its sandbox to root. Pages are this program's own, without script and network; everyone else keeps the sandbox.
    ...(process.getuid?.() === 0 ? ['--no-sandbox'] : []),
  ]
}

function doesNotStart(executable: string, said: string): MachineFault {
  const noSandbox = /no usable sandbox/i.test(said)
  return new MachineFault({
    code: 'browser-does-not-start',
    place: executable,
    message: `Unexpected end of ${executable} while starting, expected a browser: ${said.split('\n').slice(0, 4).join(' ').trim()}.`,
    mend: noSandbox
      ? 'Its sandbox needs user namespaces, which are off here: ask for kernel.unprivileged_userns_clone=1, or name another browser with --browser PATH.'
      : 'Name another browser with --browser PATH or TARELINE_BROWSER=PATH, or build with --no-pdf.',
  })
}
