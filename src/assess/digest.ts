// SHA-256 of bytes or text, in lower-case hexadecimal. A function of its input alone.
import { createHash } from 'node:crypto'

export function sha256(content: Uint8Array | string): string {
  return createHash('sha256').update(content).digest('hex')
}
