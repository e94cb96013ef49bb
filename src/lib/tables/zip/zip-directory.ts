import { IntakeRefusal } from "../intake-codes"
import type { IntakeLimits } from "../intake-limits"
import type { ByteSource } from "../source/byte-source"

export interface ZipEntry {
  readonly name: string
  readonly encrypted: boolean
  /** 0 stored, 8 deflated. */
  readonly method: number
  readonly crc: number
  readonly packedSize: number
  readonly size: number
  /** Byte of its local header. */
  readonly headerAt: number
  /** Byte of its data. */
  readonly dataAt: number
}

const END = 0x06054b50
const END_64_LOCATOR = 0x07064b50
const END_64 = 0x06064b50
const CENTRAL = 0x02014b50
const LOCAL = 0x04034b50
const END_LENGTH = 22
const LONGEST_COMMENT = 0xffff

const damaged = (place: string) => new IntakeRefusal("zip-damaged", { place })

/**
 * Lists the entries of an archive from its central directory, which alone can be trusted for sizes, and checks that none
 * of them overlap and that all fit the limits before anything is unpacked. Names never become paths.
 *
 * @throws IntakeRefusal zip-damaged, zip-too-many, inflate-limit
 * @see PKWARE .ZIP File Format Specification 6.3.10, sections 4.3 and 4.4
 */
export async function zipDirectory(source: ByteSource, limits: IntakeLimits): Promise<ZipEntry[]> {
  const { count, at, length } = await directoryPlace(source)
  if (count > limits.maxArchiveEntries)
    throw new IntakeRefusal("zip-too-many", { n: count, max: limits.maxArchiveEntries })
  if (at + length > source.size || length > limits.maxBytes) throw damaged("the directory")
  const directory = Buffer.from(await source.read(at, length))
  const entries: Omit<ZipEntry, "dataAt">[] = []
  for (let offset = 0, index = 0; index < count; index++) {
    if (offset + 46 > directory.length || directory.readUInt32LE(offset) !== CENTRAL)
      throw damaged(`entry ${index + 1} of the directory`)
    const nameLength = directory.readUInt16LE(offset + 28)
    const extraLength = directory.readUInt16LE(offset + 30)
    const commentLength = directory.readUInt16LE(offset + 32)
    const end = offset + 46 + nameLength + extraLength + commentLength
    if (end > directory.length) throw damaged(`entry ${index + 1} of the directory`)
    entries.push(centralEntry(directory, offset, nameLength, extraLength))
    offset = end
  }
  const total = entries.reduce((sum, { size }) => sum + size, 0)
  if (total > limits.maxBytes) throw new IntakeRefusal("inflate-limit", { max: limits.maxBytes })
  return withDataPlaces(source, entries, at)
}

async function directoryPlace(source: ByteSource): Promise<{ count: number; at: number; length: number }> {
  const tailAt = Math.max(0, source.size - END_LENGTH - LONGEST_COMMENT)
  const tail = Buffer.from(await source.read(tailAt, source.size - tailAt))
  let end = tail.length - END_LENGTH
  while (end >= 0 && tail.readUInt32LE(end) !== END) end--
  if (end < 0) throw damaged("its end")
  const plain = {
    count: tail.readUInt16LE(end + 10),
    length: tail.readUInt32LE(end + 12),
    at: tail.readUInt32LE(end + 16),
  }
  if (plain.count !== 0xffff && plain.length !== 0xffffffff && plain.at !== 0xffffffff) return plain
  if (end < 20 || tail.readUInt32LE(end - 20) !== END_64_LOCATOR) return plain
  const recordAt = safe(tail.readBigUInt64LE(end - 12))
  const record = Buffer.from(await source.read(recordAt, 56))
  if (record.length < 56 || record.readUInt32LE(0) !== END_64) throw damaged("its end")
  return {
    count: safe(record.readBigUInt64LE(32)),
    length: safe(record.readBigUInt64LE(40)),
    at: safe(record.readBigUInt64LE(48)),
  }
}

function safe(value: bigint): number {
  if (value > BigInt(Number.MAX_SAFE_INTEGER)) throw damaged("its end")
  return Number(value)
}

function centralEntry(
  directory: Buffer,
  at: number,
  nameLength: number,
  extraLength: number,
): Omit<ZipEntry, "dataAt"> {
  const flags = directory.readUInt16LE(at + 8)
  const name = directory.subarray(at + 46, at + 46 + nameLength).toString("utf8")
  const sizes = {
    size: directory.readUInt32LE(at + 24),
    packedSize: directory.readUInt32LE(at + 20),
    headerAt: directory.readUInt32LE(at + 42),
  }
  const extra = directory.subarray(at + 46 + nameLength, at + 46 + nameLength + extraLength)
  return {
    name,
    encrypted: (flags & 1) !== 0,
    method: directory.readUInt16LE(at + 10),
    crc: directory.readUInt32LE(at + 16),
    ...wideSizes(sizes, extra),
  }
}

/** Sizes of four bytes that are all ones stand in the zip64 field, in this order. */
function wideSizes(sizes: { size: number; packedSize: number; headerAt: number }, extra: Buffer) {
  for (let at = 0; at + 4 <= extra.length; at += 4 + extra.readUInt16LE(at + 2)) {
    if (extra.readUInt16LE(at) !== 1) continue
    let next = at + 4
    const wide = (value: number): number => {
      if (value !== 0xffffffff) return value
      if (next + 8 > extra.length) throw damaged("a zip64 field")
      next += 8
      return safe(extra.readBigUInt64LE(next - 8))
    }
    const size = wide(sizes.size)
    const packedSize = wide(sizes.packedSize)
    return { size, packedSize, headerAt: wide(sizes.headerAt) }
  }
  return sizes
}

async function withDataPlaces(
  source: ByteSource,
  entries: readonly Omit<ZipEntry, "dataAt">[],
  directoryAt: number,
): Promise<ZipEntry[]> {
  const placed: ZipEntry[] = []
  for (const entry of entries) {
    const header = Buffer.from(await source.read(entry.headerAt, 30))
    if (header.length < 30 || header.readUInt32LE(0) !== LOCAL) throw damaged(entry.name)
    placed.push({
      ...entry,
      dataAt: entry.headerAt + 30 + header.readUInt16LE(26) + header.readUInt16LE(28),
    })
  }
  let end = 0
  for (const entry of [...placed].sort((a, b) => a.headerAt - b.headerAt)) {
    if (entry.headerAt < end) throw damaged(entry.name)
    end = entry.dataAt + entry.packedSize
    if (end > directoryAt) throw damaged(entry.name)
  }
  return placed
}
