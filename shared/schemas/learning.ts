import { z } from 'zod'
import { credentialStates, itemKinds, moduleStates } from '../domain/states'
import { units } from '../domain/units'
import { code, id, language, text } from './common'
import { mark } from './mark'

export const moduleParams = z.strictObject({ slug: code })
export const lessonParams = z.strictObject({ slug: code, lesson: code })
/** The language to answer in; the person's own unless said. */
export const languageQuery = z.strictObject({ language: language.optional() })

const lessonLine = z.object({ slug: z.string(), title: z.string(), minutes: z.number().int(), read: z.boolean() })
/** A module's block on the wall. `minutes` is null while nothing is written; `left` is in half blocks. */
export const moduleLine = z.object({
  slug: z.string(), title: z.string(), shortTitle: z.string(),
  course: z.number().int(), position: z.number().int(), left: z.number().int(),
  minutes: z.number().int().nullable(), restsOn: z.array(z.string()),
  state: z.enum(moduleStates), lessons: z.array(lessonLine),
})
export type ModuleLine = z.infer<typeof moduleLine>
/** The whole wall, and the block to go on with. */
export const wallView = z.object({ items: z.array(moduleLine), next: z.string().nullable() })
export type WallView = z.infer<typeof wallView>

const step = z.object({ id: z.string(), text: z.string() })
export const moduleView = moduleLine.extend({
  /** The company's own note, as a tree for `<ContentRenderer>`. */
  note: z.unknown().optional(),
  summary: z.string(), cautions: z.array(z.string()), checklist: z.array(step), sources: z.array(z.string()),
  quiz: z.object({
    items: z.number().int(), passMark: z.number(), isOpen: z.boolean(),
    opensAt: z.string().optional(), lessonsToRead: z.array(z.string()).optional(),
    running: z.object({ id: z.string(), endsAt: z.string() }).optional(),
    last: z.object({ id: z.string(), passed: z.boolean(), score: z.number(), submittedAt: z.string() }).optional(),
  }).optional(),
  handsOn: z.object({
    isAsked: z.boolean(), isPassed: z.boolean(),
    last: z.object({ id: z.string(), passed: z.boolean(), signedAt: z.string(), assessor: z.string(), notMet: z.array(z.object({ id: z.string(), note: z.string().optional() })) }).optional(),
  }).optional(),
  credential: z.object({ id: z.string(), code: z.string(), state: z.enum(credentialStates), issuedOn: z.string(), expiresOn: z.string().nullable() }).optional(),
})
export type ModuleView = z.infer<typeof moduleView>

const neighbour = z.object({ slug: z.string(), title: z.string() }).nullable()
export const lessonView = z.object({
  module: z.object({ slug: z.string(), title: z.string() }), slug: z.string(), title: z.string(), minutes: z.number().int(),
  number: z.number().int(), total: z.number().int(), read: z.boolean(), language, sources: z.array(z.string()),
  previous: neighbour, next: neighbour, body: z.unknown(),
})
export type LessonView = z.infer<typeof lessonView>

export const servedItem = z.object({
  id: z.string(), kind: z.enum(itemKinds), stem: z.string(),
  options: z.array(step).optional(), unit: z.enum(units).optional(), units: z.array(z.enum(units)).optional(), picture: z.string().optional(),
})

/** Whom an assessor reads the quiz to; without it, one's own. */
export const attemptBody = z.strictObject({ personId: id.optional() }).optional()

/** What one item may be answered with, by its kind; which shape fits which item is the service's to check. */
const answerValue = z.union([
  z.string().max(100), z.number(), z.array(z.string().max(64)).max(20),
  z.strictObject({ value: z.union([z.number(), z.string().max(100)]), unit: z.string().max(20).optional() }),
], 'must be an option id, a list of option ids, or a number')
export type AnswerValue = z.infer<typeof answerValue>
export const submissionBody = z.strictObject({ answers: z.record(z.string().max(64), answerValue).refine(answers => Object.keys(answers).length <= 500, 'too many answers') })
export type SubmissionBody = z.infer<typeof submissionBody>

const rightAnswer = z.union([z.string(), z.array(z.string()), z.object({ value: z.number(), unit: z.enum(units) })])
export const attemptResultView = z.object({
  score: z.number(), passMark: z.number(), passed: z.boolean(), mustKnowMissed: z.array(z.string()),
  items: z.array(z.object({ id: z.string(), share: z.number(), feedback: z.string(), lesson: z.string(), right: rightAnswer.optional(), isStruck: z.boolean().optional() })),
  credentialId: z.string().optional(),
})
export type AttemptResultView = z.infer<typeof attemptResultView>

export const startedAttempt = z.object({ id: z.string(), endsAt: z.string(), items: z.array(servedItem) })
export type StartedAttempt = z.infer<typeof startedAttempt>
/** One's own attempt: what was asked, and once it is graded what was answered and how it went. */
export const attemptView = startedAttempt.extend({
  module: z.string(), startedAt: z.string(), submittedAt: z.string().nullable(), isOver: z.boolean(),
  /** Until it ends, by the server's clock: a phone's own may be wrong. */
  secondsLeft: z.number().int(),
  answers: z.record(z.string(), z.unknown()).optional(), result: attemptResultView.optional(),
  /** Who reads it aloud, and to whom when that is somebody else than the one who asks. */
  readBy: z.string().optional(), person: z.object({ id: z.string(), name: z.string() }).optional(),
})
export type AttemptView = z.infer<typeof attemptView>

export const signOffRequestBody = z.strictObject({ module: code })
export const signOffRequestMade = z.object({ id: z.string(), module: z.string(), requestedAt: z.string() })
export const signOffRequestLine = signOffRequestMade.extend({ personId: z.string(), person: z.string(), title: z.string(), quizPassed: z.boolean() })
export const signOffRequestList = z.object({ items: z.array(signOffRequestLine) })
export type SignOffRequestList = z.infer<typeof signOffRequestList>
export const signOffRequestView = signOffRequestLine.extend({ cautions: z.array(z.string()), checklist: z.array(step) })
export type SignOffRequestView = z.infer<typeof signOffRequestView>

export const signOffBody = z.strictObject({
  personId: id, module: code,
  steps: z.array(z.strictObject({ id: z.string().min(1).max(64), ok: z.boolean(), note: text(1000).optional() })).max(100),
  mark,
})
export type SignOffBody = z.infer<typeof signOffBody>
export const signOffMade = z.object({ id: z.string(), passed: z.boolean(), credentialId: z.string().optional() })
export type SignOffMade = z.infer<typeof signOffMade>
