import { createReadStream, createWriteStream } from 'node:fs'
import { access, chmod, mkdir, mkdtemp, readFile, rename, rm, writeFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'
import { pipeline } from 'node:stream/promises'
import { createBrotliDecompress } from 'node:zlib'
import { extract } from 'tar-fs'

/** A browser that runs from a folder of its own: the program, the libraries that it needs and its font configuration. */
export interface UnpackedBrowser {
  readonly executable: string
  readonly libraries: string
  readonly fontConfiguration: string
}

/** Where the package keeps its compressed files, and its version. */
export interface BrowserPackage {
  readonly files: string
  readonly version: string
}

/** The packaged Chromium among the installed dependencies. */
export async function browserPackage(): Promise<BrowserPackage> {
  const entry = createRequire(import.meta.url).resolve('@sparticuz/chromium')
  const root = join(dirname(entry), '..', '..')
  const manifest = JSON.parse(await readFile(join(root, 'package.json'), 'utf8')) as { readonly version: string }
  return { files: join(root, 'bin'), version: manifest.version }
}

/**
 * Unpack the packaged Chromium into a versioned folder below `cache`, once; later calls find it there.
 * It is unpacked into a folder of a random name and moved into place, so that two runs at once or a run cut short leave no half of a browser.
 *
 * @param cache - the user's own cache folder: nobody else can put a program there
 * @throws {Error} from the file system: no space, no right to write
 */
export async function unpackBrowser(source: BrowserPackage, cache: string): Promise<UnpackedBrowser> {
  const folder = join(cache, 'tareline', `chromium-${source.version}`)
  const unpacked = { executable: join(folder, 'chromium'), libraries: join(folder, 'lib'), fontConfiguration: join(folder, 'fonts.conf') }
  if (await isThere(folder)) return unpacked
  await mkdir(dirname(folder), { recursive: true })
  const half = await mkdtemp(`${folder}-`)
  try {
    await fill(half, source.files, folder)
    await rename(half, folder)
  } catch (fault) {
    await rm(half, { recursive: true, force: true })
    // Another run may have moved its own into place meanwhile: then there is a browser, and nothing is wrong.
    if (!await isThere(folder)) throw fault
  }
  return unpacked
}

async function fill(half: string, files: string, folder: string): Promise<void> {
  const executable = join(half, 'chromium')
  await pipeline(createReadStream(join(files, 'chromium.br')), createBrotliDecompress(), createWriteStream(executable))
  await chmod(executable, 0o755)
  for (const archive of ['al2023.tar.br', 'fonts.tar.br']) {
    await pipeline(createReadStream(join(files, archive)), createBrotliDecompress(), extract(half, { chown: false }))
  }
  await writeFile(join(half, 'fonts.conf'), fontConfiguration(folder))
}

/** Only the faces that came along: what is installed on the machine shall not show in a review. */
function fontConfiguration(folder: string): string {
  return `<?xml version="1.0"?>
<!DOCTYPE fontconfig SYSTEM "fonts.dtd">
<fontconfig>
  <dir>${join(folder, 'fonts')}</dir>
  <cachedir>${join(folder, 'font-cache')}</cachedir>
</fontconfig>
`
}

async function isThere(path: string): Promise<boolean> {
  return access(path).then(() => true, () => false)
}
