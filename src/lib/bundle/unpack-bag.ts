import { open } from "node:fs/promises"
import path from "node:path"
import { pipeline } from "node:stream/promises"
import yauzl from "yauzl"

/** A bag on disk: its files by their path in the bag. */
export interface UnpackedBag {
  /** The one folder at the top of the archive. */
  readonly name: string
  readonly files: ReadonlyMap<string, string>
}

/** An archive that is no bundle; the message says why, and at which entry. */
export class BagError extends Error {}

/**
 * Unpacks a bundle into an empty folder, file by file, whatever its size.
 *
 * @throws BagError for an archive that is damaged, or whose entries are not files below one folder
 */
export async function unpackBag(zip: string, folder: string): Promise<UnpackedBag> {
  const files = new Map<string, string>()
  const names = new Set<string>()
  let at = "the archive"
  try {
    const archive = await yauzl.openPromise(zip, { strictFileNames: true, lazyEntries: true })
    for await (const entry of archive.eachEntry()) {
      at = entry.fileName
      const [name, ...rest] = entry.fileName.split("/")
      const inBag = rest.join("/")
      if (!name || inBag === "" || inBag.endsWith("/")) throw new BagError("is not a file below one folder")
      if (files.has(inBag)) throw new BagError("is in the archive twice")
      names.add(name)
      const file = path.join(folder, String(files.size))
      files.set(inBag, file)
      const input = await archive.openReadStreamPromise(entry)
      // Opened before anything flows: a damaged entry must not leave an opening behind that fails later, unheard.
      await pipeline(input, (await open(file, "wx")).createWriteStream())
    }
  } catch (error) {
    throw new BagError(`${at}: ${(error as Error).message}`, { cause: error })
  }
  const [name, ...others] = names
  if (name === undefined || others.length > 0)
    throw new BagError(`A bundle has one folder at its top; this archive has ${names.size}.`)
  return { name, files }
}
