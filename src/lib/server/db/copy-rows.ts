import type { PoolClient } from "pg"
import { to as copyTo } from "pg-copy-streams"

/** Takes exact numbers of bytes from a stream of pieces of any size. */
class ByteTaker {
  private readonly pieces: AsyncIterator<Buffer>
  private waiting: Buffer[] = []
  private length = 0

  constructor(source: AsyncIterable<Buffer>) {
    this.pieces = source[Symbol.asyncIterator]()
  }

  async take(n: number): Promise<Buffer> {
    while (this.length < n) {
      const { done, value } = await this.pieces.next()
      if (done) throw new Error("The database ended a COPY in the middle of a row.")
      this.waiting.push(value)
      this.length += value.length
    }
    const [first] = this.waiting
    const all = first && first.length >= n ? first : Buffer.concat(this.waiting, this.length)
    this.waiting = first === all ? this.waiting.slice(1) : []
    if (all.length > n) this.waiting.unshift(all.subarray(n))
    this.length -= n
    return all.subarray(0, n)
  }

  /** Reads to the end, so that the connection can be used again. */
  async drain(): Promise<void> {
    while (!(await this.pieces.next()).done);
  }
}

/** 11 bytes of signature, 4 of flags, 4 with the length of an extension that there is none of. */
const headerBytes = 19

/**
 * The rows of a query as bytes, through COPY in its binary format: for bytea three to four times as fast as a query,
 * whose answer is hexadecimal text. A field is null or its bytes.
 *
 * @param query SQL without parameters; COPY takes none, so nothing from outside may stand in it
 * @see PostgreSQL manual, COPY, "Binary Format"
 */
export async function* copyRows(client: PoolClient, query: string): AsyncGenerator<(Buffer | null)[]> {
  const bytes = new ByteTaker(client.query(copyTo(`copy (${query}) to stdout (format binary)`)))
  await bytes.take(headerBytes)
  for (;;) {
    const fields = (await bytes.take(2)).readInt16BE()
    if (fields < 0) break
    const row: (Buffer | null)[] = []
    for (let field = 0; field < fields; field += 1) {
      const length = (await bytes.take(4)).readInt32BE()
      row.push(length < 0 ? null : await bytes.take(length))
    }
    yield row
  }
  await bytes.drain()
}
