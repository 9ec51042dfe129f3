// The id of a finding: `characteristic[.block]/measurand/metric[@level][@condition]`. The block id already holds characteristic and name.

export function findingId(parts: { readonly block: string; readonly measurand: string; readonly metric: string; readonly level?: number | undefined; readonly condition?: string | undefined }): string {
  const level = parts.level === undefined ? '' : `@${parts.level}`
  const condition = parts.condition === undefined ? '' : `@${parts.condition}`
  return `${parts.block}/${parts.measurand}/${parts.metric}${level}${condition}`
}
