import type { ModuleState } from './states'

/** What to do next at a block. */
export type NextStep
  = | { kind: 'lesson', lesson: string, number: number, total: number }
    | { kind: 'quiz' | 'handsOn' | 'card' | 'nothing' }

/**
 * The one thing to do next at a block: the first lesson that was not read, then the quiz, then the hands-on. A block
 * that waits or is not written offers nothing; a laid one its card.
 */
export function nextStepAt(block: { state: ModuleState, lessons: readonly { slug: string, read: boolean }[] }): NextStep {
  if (block.state === 'laid') return { kind: 'card' }
  if (block.state === 'passed') return { kind: 'handsOn' }
  if (block.state === 'waiting' || block.state === 'unwritten') return { kind: 'nothing' }
  const index = block.lessons.findIndex(lesson => !lesson.read)
  const lesson = block.lessons[index]
  return lesson ? { kind: 'lesson', lesson: lesson.slug, number: index + 1, total: block.lessons.length } : { kind: 'quiz' }
}
