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

/**
 * The modules that each kind proposes to learn again until the company says otherwise (company rule, no source):
 * proposed by the product, decided by the safety manager, never by itself.
 */
export const usualRetraining: Record<NearMissKind, readonly string[]> = {
  formMoved: ['bracing-and-plumb'], blowout: ['blowout-response', 'pour-rate'], braceFailed: ['bracing-and-plumb'], fall: ['working-at-height'], struckBy: [], hoseWhip: ['pump-and-hose'],
  powerLine: ['pump-and-hose'], vehicle: [], trench: ['footings-and-layout'], cement: ['concrete-for-walls'], heatOrCold: ['ready-for-site'], other: [],
}
