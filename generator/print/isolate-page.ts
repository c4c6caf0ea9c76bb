import type { Browser, Page } from 'puppeteer'

/**
 * A page in a fresh context that can reach nothing: no script, offline, every request refused but the data: addresses inside the file itself.
 * The browser was started without names and with a dead proxy, and the HTML carries its own policy: each measure alone leaks something.
 *
 * @returns the page, and every address that it asked for and did not get
 */
export async function isolatedPage(browser: Browser): Promise<{ readonly page: Page, readonly refused: readonly string[] }> {
  const context = await browser.createBrowserContext()
  const page = await context.newPage()
  const refused: string[] = []
  await page.setJavaScriptEnabled(false)
  await page.setOfflineMode(true)
  await page.setRequestInterception(true)
  page.on('request', (request) => {
    if (request.url().startsWith('data:')) { void request.continue(); return }
    refused.push(request.url())
    void request.abort('blockedbyclient')
  })
  return { page, refused }
}
