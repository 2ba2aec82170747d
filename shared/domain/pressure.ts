/**
 * Lateral pressure of fresh concrete on wall forms: ACI 347R-14 section 4.2.2, inch-pound form (secondary source, two
 * agreeing transcriptions). An estimate for planning: the form maker's limit, the engineer and the local code decide.
 */

/** What the coefficient for cement and admixtures depends on. */
export const concreteKinds = ['ordinary', 'ordinaryDelayed', 'blended', 'blendedDelayed', 'highBlend'] as const
export type ConcreteKind = (typeof concreteKinds)[number]

const chemistryOf: Record<ConcreteKind, number> = { ordinary: 1, ordinaryDelayed: 1.2, blended: 1.2, blendedDelayed: 1.4, highBlend: 1.4 }

/** Cc. Unknown or blended cement counts as 1.2, with anything that delays setting 1.4; never 1.0 by default. */
export const chemistryCoefficient = (kind: ConcreteKind) => chemistryOf[kind]

/** Cw from the unit weight in lb/ft³: 0.5(1 + w/145), at least 0.80, below 140; 1.0 to 150; w/145 above. */
export function weightCoefficient(unitWeight: number): number {
  if (unitWeight < 140) return Math.max(0.8, 0.5 * (1 + unitWeight / 145))
  return unitWeight <= 150 ? 1 : unitWeight / 145
}

/** What the pressure of one lift depends on. US units throughout. */
export interface PressureInput {
  /** Rate of rise, ft/h. */
  riseRate: number
  /** Of the concrete, not of the air, °F. */
  concreteF: number
  /** lb/ft³. */
  unitWeight: number
  kind: ConcreteKind
  /** Height of fluid concrete above the point, ft. */
  fluidHeight: number
  /** Height of the whole placement, ft; which equation holds depends on it. The fluid height unless given. */
  placementHeight?: number
  /** Slump with its delivery tolerance, in. */
  slump?: number
  /** Vibrated deeper than 4 ft, or from outside. */
  isDeepVibrated?: boolean
}

/** Which term decided. */
export const pressureTerms = ['fluidHead', 'equationB', 'equationC', 'floor'] as const
export type PressureTerm = (typeof pressureTerms)[number]

export interface Pressure {
  /** lb/ft². */
  pressure: number
  term: PressureTerm
}

/** Slump above which, in inches, only full head holds. */
export const MOST_SLUMP_FOR_EQUATIONS = 7

/**
 * The greatest lateral pressure in lb/ft². Equation (b) below 7 ft/h and to 14 ft of placement height, (c) above that
 * height or from 7 to 15 ft/h; at least 600·Cw, never more than w·h. Full head alone above 15 ft/h, above 7 in of
 * slump, and with deep or outside vibration. At 7 ft/h exactly (b) and (c) agree.
 */
export function lateralPressure(input: PressureInput): Pressure {
  const { riseRate, concreteF, unitWeight, kind, fluidHeight, placementHeight = fluidHeight, slump = 0, isDeepVibrated = false } = input
  const fluidHead: Pressure = { pressure: unitWeight * fluidHeight, term: 'fluidHead' }
  if (riseRate > 15 || slump > MOST_SLUMP_FOR_EQUATIONS || isDeepVibrated) return fluidHead
  const weight = weightCoefficient(unitWeight)
  const isLow = riseRate < 7 && placementHeight <= 14
  const inside = isLow ? 150 + 9000 * riseRate / concreteF : 150 + 43400 / concreteF + 2800 * riseRate / concreteF
  const equation: Pressure = { pressure: weight * chemistryCoefficient(kind) * inside, term: isLow ? 'equationB' : 'equationC' }
  const floor: Pressure = { pressure: 600 * weight, term: 'floor' }
  const governing = equation.pressure >= floor.pressure ? equation : floor
  return governing.pressure < fluidHead.pressure ? governing : fluidHead
}

/** Rate of rise in ft/h from yd³/h, net wall length in ft and core thickness in in. */
export const riseRateOf = (cubicYardsPerHour: number, wallLength: number, coreInches: number) => cubicYardsPerHour * 27 / (wallLength * coreInches / 12)
