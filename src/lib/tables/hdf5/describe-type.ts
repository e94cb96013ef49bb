import type { Metadata } from "h5wasm"
import type { Hdf5Type } from "./hdf5-protocol"
import type { Hdf5Library } from "./mounted-file"

/** The storage of a dataset, an attribute or a member of a compound, from what the library says of it. */
export function describeType(library: Hdf5Library, metadata: Metadata, nested = false): Hdf5Type {
  const classes = library.H5T_class_t
  const { type, size, signed, vlen } = metadata
  const unread = (what: string): Hdf5Type => ({ kind: "unread", size, what })
  switch (type) {
    case classes.H5T_INTEGER.value:
      return [1, 2, 4, 8].includes(size)
        ? { kind: "number", type: `${signed ? "i" : "u"}${size}`, size }
        : unread(`${8 * size}-bit integer`)
    case classes.H5T_FLOAT.value:
      // Of two bytes there are two kinds, which the library does not tell apart.
      return size === 4 || size === 8
        ? { kind: "number", type: `f${size}`, size }
        : unread(`${8 * size}-bit float`)
    case classes.H5T_STRING.value:
      if (vlen) return nested ? unread("string of variable length in a compound") : { kind: "strings", size }
      return { kind: "bytes", size }
    case classes.H5T_ENUM.value:
      return describeEnum(metadata)
    case classes.H5T_COMPOUND.value:
      return nested ? unread("nested compound") : describeCompound(library, metadata)
    case classes.H5T_VLEN.value:
      return unread("lists of variable length")
    case classes.H5T_ARRAY.value:
      return unread("array as element")
    case classes.H5T_REFERENCE.value:
      return unread("reference")
    case classes.H5T_OPAQUE.value:
      return unread("opaque bytes")
    case classes.H5T_BITFIELD.value:
      return unread("bit field")
    default:
      return unread(`class ${type}`)
  }
}

function describeEnum({ enum_type: enumeration, size, signed }: Metadata): Hdf5Type {
  const names = Object.entries(enumeration?.members ?? {})
  if (![1, 2, 4, 8].includes(size)) return { kind: "unread", size, what: "enumeration" }
  const values = new Map(names)
  // How Python programs write booleans.
  if (names.length === 2 && values.get("FALSE") === 0 && values.get("TRUE") === 1)
    return { kind: "boolean", size }
  return { kind: "enum", type: `${signed ? "i" : "u"}${size}`, size, names }
}

function describeCompound(library: Hdf5Library, { compound_type: compound, size }: Metadata): Hdf5Type {
  const found = compound?.members ?? []
  const mixed = new Set(found.flatMap((member) => byteOrders(library, member))).size > 1
  const members = found.map((member) => ({
    name: member.name,
    offset: member.offset,
    type: describeType(library, member, true),
    littleEndian: !mixed || member.littleEndian,
  }))
  const [re, im] = members
  const isPart = (member: typeof re, name: string) =>
    member?.name === name && member.type.kind === "number" && member.type.type === `f${size / 2}`
  // How Python programs write complex numbers.
  if (members.length === 2 && isPart(re, "r") && isPart(im, "i") && im!.offset === size / 2)
    return { kind: "complex", size }
  return { kind: "compound", size, members }
}

/**
 * Byte orders (true for little-endian) of what a type is made of. The library turns a compound whose members are all
 * big-endian around, and leaves one of mixed orders as the file has it.
 */
function byteOrders(library: Hdf5Library, metadata: Metadata): boolean[] {
  const classes = library.H5T_class_t
  const { type, littleEndian, array_type: element, compound_type: compound } = metadata
  if (element) return byteOrders(library, element)
  if (compound) return compound.members.flatMap((member) => byteOrders(library, member))
  const ordered: number[] = [
    classes.H5T_INTEGER.value,
    classes.H5T_FLOAT.value,
    classes.H5T_ENUM.value,
    classes.H5T_BITFIELD.value,
  ]
  return ordered.includes(type) ? [littleEndian] : []
}
