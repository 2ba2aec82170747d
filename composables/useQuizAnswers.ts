import type { AnswerValue, AttemptView } from '#shared/schemas/learning'
import { readNumber } from '#shared/domain/number-answers'

type Answers = Record<string, AnswerValue>

function isAnswered(answer: AnswerValue | undefined): boolean {
  if (answer === undefined) return false
  if (typeof answer === 'object' && !Array.isArray(answer)) return String(answer.value).trim() !== ''
  return typeof answer === 'number' || answer.length > 0
}

/**
 * The answers of a running attempt and the question that is open. They are kept in this tab until they are sent, so
 * that a reload loses nothing. `index` equal to the number of questions is the review.
 */
export function useQuizAnswers(attempt: AttemptView) {
  const answers = ref<Answers>({})
  const index = ref(0)
  const key = `quiz-${attempt.id}`

  onMounted(() => {
    try {
      const kept = JSON.parse(sessionStorage.getItem(key) ?? 'null') as { answers: Answers, index: number } | null
      if (kept) {
        answers.value = kept.answers
        index.value = Math.min(kept.index, attempt.items.length)
      }
    }
    catch {
      sessionStorage.removeItem(key)
    }
    watch([answers, index], () => sessionStorage.setItem(key, JSON.stringify({ answers: answers.value, index: index.value })), { deep: true })
  })

  const answered = computed(() => new Set(attempt.items.filter(item => isAnswered(answers.value[item.id])).map(item => item.id)))
  /** What would be sent: only what was answered. */
  const toSend = () => Object.fromEntries(Object.entries(answers.value).filter(([id]) => answered.value.has(id)))
  /** True when the open question holds a number that can't be read for sure. */
  const isUnclear = computed(() => {
    const item = attempt.items[index.value]
    const answer = item && answers.value[item.id]
    if (item?.kind !== 'number' || !item || !answered.value.has(item.id) || typeof answer !== 'object' || Array.isArray(answer)) return false
    return !readNumber(answer.value).isRead
  })
  const forget = () => sessionStorage.removeItem(key)
  return { answers, index, answered, isUnclear, toSend, forget }
}
