export interface ReplyOptions {
  /** Differs from the contract's, for instance 200 where the same bytes were there before. */
  readonly status?: number
  readonly headers?: Readonly<Record<string, string>>
  /** Revision that If-Match has to name in the next change. */
  readonly revision?: number
}

/** An answer with more to it than its data; made by `reply`. */
export class Reply<Data> {
  constructor(
    readonly data: Data,
    readonly options: ReplyOptions,
  ) {}
}

/** What a handler returns when its answer needs an ETag, other headers or another status. */
export function reply<Data>(data: Data, options: ReplyOptions): Reply<Data> {
  return new Reply(data, options)
}
