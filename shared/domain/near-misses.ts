import type { TalkHazard } from './states'

/** What nearly happened, or did; each with the hazards that a talk about it carries. */
export const nearMissKinds = ['formMoved', 'blowout', 'braceFailed', 'fall', 'struckBy', 'hoseWhip', 'powerLine', 'vehicle', 'trench', 'cement', 'heatOrCold', 'other'] as const
export type NearMissKind = (typeof nearMissKinds)[number]

const hazardsOf: Record<NearMissKind, readonly TalkHazard[]> = {
  formMoved: ['burst'], blowout: ['burst'], braceFailed: ['wind', 'burst'], fall: ['height'], struckBy: ['traffic', 'strain'], hoseWhip: ['burst'],
  powerLine: ['power-lines'], vehicle: ['traffic'], trench: ['wet'], cement: ['cement'], heatOrCold: ['heat', 'cold'], other: [],
}

/** The hazards that talks about such a near miss are tagged with. */
export const hazardsOfNearMiss = (kind: NearMissKind) => hazardsOf[kind]
