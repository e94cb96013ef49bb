/** note: how it was read. problem: seen before accepting. ask: no default, answered first. refuse: nothing is read. */
export type Severity = "note" | "problem" | "ask" | "refuse"

interface IntakeCode {
  readonly severity: Severity
  /** What the user reads; {names} are filled in by {@link sentence}. */
  readonly sentence: string
}

/** Every code that reading a table can give: stable identifiers with their sentences. docs/intake.md lists the rules. */
export const intakeCodes = {
  // The file as a whole
  "file-too-large": refuse("The file has {n} bytes; the limit is {max}. Nothing was stored."),
  "empty-file": refuse("The file has no bytes."),
  "header-only": refuse("A header ({names}) but no data row."),
  "no-table": refuse("No table was found in the file."),
  "too-many-cells": refuse("This is {n} cells; the limit is {max}. Nothing was stored."),
  "too-many-columns": refuse("There are more than {max} columns{place}. Nothing was stored."),
  "line-too-long": refuse("Line {line} is longer than {max} bytes. Nothing was stored."),
  "too-much-text": refuse("{max} bytes of text in 65,536 rows is the limit. Nothing was stored."),
  "recipe-mismatch": refuse("The recipe describes {k} columns; the file has {n}."),
  "line-account": refuse("{n} of {max} lines are accounted for; the reader is wrong. Nothing was stored."),
  "format-by-content": problem("The name says {named}; the content is {format} and was read as such."),

  // Compression and archives
  gzip: note("Unpacked with gzip."),
  "gzip-nested": refuse("An archive inside an archive is not unpacked."),
  "gzip-damaged": refuse(
    "The compressed data is damaged or cut off after {n} bytes; nothing from it was used.",
  ),
  "inflate-limit": refuse("Unpacks to more than {max} bytes."),
  "zip-damaged": refuse("The archive is damaged at {place}; nothing from it was used."),
  "zip-too-many": refuse("The archive has {n} entries; the limit is {max}."),
  "zip-method": problem("Entry {name} is encrypted or packed by method {method}; not read."),
  "zip-entry-name": problem("Entry {name} not read: its name points outside the archive."),
  "zip-entry-type": problem("Entry {name} not read: it is not an array."),
  "zip-no-entry": refuse("The archive has no table {name}."),
  "zip-table": note("Read from entry {name} of the archive."),
  "zip-tables": ask("The archive holds {n} tables; choose one."),

  // Encoding and lines
  bom: note("UTF-8 with a byte order mark."),
  "utf-16": note("Read as UTF-16."),
  "encoding-unknown": refuse("The encoding (UTF-32) is not read."),
  "encoding-guessed": problem("Read as {encoding}; check these names: {names}."),
  "binary-in-text": refuse("Line {line} holds a zero byte."),
  crlf: note("Lines end with CR LF."),
  "cr-line-ends": note("Lines end with CR."),
  "mixed-line-ends": note("{n} lines end with CR LF, the others with LF."),
  "stray-cr": problem("A single CR ends line {line}."),
  "no-final-newline": note("The last line has no line end; the last value may be cut."),
  "control-z": note("The end-of-file byte 1A at the end was ignored."),
  "unicode-minus": note("{column}: {n} values are written with the minus sign U+2212."),

  // Comments and blocks
  metadata: note("{n} comment lines are read as name and value."),
  "comment-midfile": problem(
    "Line {line} begins like a comment and has not the columns of a row; set aside.",
  ),
  "trailing-comment": note("{n} rows end with a comment; it is kept as their note."),
  "commented-rows": note("{n} comment lines hold a full row of numbers; first: line {line}."),
  "blank-lines": note("{n} blank lines."),
  "block-column": note("{n} blocks, told apart by two blank lines; their number is the column “{column}”."),
  "segment-column": note("{n} segments; their number is the column “{column}”."),
  "blocks-differ": ask("Blocks have different numbers of columns ({counts}); choose which to read."),
  "declared-size-differs": problem("The file declares {declared} and holds {found}."),
  "repeated-header": problem("The header again at line {line}; set aside."),
  "time-goes-back": problem("Time falls from {a} to {b} at line {line}."),

  // Delimiter and rows
  "single-column": note("A single column."),
  "delimiter-unsure": ask("Two readings are possible; choose."),
  "decimal-comma": note("Read with a decimal comma."),
  "decimal-ambiguous": ask("Is {text} {a} or {b}?"),
  "trailing-delimiter": note("Every row ends with a delimiter; no column was made of it."),
  "quoted-line-break": note("{n} rows hold a line break inside quotes."),
  "quote-stray": problem("Line {line}: text after a closing quote; set aside."),
  "quote-not-closed": refuse("A quote opened at line {line} is never closed."),
  "ragged-short": problem("Line {line} has {k} fields instead of {n}; set aside."),
  "ragged-long": problem("Line {line} has {k} fields instead of {n}; set aside."),
  "padded-rows": note("{n} short rows were filled up with missing values, as the recipe says."),

  // Header
  "comment-header": note("The names stand in the comment of line {line}."),
  "no-header": note("No header; columns are numbered."),
  "index-column": note("One name fewer than columns: the first column holds row names and is called “row”."),
  "header-guessed": ask("Is line {line} a header?"),
  "header-count-mismatch": ask("{k} names for {n} columns; assign them."),
  "units-row": note("Line {line} holds the units."),
  "unit-in-header": note("{n} units were read from the names."),
  "unit-from-suffix": note("{column}: the unit {unit} was read from the end of the name."),
  "empty-name": problem("Column {k} has no name; it is called “{name}”."),
  "duplicate-name": problem("Second “{n}” is called “{name}”."),
  "unsafe-name": problem("The name of column {k} is shown as plain text."),
  "text-column": note("{column} is read as text."),

  // Cells
  "not-a-number": problem("Line {line}, {column}: “{text}” is not a number; left missing."),
  "overflow-stars": problem("Line {line}, {column}: “{text}” did not fit its print width; left missing."),
  "thousands-separator": problem(
    "Line {line}, {column}: “{text}” may hold thousands separators; left missing until you say so.",
  ),
  overflow: problem("Line {line}, {column}: “{text}” is outside the range of doubles; left missing."),
  underflow: problem("Line {line}, {column}: “{text}” is outside the range of doubles; left missing."),
  "integer-precision": problem(
    "{column}: “{text}”{more} has more digits than a double keeps and becomes {value}.",
  ),
  "decimal-precision": problem("{column}: decimals of {n} digits do not fit a double; not read."),
  "fortran-exponent": note("{column}: {n} values have the exponent letter D or Q."),
  "missing-exponent-letter": note("{column}: the exponent letter of {n} values is missing."),
  "hex-float": note("{column}: {n} values are hexadecimal floats."),
  "digits-beyond-double": note("{column}: {n} values have more than 17 digits; the nearest double is kept."),
  "missing-words": note("{column}: {n} cells say that a value is missing ({words})."),
  "complex-split": note("{column} is complex: read as {re} and {im}."),
  "sentinel-suspected": ask("{column}: {value} occurs {n} times: a marker for missing?"),

  // Arrays
  "axes-unnamed": ask("Name the {n} axes of {name}."),
  "axes-open": note("The {n} axes of {name} have no names yet."),
  "axis-matched-by-length": note(
    "Axis {axis} of {name} has the length of {coordinate} and takes it as coordinate.",
  ),
  "table-or-array": ask("Is {name} a table of {n} columns or an array?"),
  "fortran-order": note("{name} was stored column by column."),
  "empty-dataset": note("{name} is empty."),
  "npy-header": refuse("The header of the array is not one that NumPy writes."),
  "npy-version": refuse("Version {version} of the array format is not read."),
  "npy-object": problem("{name} holds Python objects (pickle), which are never run; not read."),
  "npy-dtype": problem("{name}: type {type} is not read."),
  "npy-truncated": problem("{name}: {k} of {n} bytes present; not read."),
  "npy-extra-bytes": problem("{name}: {n} bytes after the array are ignored."),

  // HDF5
  "hdf5-damaged": refuse("Not a complete HDF5 file."),
  "hdf5-timeout": refuse("Reading did not end within {n} s; the file is probably damaged."),
  "hdf5-crashed": refuse("The HDF5 reader ended unexpectedly; the file is probably damaged."),
  "hdf5-filter": problem(
    "{name}: compressed with {filter}; write it again with gzip in the program that made it.",
  ),
  "hdf5-external": problem("{name} points to another file; not followed."),
  "hdf5-type": problem("{name}: type {type} is not read."),
  "hdf5-read": problem("{name} could not be read (damaged chunk?)."),
  "hdf5-chunk": problem("{name}: chunks of more than {max} bytes are not read."),
  "hdf5-link": problem("{name}: link to nothing."),
  "hdf5-link-repeated": note("{name} is another name of {other}."),
  "hdf5-depth": problem("{name}: groups nested more than {max} deep are not read."),

  // Parquet and JSON lines
  "parquet-damaged": refuse("Not a complete Parquet file."),
  "parquet-codec": refuse("Compressed with {codec}, which is not read."),
  "parquet-type": problem("{column}: type {type} is not read."),
  "json-encoding": refuse("JSON is written in UTF-8; this file is not."),
  "json-line": problem("Line {line} is not a JSON object with the columns of the others; set aside."),
} as const satisfies Record<string, IntakeCode>

export type IntakeCodeName = keyof typeof intakeCodes

function note(sentence: string) {
  return { severity: "note", sentence } as const
}
function problem(sentence: string) {
  return { severity: "problem", sentence } as const
}
function ask(sentence: string) {
  return { severity: "ask", sentence } as const
}
function refuse(sentence: string) {
  return { severity: "refuse", sentence } as const
}

export type SentenceValues = Readonly<Record<string, string | number>>

/** Longest text from a file that a sentence repeats. */
const MAX_QUOTED = 120

/** Places that hold counts, which get group marks; line numbers and values do not. */
const counts = new Set(["n", "k", "max"])

/** The sentence of a code with its {places} filled in; texts from the file are cut. */
export function sentence(code: IntakeCodeName, values: SentenceValues = {}): string {
  return intakeCodes[code].sentence.replace(/\{(\w+)\}/g, (place, key: string) => {
    const value = Object.hasOwn(values, key) ? values[key] : undefined
    if (value === undefined) return place
    if (typeof value === "number") return counts.has(key) && value >= 10_000 ? grouped(value) : String(value)
    return value.length > MAX_QUOTED ? `${value.slice(0, MAX_QUOTED)}…` : value
  })
}

const grouped = (value: number) => String(value).replace(/\B(?=(\d{3})+$)/g, ",")

/** Ends the reading of a file; `readTable` turns it into `refused`. */
export class IntakeRefusal extends Error {
  override readonly name = "IntakeRefusal"
  constructor(
    readonly code: IntakeCodeName,
    values: SentenceValues = {},
    readonly line: number | string | null = null,
    readonly column: number | null = null,
  ) {
    super(sentence(code, values))
  }
}
