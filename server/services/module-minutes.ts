import type { ModuleMinutes } from '#shared/domain/missing'
import { MINUTES_PER_HANDS_ON_STEP } from '#shared/domain/training-minutes'
import type { Teaching } from './teaching'

/** Minutes that a question of a quiz takes (company rule, no source). */
const MINUTES_PER_QUESTION = 1
/** Minutes that a step of a hands-on takes of the assessor, beside the learner's (company rule, no source). */
const ASSESSOR_MINUTES_PER_STEP = 2

/** How long each module takes: its lessons and quiz; its hands-on with practice, check and the assessor's part. */
export function moduleMinutesOf(teaching: Teaching): ReadonlyMap<string, ModuleMinutes> {
  return new Map([...teaching.values()].map(({ slug, lessons, bank, text }) => [slug, {
    minutes: lessons.reduce((sum, lesson) => sum + lesson.minutes, 0) + Math.max(bank.quizLength, bank.items.filter(item => item.mustKnow).length) * MINUTES_PER_QUESTION,
    handsOnMinutes: text.en.checklist.length * (MINUTES_PER_HANDS_ON_STEP + ASSESSOR_MINUTES_PER_STEP),
  }]))
}
