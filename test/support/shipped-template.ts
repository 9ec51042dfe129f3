// The templates that ship, as bytes.
import { existsSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

export function shippedTemplate(name: string): Uint8Array | undefined {
  const path = fileURLToPath(new URL(`../../templates/${name}.md`, import.meta.url))
  return existsSync(path) ? readFileSync(path) : undefined
}
