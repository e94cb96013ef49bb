/** Takes a stream of pieces apart into the lengths that a format wants. */
export class PieceReader {
  readonly #pieces: AsyncIterator<Uint8Array>
  #piece = new Uint8Array(0)
  #at = 0

  constructor(pieces: AsyncIterable<Uint8Array>) {
    this.#pieces = pieces[Symbol.asyncIterator]()
  }

  /** The next bytes, fewer than asked for only at the end of the stream. The bytes are the caller's. */
  async take(length: number): Promise<Buffer> {
    const taken = Buffer.allocUnsafe(length)
    return taken.subarray(0, await this.fill(taken))
  }

  /** Fills a buffer with the next bytes; returns how many there were. */
  async fill(buffer: Uint8Array): Promise<number> {
    let filled = 0
    while (filled < buffer.length) {
      if (this.#at === this.#piece.length) {
        const next = await this.#pieces.next()
        if (next.done) break
        this.#piece = next.value as Uint8Array<ArrayBuffer>
        this.#at = 0
        continue
      }
      const part = this.#piece.subarray(this.#at, this.#at + buffer.length - filled)
      buffer.set(part, filled)
      filled += part.length
      this.#at += part.length
    }
    return filled
  }

  /** Reads to the end and returns how many bytes were left. */
  async drain(): Promise<number> {
    let left = this.#piece.length - this.#at
    for (let next = await this.#pieces.next(); !next.done; next = await this.#pieces.next())
      left += next.value.length
    this.#at = this.#piece.length
    return left
  }

  /** Tells the stream that no more is wanted. */
  async close(): Promise<void> {
    await this.#pieces.return?.()
  }
}
