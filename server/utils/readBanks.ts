import { parse } from 'yaml'
import type { QuizBank } from '#shared/domain/quiz-bank'
import { toBank } from '../services/teaching'

/** Every question bank, keys included, from the server's own assets. Throws when one is not sound. */
export async function readBanks(): Promise<QuizBank[]> {
  const storage = useStorage('assets:server')
  const names = await storage.getKeys('quizzes')
  return Promise.all(names.map(async name => toBank(parse(String(await storage.getItem(name))))))
}
