import type { ExportFormat } from '#shared/schemas/common'
import { moduleBySlug } from '#shared/domain/curriculum'
import { dateInZone } from '#shared/domain/dates'
import { ASSESSOR_TALK_MINUTES, isReadingCounted, MINUTES_PER_HANDS_ON_STEP, quizMinutes } from '#shared/domain/training-minutes'
import { opensNextAt } from '#shared/domain/training-hours'
import { credentialStateOn } from '#shared/domain/validity'
import type { TrainingMinutesQuery, TrainingMinutesView } from '#shared/schemas/training'
import { findLastFailedAt } from '../data/attempts'
import type { Db } from '../data/database'
import { listModuleCredentials } from '../data/module-credentials'
import { findLastCounted, insertTrainingMinutes, listTrainingLines, type TrainingLine } from '../data/training-minutes'
import { trainingTable } from '../documents/training-minutes'
import { badField, Refusal } from './refusal'
import { exportTable, type Download } from './table-export'
import type { Work } from './work'

const counted = (work: Pick<Work, 'now' | 'company'>) => ({ doneOn: dateInZone(work.now, work.company.timeZone), doneAt: work.now })

/** Refuses with 409 `trainingClosed` and `data.opensAt` outside the hours that the company keeps training open. */
export function requireTrainingHours({ company, now }: Pick<Work, 'company' | 'now'>): void {
  const opensAt = opensNextAt(company.trainingHours, now, company.timeZone)
  if (opensAt) throw new Refusal('conflict', 'trainingClosed', { message: 'Training is closed now: it is working time', data: { opensAt } })
}

/** Counts a lesson's minutes when its reading was required. */
export async function countLesson(trx: Db, work: Work, { module, lesson, minutes }: { module: string, lesson: string, minutes: number }): Promise<void> {
  const { personId } = work.actor
  const lastCountedAt = await findLastCounted(trx, { personId, module, lesson })
  const card = (await listModuleCredentials(trx, personId)).find(one => one.module === module)
  const state = card && credentialStateOn(card, card, work.today)
  const isRenewing = (state === 'dueSoon' || state === 'expired') && lastCountedAt !== null && dateInZone(lastCountedAt, work.company.timeZone) <= card!.issuedOn
  if (!isReadingCounted({ lastCountedAt, lastFailedAt: await findLastFailedAt(trx, personId, module), isRenewing })) return
  await insertTrainingMinutes(trx, { personId, module, kind: 'lesson', lesson, minutes, ...counted(work) })
}

/** Counts the time from the start of a quiz to its submission. */
export async function countQuiz(trx: Db, work: Work, { personId, module, startedAt, most }: { personId: string, module: string, startedAt: string, most: number }): Promise<void> {
  await insertTrainingMinutes(trx, { personId, module, kind: 'quiz', lesson: null, minutes: quizMinutes(startedAt, work.now, most), ...counted(work) })
}

/** Counts a hands-on by its steps. */
export async function countHandsOn(trx: Db, work: Work, { personId, module, steps }: { personId: string, module: string, steps: number }): Promise<void> {
  await insertTrainingMinutes(trx, { personId, module, kind: 'handsOn', lesson: null, minutes: steps * MINUTES_PER_HANDS_ON_STEP, ...counted(work) })
}

/** Counts the talk with an assessor that opens a paused quiz. */
export async function countAssessorTalk(trx: Db, work: Work, { personId, module }: { personId: string, module: string }): Promise<void> {
  await insertTrainingMinutes(trx, { personId, module, kind: 'assessorTalk', lesson: null, minutes: ASSESSOR_TALK_MINUTES, ...counted(work) })
}

function requirePeriod({ from, to }: TrainingMinutesQuery): void {
  if (from > to) throw badField('to', 'is before the start', 'wrongPeriod')
}

/** The counted minutes of everybody between two dates, by person, with the days under each. */
export async function readTrainingMinutes(work: Work, query: TrainingMinutesQuery): Promise<TrainingMinutesView> {
  requirePeriod(query)
  const people = new Map<string, TrainingMinutesView['people'][number]>()
  for (const line of await listTrainingLines(work.db, query)) {
    const person = people.get(line.personId) ?? { personId: line.personId, name: line.name, badge: line.badge, crew: line.crew, minutes: 0, lines: [] }
    person.minutes += line.minutes
    person.lines.push({ doneOn: line.doneOn, module: line.module, title: moduleBySlug(line.module)?.title[work.actor.language] ?? line.module, kind: line.kind, minutes: line.minutes })
    people.set(line.personId, person)
  }
  return { ...query, total: [...people.values()].reduce((sum, person) => sum + person.minutes, 0), people: [...people.values()] }
}

/** One's own counted minutes: this week (from Monday), and in all. */
export async function readOwnMinutes(work: Work, weekStart: string): Promise<{ week: number, total: number }> {
  const sum = (lines: TrainingLine[]) => lines.reduce((minutes, line) => minutes + line.minutes, 0)
  const { personId } = work.actor
  return {
    week: sum(await listTrainingLines(work.db, { from: weekStart, to: work.today, personId })),
    total: sum(await listTrainingLines(work.db, { from: '0001-01-01', to: work.today, personId })),
  }
}

/** The counted minutes as a file for payroll, in the reader's language. */
export async function exportTrainingMinutes(work: Work, { format, ...query }: TrainingMinutesQuery & { format: ExportFormat }): Promise<Download> {
  requirePeriod(query)
  const { language } = work.actor
  const lines = (await listTrainingLines(work.db, query)).map(line => ({ ...line, title: moduleBySlug(line.module)?.title[language] ?? line.module }))
  return exportTable(work, format, trainingTable(lines, language), `${query.from}-${query.to}`)
}
