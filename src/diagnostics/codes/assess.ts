// Codes of the assess stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const assessCodes = {
  'assess/too-few-values': { severity: 'warning', help: 'A statistic needs more values than the data hold, so the findings that need it are not evaluable' },
  'assess/missing-field': { severity: 'error', help: 'A characteristic needs a column that the dataset does not map' },
  'assess/censored-value': { severity: 'warning', help: 'A censored value stands where a number is needed, so its level is not evaluable' },
  'assess/pseudo-replication': { severity: 'error', help: 'A column tells repeated injections apart and the study does not say what the independent unit is' },
  'assess/no-calibration': { severity: 'error', help: 'A response is to be turned into a result and no linearity block can do it' },
  'assess/outside-calibration': { severity: 'warning', help: 'A response lies outside the calibrated range, so no result can be read from it' },
  'assess/outlier-flag': { severity: 'note', help: 'A statistical outlier test flags a value; nothing is removed' },
  'assess/confounded-factors': { severity: 'warning', help: 'Two factors change together, so their contributions cannot be separated' },
  'assess/design-gap': { severity: 'warning', help: 'Some combination of level, run and replicate that others have is absent' },
  'assess/degenerate-data': { severity: 'warning', help: 'The data have no spread where a statistic divides by it' },
  'assess/unsuitable-data': { severity: 'error', help: 'The data cannot be used for what the characteristic asks of them' },
  'assess/method-note': { severity: 'note', help: 'A point about how a finding was computed that a reviewer should know' },
} as const satisfies Record<string, CodeEntry>
