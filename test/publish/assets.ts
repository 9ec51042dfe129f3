// The fonts and the colour profile that the build ships, read from their packages.
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
// @ts-expect-error The build's scripts carry no types.
import { fontFiles } from '../../.build/fonts.mjs'
import { faceNames, type FaceName } from '../../src/publish/fonts.ts'

const packages = new URL('../../node_modules/', import.meta.url)
const read = (path: string): Uint8Array => readFileSync(fileURLToPath(new URL(path, packages)))

export const fontBytes = Object.fromEntries(faceNames.map((face) => [face, read((fontFiles as Readonly<Record<string, string>>)[face] ?? '')])) as Record<FaceName, Uint8Array>
export const colourProfile = read('pdfkit/js/data/sRGB_IEC61966_2_1.icc')
