// The unit in which a metric of a measurand is given: of results, of responses, of a sensitivity, percent or none.
import type { MetricUnit } from './metric.ts'
import type { Measurand } from './study.ts'

export function unitOfMetric(kind: MetricUnit, measurand: Measurand): string {
  switch (kind) {
    case 'measurand': return measurand.unit
    case 'response': return measurand.responseUnit ?? ''
    case 'response per measurand': return `${measurand.responseUnit ?? '1'}/${/[/·]/.test(measurand.unit) ? `(${measurand.unit})` : measurand.unit}`
    case 'percent': return '%'
    case 'none': return ''
  }
}
