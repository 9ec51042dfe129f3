// The templates that ship, as bytes.
import { existsSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

export const templatesFolder = new URL('../../templates/', import.meta.url)

export function shippedTemplate(name: string): Uint8Array | undefined {
  const path = fileURLToPath(new URL(`${name}.md`, templatesFolder))
  return existsSync(path) ? readFileSync(path) : undefined
}
