// Detection and quantitation limits: what a study may ask of them and what they may find. The governing limits have metrics of their own,
// so that a criterion on `detection-limit` judges the reported limit and not every definition beside it.
import type { Characteristic } from '../characteristic.ts'
import { assessDetection } from './assess.ts'
import type { DetectionDetail } from './detail.ts'
import { type DetectionOptions, detectionOptions } from './options.ts'
import { presentDetection } from './present.ts'

export const detection: Characteristic<DetectionOptions, DetectionDetail> = {
  id: 'detection',
  title: 'Detection and quantitation limits',
  after: ['linearity'],
  options: detectionOptions,
  metrics: {
    'detection-limit': { label: 'detection limit', unit: 'measurand', help: 'Detection limit by the governing definition' },
    'quantitation-limit': { label: 'quantitation limit', unit: 'measurand', help: 'Quantitation limit by the governing definition' },
    'detection-limit-by-definition': { label: 'detection limit by each definition', unit: 'measurand', help: 'Detection limit by every definition asked for, the definition as condition' },
    'quantitation-limit-by-definition': { label: 'quantitation limit by each definition', unit: 'measurand', help: 'Quantitation limit by every definition that gives one, the definition as condition' },
    'critical-value': { label: 'critical value', unit: 'measurand', help: 'Net value above which detection is claimed, wrongly with probability alpha in a blank' },
    'minimum-detectable-value': { label: 'minimum detectable value', unit: 'measurand', help: 'Net value that is missed with probability beta' },
    'blank-standard-deviation': { label: 'standard deviation of blanks', unit: 'measurand', help: 'Standard deviation of blanks in the unit of results' },
    'blank-response-standard-deviation': { label: 'standard deviation of blank responses', unit: 'response', help: 'Standard deviation of blanks in the unit of the response' },
    'method-detection-limit': { label: 'method detection limit', unit: 'measurand', help: 'Larger of the limits from spikes and from blanks (40 CFR 136, Appendix B)' },
    'mdl-spikes': { label: 'method detection limit from spikes', unit: 'measurand', help: 'One-sided 99 % Student t times the standard deviation of spikes' },
    'mdl-blanks': { label: 'method detection limit from blanks', unit: 'measurand', help: 'Limit from method blanks by the rule that fits them' },
    'signal-to-noise': { label: 'signal-to-noise ratio', unit: 'none', help: 'Ratio of the standard whose trace or replicates were used' },
    'quantitation-recovery': { label: 'recovery at the quantitation limit', unit: 'percent', help: 'Mean result over the level, of the confirmation results' },
    'quantitation-rsd': { label: 'relative standard deviation at the quantitation limit', unit: 'percent', help: 'Scatter of the confirmation results' },
  },
  assess: assessDetection,
  present: presentDetection,
}
