import { listFile } from "./list-file"
import { type MountedFile, mountFile } from "./mounted-file"
import type { Hdf5Answer, Hdf5Question } from "./hdf5-protocol"
import { readSlab } from "./read-slab"

// A program of its own: the HDF5 library may loop for ever on a damaged file, or take its process down with it. The
// parent asks one question at a time and kills this process when an answer does not come.

let file: MountedFile | null = null

async function answer(question: Hdf5Question): Promise<Hdf5Answer> {
  try {
    if (question.ask === "list") {
      file = await mountFile(question.path)
      return file ? { listing: listFile(file) } : { failure: "hdf5-damaged", values: {} }
    }
    if (!file) return { failure: "hdf5-damaged", values: {} }
    return readSlab(file, question.path, question.type, question.offset, question.count)
  } catch (error) {
    // The library throws errors of many wordings at any call on a damaged file; they are kept for the log.
    console.error(`${file?.takeErrors() ?? ""}${String(error)}`)
    return { failure: "hdf5-damaged", values: {} }
  }
}

process.on("message", (question: Hdf5Question) => {
  void answer(question).then((reply) => process.send?.(reply))
})
process.on("disconnect", () => process.exit())
