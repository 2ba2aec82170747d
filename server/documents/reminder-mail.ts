import type { Language } from '#shared/domain/states'
import type { CredentialItem } from '#shared/schemas/credentials'

interface ReminderWords {
  subject: (expired: number, ahead: number) => string
  hello: (name: string) => string
  own: string
  others: string
  expired: string
  ahead: string
  line: (item: { credential: string, date: string, days: number }) => string
  whatToDo: string
  seeAll: string
  more: (count: number) => string
}

const words: Record<Language, ReminderWords> = {
  en: {
    subject: (expired, ahead) => [expired && `${expired} expired`, ahead && `${ahead} expiring soon`].filter(Boolean).join(', ').replace(/^/, 'Credentials: '),
    hello: name => `${name},`,
    own: 'These are yours.',
    others: 'These are in your charge.',
    expired: 'Expired',
    ahead: 'Expiring soon',
    line: ({ credential, date, days }) => `${credential}: ${date} (${days < 0 ? `${-days} ${days === -1 ? 'day' : 'days'} ago` : days === 0 ? 'today' : `${days} ${days === 1 ? 'day' : 'days'} left`})`,
    whatToDo: 'Book the renewal now. When you have the new card, add it with a photo.',
    seeAll: 'See them all:',
    more: count => `- and ${count} more`,
  },
  es: {
    subject: (expired, ahead) => [expired && `${expired} ${expired === 1 ? 'vencida' : 'vencidas'}`, ahead && `${ahead} por vencer`].filter(Boolean).join(', ').replace(/^/, 'Credenciales: '),
    hello: name => `${name}:`,
    own: 'Estas son suyas.',
    others: 'Estas están a su cargo.',
    expired: 'Vencidas',
    ahead: 'Por vencer',
    line: ({ credential, date, days }) => `${credential}: ${date} (${days < 0 ? `hace ${-days} ${days === -1 ? 'día' : 'días'}` : days === 0 ? 'hoy' : days === 1 ? 'queda 1 día' : `quedan ${days} días`})`,
    whatToDo: 'Programe la renovación ahora. Cuando tenga la tarjeta nueva, agréguela con una foto.',
    seeAll: 'Véalas todas:',
    more: count => `- y ${count} más`,
  },
}

const formatOf = (tag: string) => new Intl.DateTimeFormat(tag, { weekday: 'short', month: 'short', day: 'numeric', year: 'numeric', timeZone: 'UTC' })
const formats: Record<Language, Intl.DateTimeFormat> = { en: formatOf('en-US'), es: formatOf('es-US') }
const dateText = (date: string, language: Language) => formats[language].format(new Date(`${date}T12:00:00Z`))
/** Lines of each part that a mail holds; the rest is behind its link. */
const mostLines = 200

/** The same for one person on paper: a heading, a line for each, and what to do. */
export function reminderLines({ recipient: { language }, items }: Pick<Reminder, 'recipient' | 'items'>): { title: string, lines: string[], whatToDo: string } {
  const said = words[language]
  const sorted = [...items].sort((a, b) => a.expiresOn! < b.expiresOn! ? -1 : 1)
  const ended = sorted.filter(item => item.daysLeft! < 0).length
  return {
    title: said.subject(ended, sorted.length - ended), whatToDo: said.whatToDo,
    lines: sorted.map(item => said.line({ credential: item.typeName[language], date: dateText(item.expiresOn!, language), days: item.daysLeft! })),
  }
}

/** The same in one short text message: the first that ends, how many more, and where to act. */
export function reminderText({ recipient: { language }, items, origin }: Pick<Reminder, 'recipient' | 'items' | 'origin'>): string {
  const [first] = [...items].sort((a, b) => a.expiresOn! < b.expiresOn! ? -1 : 1)
  const more = items.length - 1
  const line = words[language].line({ credential: first!.typeName[language], date: dateText(first!.expiresOn!, language), days: first!.daysLeft! })
  const rest = more === 0 ? '' : language === 'es' ? ` Y ${more} más.` : ` And ${more} more.`
  return `Pourwright: ${line}.${rest} ${origin}/my-cards`
}

export interface Reminder { recipient: { personId: string, name: string, language: Language }, items: CredentialItem[], origin: string }

/** One plain-text digest: what expired first, then what expires next, own ones without a name in front. */
export function reminderMail({ recipient, items, origin }: Reminder): { subject: string, body: string } {
  const { language, personId } = recipient
  const said = words[language]
  const isOwn = items.every(item => item.personId === personId)
  const sorted = [...items].sort((a, b) => a.expiresOn! < b.expiresOn! ? -1 : 1)
  const lineOf = (item: CredentialItem) => `- ${isOwn ? '' : `${item.sortName}: `}${said.line({ credential: item.typeName[language], date: dateText(item.expiresOn!, language), days: item.daysLeft! })}`
  const part = (title: string, part: CredentialItem[]) => part.length === 0 ? [] : [`${title} (${part.length})`, ...part.slice(0, mostLines).map(lineOf), ...(part.length > mostLines ? [said.more(part.length - mostLines)] : []), '']
  const expired = sorted.filter(item => item.daysLeft! < 0)
  const ahead = sorted.filter(item => item.daysLeft! >= 0)
  const link = origin ? [`${said.seeAll} ${origin}${isOwn ? '/my-cards' : '/credentials?within=60&includeExpired=true'}`] : []
  return {
    subject: said.subject(expired.length, ahead.length),
    body: [said.hello(recipient.name), '', isOwn ? said.own : said.others, '', ...part(said.expired, expired), ...part(said.ahead, ahead), said.whatToDo, ...link].join('\n'),
  }
}
