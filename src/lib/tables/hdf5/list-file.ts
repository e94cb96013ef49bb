import type { Metadata } from "h5wasm"
import { describeType } from "./describe-type"
import type { Hdf5Dataset, Hdf5Listing } from "./hdf5-protocol"
import type { MountedFile } from "./mounted-file"
import { attributeText } from "./attribute-text"

const DEEPEST = 16
const MOST_OBJECTS = 20_000
const MOST_METADATA = 1000
const MOST_CHUNK_BYTES = 256 * 1024 * 1024
/** Filters that the library has: deflate, shuffle, fletcher32, szip, nbit, scale-offset. */
const filters = new Set([1, 2, 3, 4, 5, 6])
const filterNames = new Map([
  [305, "lzo"],
  [307, "bzip2"],
  [32000, "lzf"],
  [32001, "blosc"],
  [32004, "lz4"],
  [32015, "zstd"],
])

/** Walks through a file and lists what can be read; links are followed once, other files never. */
export function listFile(file: MountedFile): Hdf5Listing {
  const walk = new FileWalk(file)
  walk.group("", 0)
  const { datasets, metadata, problems, notes } = walk
  return { datasets, metadata, problems, notes }
}

type List<Key extends keyof Hdf5Listing> = Hdf5Listing[Key][number][]

class FileWalk {
  readonly datasets: List<"datasets"> = []
  readonly metadata: List<"metadata"> = []
  readonly problems: List<"problems"> = []
  readonly notes: List<"notes"> = []
  /** Address of an object in the file, and the path by which it was met first. */
  readonly #seen = new Map<string, string>()

  constructor(readonly file: MountedFile) {}

  group(path: string, depth: number): void {
    const { library, id } = this.file
    this.#isNew(path)
    this.#attributes(path)
    for (const name of library.get_names(id, `/${path}`, false)) {
      const inside = path === "" ? name : `${path}/${name}`
      const type = library.get_type(id, `/${inside}`)
      if (type === library.H5G_UDLINK) this.problems.push({ code: "hdf5-external", path: inside, values: {} })
      else if (type === library.H5G_LINK) this.problems.push({ code: "hdf5-link", path: inside, values: {} })
      else if (type === library.H5G_GROUP) {
        if (!this.#isNew(inside)) continue
        if (depth >= DEEPEST)
          this.problems.push({ code: "hdf5-depth", path: inside, values: { max: DEEPEST } })
        else this.group(inside, depth + 1)
      } else if (type === library.H5G_DATASET && this.#isNew(inside)) this.#dataset(inside)
      if (this.#seen.size > MOST_OBJECTS) return
    }
  }

  /** Whether an object is met for the first time; another name of it is noted. */
  #isNew(path: string): boolean {
    const { library, id } = this.file
    const key = Buffer.from(library.create_object_reference(id, `/${path}`)).toString("hex")
    const other = this.#seen.get(key)
    if (other === undefined) this.#seen.set(key, path)
    else if (other !== path)
      this.notes.push({ code: "hdf5-link-repeated", values: { name: path, other: other || "/" } })
    return other === undefined
  }

  #attributes(path: string): void {
    const { library, id } = this.file
    for (const name of library.get_attribute_names(id, `/${path}`)) {
      if (this.metadata.length >= MOST_METADATA) return
      const value = attributeText(this.file, path, name)
      if (value !== null)
        this.metadata.push({ key: path === "" ? name : `${path}/${name}`, value, place: path || "/" })
    }
  }

  #dataset(path: string): void {
    const { library, id } = this.file
    const metadata = library.get_dataset_metadata(id, `/${path}`)
    const problem = (code: List<"problems">[number]["code"], values = {}) =>
      this.problems.push({ code, path, values })
    if (metadata.virtual_sources) problem("hdf5-external")
    else if (metadata.shape === null || metadata.shape.includes(0))
      this.notes.push({ code: "empty-dataset", values: { name: path } })
    else {
      const unknown = library.get_dataset_filters(id, `/${path}`).find((filter) => !filters.has(filter.id))
      const type = describeType(library, metadata)
      if (unknown)
        problem("hdf5-filter", {
          filter: filterNames.get(unknown.id) ?? (unknown.name || String(unknown.id)),
        })
      else if (type.kind === "unread") problem("hdf5-type", { type: type.what })
      else if (chunkBytes(metadata) > MOST_CHUNK_BYTES) problem("hdf5-chunk", { max: MOST_CHUNK_BYTES })
      else this.datasets.push(this.#described(path, metadata, type))
    }
  }

  #described(path: string, metadata: Metadata, type: Hdf5Dataset["type"]): Hdf5Dataset {
    const { library, id } = this.file
    const shape = metadata.shape!
    const text = (name: string) => attributeText(this.file, path, name)
    const given = shape.length > 0 ? library.get_dimension_labels(id, `/${path}`) : []
    const named = this.#axisAttribute(path, shape.length)
    const scales = shape.map((_, axis) => library.get_attached_scales(id, `/${path}`, axis)[0] ?? null)
    const scaleNames = scales.map((scale) => (scale === null ? null : library.get_scale_name(id, scale)))
    return {
      path,
      type,
      shape,
      chunks: metadata.chunks,
      unit: text("units") ?? text("unit"),
      longName: text("long_name"),
      symbol: text("symbol"),
      labels: shape.map((_, axis) => given[axis] || scaleNames[axis] || named[axis] || null),
      scales: scales.map((scale) => scale?.replace(/^\//, "") ?? null),
    }
  }

  /** Names of axes as other conventions write them into an attribute of the dataset. */
  #axisAttribute(path: string, axes: number): string[] {
    for (const name of ["_ARRAY_DIMENSIONS", "axes", "dims"]) {
      const names = attributeText(this.file, path, name)?.split(/[,:]\s*|\s+/) ?? []
      if (names.length === axes && names.every((text) => text !== "")) return names
    }
    return []
  }
}

const chunkBytes = ({ chunks, size }: Metadata): number =>
  chunks ? chunks.reduce((product, length) => product * length, size) : 0
