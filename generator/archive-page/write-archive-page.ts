import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { Disk } from '../archive/disk.ts'
import { unfinishedPrefix } from '../archive/read-archive.ts'
import { loadCharts } from '../render/load-charts.ts'
import { archivePage, type PageLooks } from './archive-page.ts'
import { readReviews } from './read-reviews.ts'

export const archivePageName = 'index.html'

/**
 * Make the page of an archive anew and put it in place whole: written beside, flushed, renamed. It is no part of the chain of seals: `verify` does not look at it.
 *
 * @param archive - folder of the archive, with at least one seal in it
 * @param templates - the program's; the page's own parts are in `archive`
 * @throws {Error} from the file system; the page that was there before then still is
 */
export async function writeArchivePage(archive: string, templates: string, looks: Omit<PageLooks, 'charts' | 'css'>, disk: Disk): Promise<void> {
  const own = join(templates, 'archive')
  const [reviews, charts, css] = await Promise.all([readReviews(archive), loadCharts(own), readFile(join(own, 'archive.css'), 'utf8')])
  const html = await archivePage(reviews, { ...looks, charts, css })
  const beside = join(archive, `${unfinishedPrefix}${archivePageName}`)
  await disk.remove(beside)
  await disk.write(beside, html)
  await disk.rename(beside, join(archive, archivePageName))
}
