// Canonical JSON text of plain data (RFC 8785: keys sorted by UTF-16 code units, ECMAScript numbers, no white space), so that equal
// records have equal digests. NaN, Infinity and functions are our bugs and throw; undefined members are left out.

export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === 'boolean' || typeof value === 'string') return JSON.stringify(value)
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new Error('a number that is not finite reached the record')
    return Object.is(value, -0) ? '0' : String(value)
  }
  if (Array.isArray(value)) return `[${value.map((item) => canonicalJson(item ?? null)).join(',')}]`
  if (typeof value === 'object') {
    const members: string[] = []
    for (const key of Object.keys(value).sort()) {
      const member = (value as Record<string, unknown>)[key]
      if (member !== undefined) members.push(`${JSON.stringify(key)}:${canonicalJson(member)}`)
    }
    return `{${members.join(',')}}`
  }
  throw new Error(`a ${typeof value} reached the record`)
}
