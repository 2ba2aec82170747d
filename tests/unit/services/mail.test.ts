import { simpleParser } from 'mailparser'
import { SMTPServer } from 'smtp-server'
import type { AddressInfo } from 'node:net'
import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '../../../server/data/database'
import { getMail, type MailRow } from '../../../server/data/mail'
import { queueMail } from '../../../server/services/mail'
import { readMailQueue, retryMail } from '../../../server/services/mail-queue'
import { sendDueMail, smtpDelivery, waitMinutes } from '../../../server/services/mail-sending'
import { actorOf, insertTestPerson, openTestDatabase, workFor } from '../../support/work'

const start = '2026-12-01T13:30:00.000Z'
const after = (minutes: number) => new Date(Date.parse(start) + minutes * 60_000).toISOString()
const letter = { key: 'one', recipient: 'ana@test.example', subject: 'Renew a card', body: 'First line\nhttps://pourwright.test/reset/abcDEF123_-456789', now: start }
const refuseAll = () => Promise.reject(new Error('451 try later'))
let db: Db

beforeEach(async () => {
  db = await openTestDatabase()
  return () => db.destroy()
})
const only = async (): Promise<MailRow> => (await getMail(db, (await db('mail').first('id')).id))!

describe('the mail queue', () => {
  it('takes each key once', async () => {
    await queueMail(db, letter)
    await queueMail(db, { ...letter, subject: 'Another' })
    expect(await db('mail').select('subject')).toEqual([{ subject: 'Renew a card' }])
  })

  it('keeps nothing of a transaction that was rolled back', async () => {
    await db.transaction(async (trx) => {
      await queueMail(trx, letter)
      throw new Error('undo')
    }).catch(() => undefined)
    expect(await db('mail').first()).toBeUndefined()
  })

  it('refuses more than one address, and lets no subject start a header', async () => {
    await expect(queueMail(db, { ...letter, recipient: 'a@test.example, b@test.example' })).rejects.toThrow('Not one mail address')
    await expect(queueMail(db, { ...letter, recipient: 'a@test.example\r\nBcc: b@test.example' })).rejects.toThrow('Not one mail address')
    await queueMail(db, { ...letter, subject: 'Hello\r\nBcc: b@test.example' })
    expect((await only()).subject).toBe('Hello Bcc: b@test.example')
  })
})

describe('sending', () => {
  it('marks what went out and cuts the link that lets somebody in', async () => {
    await queueMail(db, letter)
    const bodies: string[] = []
    expect(await sendDueMail(db, async mail => void bodies.push(mail.body), () => after(1))).toBe(1)
    expect(bodies[0]).toContain('/reset/abcDEF123_-456789')
    expect(await only()).toMatchObject({ state: 'sent', tries: 1, sentAt: after(1), body: 'First line\nhttps://pourwright.test/reset/…' })
    expect(await sendDueMail(db, refuseAll, () => after(2))).toBe(0)
  })

  it('waits 1, 2, 4 … minutes, six hours at most', () => {
    expect([1, 2, 3, 9, 10, 20].map(waitMinutes)).toEqual([1, 2, 4, 256, 360, 360])
  })

  it('tries again only when its time has come, and gives up after ten tries', async () => {
    await queueMail(db, letter)
    await sendDueMail(db, refuseAll, () => start)
    expect(await only()).toMatchObject({ state: 'queued', tries: 1, nextTryAt: after(1), lastError: '451 try later' })
    await sendDueMail(db, refuseAll, () => after(0.9))
    expect((await only()).tries).toBe(1)
    for (let tried = 1; tried < 10; tried++) {
      const { nextTryAt } = await only()
      await sendDueMail(db, refuseAll, () => nextTryAt)
    }
    expect(await only()).toMatchObject({ state: 'failed', tries: 10 })
  })

  it('never runs twice at once', async () => {
    await queueMail(db, letter)
    let delivered = 0
    const slowly = async () => {
      await new Promise(done => setTimeout(done, 30))
      delivered++
    }
    await Promise.all([sendDueMail(db, slowly, () => start), sendDueMail(db, slowly, () => start)])
    expect(delivered).toBe(1)
  })

  it('goes on with the next message when one is refused', async () => {
    await queueMail(db, { ...letter, key: 'bad', recipient: 'bad@test.example' })
    await queueMail(db, { ...letter, key: 'good', recipient: 'good@test.example' })
    expect(await sendDueMail(db, async mail => (mail.recipient.startsWith('bad') ? refuseAll() : undefined), () => start)).toBe(1)
  })

  it('reaches a real mail server with its letters whole', async () => {
    const caught: string[] = []
    const server = new SMTPServer({ authOptional: true, disabledCommands: ['STARTTLS', 'AUTH'], onData(stream, _session, done) {
      let message = ''
      stream.on('data', part => message += part)
      stream.on('end', () => {
        caught.push(message)
        done()
      })
    } })
    await new Promise<void>(done => server.listen(0, '127.0.0.1', done))
    const { port } = server.server.address() as AddressInfo
    await queueMail(db, { ...letter, subject: 'Renueve su certificación de elevación', body: 'Señor Peña:\n.\nMañana a las 6:40.' })
    const { deliver, close } = smtpDelivery(`smtp://127.0.0.1:${port}`, 'Pourwright <pourwright@localhost>')
    await sendDueMail(db, deliver, () => start)
    close()
    await new Promise<void>(done => server.close(() => done()))
    const message = await simpleParser(caught[0]!)
    expect(message.subject).toBe('Renueve su certificación de elevación')
    expect(message.text?.trimEnd()).toBe('Señor Peña:\n.\nMañana a las 6:40.')
    expect(message.messageId).toBe(`<${(await only()).id}@pourwright>`)
  })
})

describe('the admin', () => {
  it('sees the queue without the links that let somebody in, and can retry what failed but not what was sent', async () => {
    await insertTestPerson(db, { id: 'office', role: 'admin' })
    await queueMail(db, letter)
    await db('mail').update({ state: 'failed', tries: 10, lastError: 'no' })
    const work = await workFor(db, actorOf('office', 'admin'))
    const [shown] = (await readMailQueue(work, { state: 'failed', page: 1, perPage: 50 })).items
    expect(shown).toMatchObject({ state: 'failed', lastError: 'no', body: 'First line\nhttps://pourwright.test/reset/…' })
    expect(await retryMail(work, shown!.id)).toMatchObject({ state: 'queued', tries: 0 })
    await sendDueMail(db, async () => undefined, () => after(60))
    await expect(retryMail(work, shown!.id)).rejects.toMatchObject({ code: 'alreadySent', kind: 'conflict' })
    await expect(retryMail(work, 'nothing')).rejects.toMatchObject({ kind: 'notFound' })
    expect(await db('audit').pluck('action')).toEqual(['mail.retried'])
  })
})
