import { expect, test } from "vitest"
import { inTurn, withoutSilence } from "./upload-turns"

test("five uploads run, the sixth waits for one to end", async () => {
  const ends: (() => void)[] = []
  let started = 0
  const uploads = Array.from({ length: 6 }, () =>
    inTurn(() => {
      started += 1
      return new Promise<void>((resolve) => ends.push(resolve))
    }),
  )
  await Promise.resolve()
  expect(started).toBe(5)
  ends[0]!()
  await uploads[0]
  expect(started).toBe(6)
  ends.slice(1).forEach((end) => end())
  await Promise.all(uploads)
})

test("a turn is given back by an upload that fails", async () => {
  for (let n = 0; n < 10; n += 1)
    await expect(inTurn(() => Promise.reject(new Error("cut off")))).rejects.toThrow("cut off")
  await expect(inTurn(() => Promise.resolve("taken"))).resolves.toBe("taken")
})

test("a body that falls silent is given up", async () => {
  async function* body() {
    yield new Uint8Array(3)
    await new Promise(() => {})
  }
  const pieces = withoutSilence(body(), 10)
  expect((await pieces.next()).value).toHaveLength(3)
  await expect(pieces.next()).rejects.toThrow(/No more of the file came/)
})
