import { nextStepAt } from '#shared/domain/next-step'
import type { ModuleLine } from '#shared/schemas/learning'

/** The words and the place of the one thing to do next at a block; null when there is none. */
export function useNextStep(block: () => ModuleLine | null | undefined) {
  const { t } = useI18n()
  return computed(() => {
    const module = block()
    if (!module) return null
    const step = nextStepAt(module)
    const path = `/learn/${module.slug}`
    if (step.kind === 'lesson') {
      const words = module.state === 'open' ? t('learn.begin', { module: module.title }) : t('learn.goOn', { n: step.number, total: step.total })
      return { to: `${path}/${step.lesson}`, words }
    }
    if (step.kind === 'quiz') return { to: `${path}/quiz`, words: t('learn.toQuiz') }
    if (step.kind === 'handsOn') return { to: path, words: t('learn.toHandsOn') }
    return step.kind === 'card' ? { to: '/my-cards', words: t('learn.toCards') } : null
  })
}
