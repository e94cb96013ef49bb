declare module "subset-font" {
  /** The font with only the glyphs that a text needs. */
  export default function subsetFont(
    font: Buffer,
    text: string,
    options?: { readonly targetFormat?: "sfnt" | "woff" | "woff2" | "truetype" },
  ): Promise<Buffer>
}
