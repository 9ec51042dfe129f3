// Fonts and colour profile that ship beside the bundle, as bytes: the publish stage touches no disk.
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { faceNames, type FaceName } from '../publish/fonts.ts'

export interface Assets {
  readonly fontBytes: Readonly<Record<FaceName, Uint8Array>>
  readonly colourProfile: Uint8Array
}

export function readAssets(): Assets {
  const shipped = (name: string): Uint8Array => readFileSync(fileURLToPath(new URL(name, import.meta.url)))
  const fontBytes = Object.fromEntries(faceNames.map((face) => [face, shipped(`./fonts/${face}.ttf`)])) as Record<FaceName, Uint8Array>
  return { fontBytes, colourProfile: shipped('./data/sRGB_IEC61966_2_1.icc') }
}
