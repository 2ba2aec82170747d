/** A text in both languages of the product. */
export interface Bilingual {
  en: string
  es: string
}

/** The languages of every screen, lesson, item and message. */
export const languages = ['en', 'es'] as const
/** One language of the product. */
export type Language = (typeof languages)[number]

/** What a person's sign-in lets them do; the abilities are in `shared/access`. */
export const roles = ['worker', 'foreman', 'superintendent', 'safety', 'admin'] as const
/** One role. */
export type Role = (typeof roles)[number]

/** Who a person is employed by, seen from the company. */
export const employerKinds = ['own', 'temp', 'sub', 'visitor'] as const
/** One kind of employer. */
export type EmployerKind = (typeof employerKinds)[number]

/** Codes of the duties that a new company starts with. A company may add its own, so a duty is a plain string elsewhere. */
export const seededDutyCodes = [
  'stacker', 'brace-hand', 'rebar-hand', 'hose-hand', 'vibrator-hand', 'wall-watcher', 'pump-spotter',
  'telehandler-operator', 'pour-lead',
] as const
/** One of the duties that a new company starts with. */
export type SeededDutyCode = (typeof seededDutyCodes)[number]

/** The state of one credential on one date. */
export const credentialStates = ['inDate', 'dueSoon', 'expired', 'unverified', 'withdrawn', 'notYet', 'rejected'] as const
/** One credential state. */
export type CredentialState = (typeof credentialStates)[number]

/** What somebody who may verify decided about an outside card. */
export const verifications = ['unverified', 'verified', 'rejected'] as const
/** One verification. */
export type Verification = (typeof verifications)[number]

/** Who says that a credential runs out: nobody should believe that a law expires "running bond". */
export const validityBases = ['law', 'issuer', 'site', 'company'] as const
/** One basis. */
export type ValidityBasis = (typeof validityBases)[number]

/** How a credential type runs out. */
export const validityKinds = ['never', 'period', 'printed'] as const
/** One kind of validity. */
export type ValidityKind = (typeof validityKinds)[number]

/** What a period runs to: the same day of the month, or that month's last day. */
export const validityAnchors = ['day', 'monthEnd'] as const
/** One anchor. */
export type ValidityAnchor = (typeof validityAnchors)[number]

/** A person for a duty, at a site, on a date. */
export const clearanceStates = ['cleared', 'learning', 'notCleared'] as const
/** One clearance state. */
export type ClearanceState = (typeof clearanceStates)[number]

/** Why something is missing for a clearance. The last three concern the person, not one group of a rule. */
export const missingReasons = [
  'neverHeld', 'expired', 'notVerified', 'notYetValid', 'withdrawn', 'rejected', 'onHold', 'notEmployed', 'underAge',
] as const
/** One reason. */
export type MissingReason = (typeof missingReasons)[number]

/** The nearest thing that would mend what is missing. */
export const fixKinds = ['module', 'signOff', 'verify', 'card', 'orientation', 'wait', 'safetyManager', 'office', 'none'] as const
/** One kind of fix. */
export type FixKind = (typeof fixKinds)[number]

/** Whether a site's work day can be filled. */
export const crewingStates = ['crewed', 'short'] as const
/** One crewing state. */
export type CrewingState = (typeof crewingStates)[number]

/** The five kinds of quiz item. */
export const itemKinds = ['one', 'all', 'order', 'number', 'place'] as const
/** One kind of item. */
export type ItemKind = (typeof itemKinds)[number]

/** A module's block on a person's training wall. */
export const moduleStates = ['waiting', 'open', 'started', 'passed', 'laid', 'unwritten'] as const
/** One module state. */
export type ModuleState = (typeof moduleStates)[number]

/** How a mark came onto a briefing's sheet. */
export const signInMethods = ['ownPhone', 'foremanDevice', 'addedByForeman', 'paper', 'siteTablet', 'makeUp'] as const
/** One method. */
export type SignInMethod = (typeof signInMethods)[number]

/** Why somebody was added by hand. */
export const handReasons = ['noPhone', 'deadPhone', 'noSignal', 'late', 'cannotRead'] as const
/** One reason for adding by hand. */
export type HandReason = (typeof handReasons)[number]

/** What a person leaves on a sheet. */
export const markKinds = ['tap', 'typed', 'drawn', 'witnessed'] as const
/** One kind of mark. */
export type MarkKind = (typeof markKinds)[number]

/** A briefing's life: the talk runs, the talk is over, nothing is edited any more. */
export const briefingStates = ['open', 'closed', 'sealed'] as const
/** One briefing state. */
export type BriefingState = (typeof briefingStates)[number]

/** The day's planned work. */
export const workTags = ['stack', 'steel', 'brace', 'pour', 'unbrace', 'cut', 'lift', 'drive'] as const
/** One tag of planned work. */
export type WorkTag = (typeof workTags)[number]

/** What a talk warns of; the day's weather hazards use the same words. */
export const talkHazards = [
  'heat', 'cold', 'wind', 'wet', 'dark', 'height', 'traffic', 'power-lines', 'silica', 'cement', 'fire', 'strain', 'burst',
] as const
/** One hazard. */
export type TalkHazard = (typeof talkHazards)[number]

/** The seasons a talk may be kept for. */
export const seasons = ['winter', 'spring', 'summer', 'autumn'] as const
/** One season. */
export type Season = (typeof seasons)[number]

/** The written namings of a person by subject and site. */
export const designationKinds = ['competent', 'qualified', 'assessor', 'trainer'] as const
/** One kind of designation. */
export type DesignationKind = (typeof designationKinds)[number]
