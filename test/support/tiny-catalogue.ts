// Two invented characteristics, enough to read a study by: one with every kind of unit, one with a criterion that follows from an option.
import type { DefinitionPart } from '../../src/definition/definition-part.ts'
import { datasetName, defaulted, object, oneOf, optional, quantity, type ReadBy, required } from '../../src/definition/fields.ts'

const lineOptions = object({
  data: required(datasetName({ describe: 'Dataset of standards' })),
  fit: defaulted(oneOf(['straight line', 'through zero', 'quadratic'], { describe: 'The curve' }), 'straight line'),
  'full-response': optional(quantity({ describe: 'Level that counts as 100 %', example: '20 mg/L', of: 'measurand' })),
}, { describe: 'A line' })

const linearity: DefinitionPart<ReadBy<typeof lineOptions>> = {
  id: 'linearity', title: 'Linearity', options: lineOptions,
  metrics: {
    slope: { label: 'slope', unit: 'response per measurand', help: 'Slope of the line' },
    intercept: { label: 'intercept', unit: 'response', help: 'Intercept of the line' },
    'back-calculation-error': { label: 'back-calculation error', unit: 'percent', magnitude: true, help: 'Deviation of a back-calculated standard' },
    'r-squared': { label: 'coefficient of determination', unit: 'none', help: 'R²' },
    'straight-to': { label: 'end of the straight part', unit: 'measurand', help: 'Highest level of the straight part' },
  },
}

const comparisonOptions = object({
  data: required(datasetName({ describe: 'Dataset of both conditions' })),
  margin: optional(quantity({ describe: 'Largest difference of no consequence', example: '0.2 mg/L' })),
}, { describe: 'Two conditions' })

const comparison: DefinitionPart<ReadBy<typeof comparisonOptions>> = {
  id: 'comparison', title: 'Comparison', options: comparisonOptions,
  metrics: { difference: { label: 'difference', unit: 'measurand', help: 'Difference of two means' } },
  impliedCriteria({ margin }) {
    if (margin === undefined) return []
    return [{ metric: 'difference', limit: { kind: 'between', low: { ...margin, value: -margin.value, text: `-${margin.text}` }, high: margin }, text: `within ±${margin.text} ${margin.unit}`, overrides: {}, place: { file: '' } }]
  },
}

export const tinyCatalogue: readonly DefinitionPart[] = [linearity, comparison]
