interface Problem { statusCode: number, code: string, fields: Record<string, string>, data: Record<string, unknown>, text: string }

/** Turns what `$fetch` threw into words in the reader's language; `fields` says which fields are wrong. */
export function useApiError() {
  const { t, te } = useNuxtApp().$i18n

  function toProblem(error: unknown): Problem {
    const { statusCode = 0, data } = (error ?? {}) as { statusCode?: number, data?: { message?: string, data?: Record<string, unknown> } }
    const details = data?.data ?? {}
    const code = typeof details.code === 'string' ? details.code : ''
    const fields = (details.fields ?? {}) as Record<string, string>
    const seconds = Number(details.retryAfter ?? 0)
    const key = [`errors.${code}`, `errors.status${statusCode}`].find(name => te(name, 'en')) ?? 'errors.unknown'
    return { statusCode, code, fields, data: details, text: statusCode === 0 ? t('errors.noSignal') : t(key, { seconds }) }
  }
  return { toProblem }
}
