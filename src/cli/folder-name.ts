// A report number → the name of its folder, on every platform. Two numbers never share a folder: a name that had to be changed bears
// the beginning of the digest of its number.
import { sha256 } from '../assess/digest.ts'

const longest = 60 // characters; with four bytes each they still fit where a name takes 255 bytes

/** Names of devices, with any ending, and names that end in a dot or space are none on Windows. */
const deviceName = /^(?:con|prn|aux|nul|conin\$|conout\$|(?:com|lpt)[0-9¹²³])(?:\..*)?$/i

export function folderName(number: string): string {
  const safe = number.normalize('NFC').replace(/[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}<>:"/\\|?*]+/gu, '-').replace(/^[. ]+|[. ]+$/g, '-')
  const characters = [...safe]
  if (safe === number && safe !== '' && characters.length <= longest && !deviceName.test(safe)) return safe
  return `${safe === '' ? 'report' : characters.slice(0, longest).join('')}-${sha256(number).slice(0, 8)}`
}
