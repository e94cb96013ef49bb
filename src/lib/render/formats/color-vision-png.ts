import sharp from "sharp"
import { simulateColorVision, type ColorVision } from "@specs/chart/color-vision"

/** A PNG as it looks to people without one kind of cone, or printed in grey; same size and resolution. */
export async function pngAsSeen(png: Uint8Array, vision: ColorVision): Promise<Uint8Array> {
  const image = sharp(png).flatten({ background: "#ffffff" }).toColourspace("srgb").removeAlpha()
  const { density } = await sharp(png).metadata()
  const { data, info } = await image.raw().toBuffer({ resolveWithObject: true })
  simulateColorVision(data, vision)
  const { width, height } = info
  const seen = sharp(data, { raw: { width, height, channels: 3 } })
  return (density ? seen.withMetadata({ density }) : seen).png({ compressionLevel: 6 }).toBuffer()
}
