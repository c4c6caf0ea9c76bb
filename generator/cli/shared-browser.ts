import type { Browser } from 'puppeteer'
import { openBrowser } from '../print/open-browser.ts'

/** One browser for all that a command prints. */
export interface SharedBrowser {
  /** Started when it is first asked for, and again should it have died. */
  readonly open: () => Promise<Browser>
  close(): Promise<void>
}

/** @param browser - file of the browser; absent: the first that is found */
export function sharedBrowser(browser: string | undefined): SharedBrowser {
  let opened: Promise<Browser> | undefined
  const open = async (before: Promise<Browser> | undefined): Promise<Browser> => {
    const running = await before
    return running?.connected === true ? running : openBrowser({ browser })
  }
  return {
    open: () => (opened = open(opened)),
    close: async () => { await opened?.then((running) => running.close(), () => undefined) },
  }
}
