import type { Page } from 'playwright-core'
import type { BankItem } from '../../shared/domain/quiz-bank'
import type { Language } from '../../shared/domain/states'

/** Answers the question on the screen as `item`'s key says. */
async function answer(page: Page, item: BankItem, language: Language): Promise<void> {
  if (item.kind === 'number') return page.locator('fieldset input').fill(String(item.key.value))
  const textOf = (id: string) => item.options.find(option => option.id === id)!.text[language]
  if (item.kind === 'order') return putInOrder(page, item.key.map(textOf))
  for (const id of typeof item.key === 'string' ? [item.key] : item.key) {
    await page.locator('fieldset label').filter({ has: page.getByText(textOf(id), { exact: true }) }).click()
  }
}

async function putInOrder(page: Page, wanted: readonly string[]): Promise<void> {
  for (const [to, text] of wanted.entries()) {
    for (;;) {
      const now = await page.locator('fieldset ol > li > span:nth-child(2)').allInnerTexts()
      const from = now.indexOf(text)
      if (from < 0) throw new Error(`no step "${text}" among ${now.join(' | ')}`)
      if (from <= to) break
      await page.locator('fieldset ol > li').nth(from).getByRole('button').first().click()
    }
  }
}

/** Answers every question of the running quiz right, in whatever order they come, up to the review. */
export async function answerEverythingRight(page: Page, items: readonly BankItem[], language: Language): Promise<void> {
  const heading = page.locator('h1.quiz-stem')
  const reviewTitle = language === 'es' ? 'Revise antes de enviar' : 'Check before you send'
  for (;;) {
    const stem = await heading.innerText()
    if (stem === reviewTitle) return
    const item = items.find(one => one.stem[language] === stem)
    if (!item) throw new Error(`no item asks "${stem}"`)
    await answer(page, item, language)
    await page.getByRole('button', { name: language === 'es' ? /^(Siguiente|Revisar mis respuestas)$/ : /^(Next|Check my answers)$/ }).click()
    await page.waitForFunction(before => document.querySelector('h1.quiz-stem')?.textContent?.trim() !== before, stem)
  }
}
