import { z } from 'zod'
import { trainingKinds } from '../domain/training-minutes'
import { code, date, id, language, line, tableFormats, text } from './common'

export const trainingMinutesQuery = z.strictObject({ from: date, to: date })
export type TrainingMinutesQuery = z.infer<typeof trainingMinutesQuery>
export const trainingExportQuery = trainingMinutesQuery.extend({ format: z.enum(tableFormats) })
export const trainingMinutesView = z.object({
  from: z.string(), to: z.string(), total: z.number().int(),
  people: z.array(z.object({
    personId: z.string(), name: z.string(), badge: z.string(), crew: z.string().nullable(), minutes: z.number().int(),
    lines: z.array(z.object({ doneOn: z.string(), module: z.string(), title: z.string(), kind: z.enum(trainingKinds), minutes: z.number().int() })),
  })),
})
export type TrainingMinutesView = z.infer<typeof trainingMinutesView>
/** One's own counted minutes, this week and in all. */
export const ownMinutesView = z.object({ week: z.number().int(), total: z.number().int() })

/** Five minutes with an assessor: opens a paused quiz at once. */
export const assessorTalkBody = z.strictObject({ personId: id, module: code, note: text(1000).optional() })
export const assessorTalkMade = z.object({ id: z.string(), personId: z.string(), module: z.string(), talkedAt: z.string() })
/** People whose quiz is paused, and those to whom the reader may read a quiz aloud. */
export const pausedQuizList = z.object({ items: z.array(z.object({ personId: z.string(), person: z.string(), module: z.string(), title: z.string(), opensAt: z.string(), missed: z.array(z.string()) })) })
export type PausedQuizList = z.infer<typeof pausedQuizList>
export const readableList = z.object({
  people: z.array(z.object({ id: z.string(), name: z.string(), language })),
  modules: z.array(z.object({ slug: z.string(), title: z.string() })),
})
export type ReadableList = z.infer<typeof readableList>

export const trainersQuery = z.strictObject({ module: code })
export const trainerList = z.object({ items: z.array(z.object({ id: z.string(), name: z.string() })) })
/** A question to a trainer about a lesson, or about an item of one's own graded attempt. */
export const questionBody = z.strictObject({
  trainerId: id, module: code, lesson: code.optional(), itemId: line(64).optional(), question: text(2000),
})
export type QuestionBody = z.infer<typeof questionBody>
export const answerBody = z.strictObject({ answer: text(4000) })
export const questionView = z.object({
  id: z.string(), personId: z.string(), person: z.string(), trainerId: z.string(), trainer: z.string(),
  module: z.string(), title: z.string(), lesson: z.string().nullable(), lessonTitle: z.string().nullable(), item: z.string().nullable(),
  language, question: z.string(), askedAt: z.string(),
  answer: z.string().nullable(), answeredBy: z.string().nullable(), answeredAt: z.string().nullable(),
  /** The reader may answer it. */
  isMine: z.boolean(),
})
export type QuestionView = z.infer<typeof questionView>
export const questionList = z.object({ items: z.array(questionView) })
