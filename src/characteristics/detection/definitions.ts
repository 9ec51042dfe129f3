// The definitions of a lower limit that a study may ask for. They answer different questions with different numbers, so the name of the
// definition belongs to every limit that is printed.

export const definitionNames = [
  'blank scatter', 'calibration scatter', 'intercept standard error', 'intercept scatter', 'signal to noise', 'critical value', 'ISO 11843-2', 'MDL',
] as const

export type DefinitionName = (typeof definitionNames)[number]

/** A quantitation limit may also be the lowest level at which results were confirmed. */
export const confirmedLevel = 'confirmed level'

export const quantitationNames = [...definitionNames, confirmedLevel] as const

export type QuantitationName = (typeof quantitationNames)[number]

/** Definitions that need the slope and scatter of calibration responses. */
export const calibrationDefinitions: readonly DefinitionName[] = ['calibration scatter', 'intercept standard error', 'intercept scatter', 'ISO 11843-2']

/** Definitions that give no quantitation limit of their own. */
export const detectionOnly: readonly DefinitionName[] = ['ISO 11843-2', 'MDL']
