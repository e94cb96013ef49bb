import type { ReadingRecipe } from "./reading-recipe"

/** A recipe that decides nothing. */
export const openRecipe: ReadingRecipe = {
  version: 1,
  entry: null,
  encoding: null,
  delimiter: null,
  decimal: null,
  comments: null,
  commentPrefixes: null,
  headerLines: null,
  fields: null,
  trailingDelimiter: null,
  skipLines: [],
  padShortRows: false,
  segments: null,
  block: null,
  tables: null,
  columns: null,
}
