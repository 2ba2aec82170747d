import type { ClearanceState } from '#shared/domain/states'
import { addDays } from '#shared/domain/dates'
import type { Effect, PreviewView } from '#shared/schemas/requirements'
import type { Db } from '../data/database'
import { listEmployed } from '../data/roster'
import { openClearanceBook } from './clearance'
import { expectedAnywhere } from './roster'
import type { Work } from './work'

/** A preview looks at today's places and at those of the coming days, so that a move to another site is seen. */
const daysAhead = 14

const rank: Record<ClearanceState, number> = { notCleared: 0, learning: 1, cleared: 2 }

/** Thrown to take the previewed change back. */
class TakenBack extends Error {}

/** Makes a change and takes it back: nothing is saved, what it answered is. A refused change is refused here too. */
export async function tryOut<Answer>(db: Db, change: (trx: Db) => Promise<Answer>): Promise<Answer> {
  let answer: { value: Answer } | undefined
  try {
    await db.transaction(async (trx) => {
      answer = { value: await change(trx) }
      throw new TakenBack()
    })
  }
  catch (error) {
    if (!(error instanceof TakenBack)) throw error
  }
  return answer!.value
}

/**
 * Makes a change, in one transaction; or, as a preview, makes it, asks whom it would stop and whom it would free,
 * and takes it back: nothing is saved. A refused change is refused by a preview too. `from` is the first day of
 * something that starts later.
 */
export async function saveOrPreview<Saved>(work: Work, options: { preview?: boolean, from?: string }, change: (trx: Db) => Promise<Saved>): Promise<Saved | PreviewView> {
  if (!options.preview) return work.db.transaction(change)
  return tryOut(work.db, async (trx) => {
    const questions = await questionsFor(trx, work.today, options.from)
    const before = await askAll(trx, questions)
    await change(trx)
    return compare(questions, before, await askAll(trx, questions))
  })
}

interface Question { personId: string, name: string, duties: string[] | null, siteId: string | null, date: string }

/** Each employed person once for every place where they are or will be; `duties` null: no crew says what they do, so all are asked. */
async function questionsFor(db: Db, today: string, from: string | undefined): Promise<Question[]> {
  const asked = new Map<string, Question>()
  const dates = Array.from({ length: daysAhead }, (_, day) => addDays(today, day))
  if (from && from > today) dates.push(from)
  for (const date of dates) {
    for (const person of await expectedAnywhere(db, date)) {
      const key = `${person.id} ${person.siteId} ${date === from ? from : ''}`
      if (!asked.has(key)) asked.set(key, { personId: person.id, name: person.name, duties: person.duties.length > 0 ? person.duties : null, siteId: person.siteId, date })
    }
  }
  const placed = new Set([...asked.values()].map(question => question.personId))
  for (const person of await listEmployed(db, today)) {
    if (!placed.has(person.id)) asked.set(person.id, { personId: person.id, name: person.name, duties: null, siteId: null, date: from && from > today ? from : today })
  }
  return [...asked.values()]
}

type Answers = Map<string, ClearanceState>
const keyOf = (question: Question, duty: string) => `${question.personId} ${question.siteId} ${question.date} ${duty}`

async function askAll(db: Db, questions: readonly Question[]): Promise<Answers> {
  const answers: Answers = new Map()
  for (const date of new Set(questions.map(question => question.date))) {
    const book = await openClearanceBook(db, { whom: 'all', date })
    for (const question of questions.filter(one => one.date === date)) {
      for (const duty of question.duties ?? book.duties) answers.set(keyOf(question, duty), book.ask(question.personId, duty, question.siteId).state)
    }
  }
  return answers
}

function compare(questions: readonly Question[], before: Answers, after: Answers): PreviewView {
  const effects = new Map<string, Effect>()
  const duties = [...new Set([...before.keys()].map(key => key.split(' ').at(-1)!))]
  for (const question of questions) {
    for (const duty of question.duties ?? duties) {
      const was = before.get(keyOf(question, duty))
      const becomes = after.get(keyOf(question, duty))
      const key = `${question.personId} ${question.siteId} ${duty}`
      if (was && becomes && was !== becomes && !effects.has(key)) effects.set(key, { personId: question.personId, name: question.name, duty, siteId: question.siteId, was, becomes })
    }
  }
  const all = [...effects.values()]
  const clearedFor = (answers: Answers) => new Set([...answers].filter(([, state]) => state === 'cleared').map(([key]) => key.split(' ').at(-1)!))
  const left = clearedFor(after)
  return {
    nobodyLeft: [...clearedFor(before)].filter(duty => !left.has(duty)),
    stops: all.filter(one => rank[one.becomes] < rank[one.was]),
    frees: all.filter(one => rank[one.becomes] > rank[one.was]),
  }
}
