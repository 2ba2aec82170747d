// A mail server for demos and tests: takes every message on this machine, keeps it as .eml in a folder and prints a
// line. It passes nothing on. MAIL_PORT (2525) and MAIL_FOLDER (.data/mail) choose another port and folder. With
// TEXT_PORT it also plays the gateway for text messages: what is posted there is printed and kept as .json.
import { mkdirSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:http'
import { join, resolve } from 'node:path'
import { SMTPServer } from 'smtp-server'

const port = Number(process.env.MAIL_PORT || process.env.PORT || 2525)
const folder = resolve(process.env.MAIL_FOLDER || join(import.meta.dirname, '../.data/mail'))
mkdirSync(folder, { recursive: true })

/** A header as people read it; `=?UTF-8?…?=` words are put back into letters. */
function headerOf(message, name) {
  const head = message.split(/\r?\n\r?\n/, 1)[0].replace(/\r?\n[ \t]+/g, ' ')
  const value = new RegExp(`^${name}: (.*)$`, 'im').exec(head)?.[1] ?? ''
  return value.replace(/\?= +=\?/g, '?==?').replace(/=\?utf-8\?([bq])\?(.*?)\?=/gi, (_, kind, text) => {
    if (kind.toLowerCase() === 'b') return Buffer.from(text, 'base64').toString('utf8')
    return Buffer.from(text.replace(/_/g, ' ').replace(/=([0-9a-f]{2})/gi, (_, hex) => String.fromCharCode(parseInt(hex, 16))), 'latin1').toString('utf8')
  })
}

let count = 0
const server = new SMTPServer({
  authOptional: true,
  disabledCommands: ['STARTTLS', 'AUTH'],
  size: 10_000_000,
  onData(stream, session, done) {
    const parts = []
    stream.on('data', part => parts.push(part))
    stream.on('error', done)
    stream.on('end', () => {
      const message = Buffer.concat(parts)
      const stamp = new Date().toISOString().replace(/[:.]/g, '-')
      const file = join(folder, `${stamp}-${String(++count).padStart(4, '0')}.eml`)
      writeFileSync(file, message)
      const to = session.envelope.rcptTo.map(recipient => recipient.address).join(', ')
      console.log(`[mail] to ${to}: ${headerOf(message.toString('utf8'), 'Subject')}  (${file})`)
      done()
    })
  },
})
server.on('error', (error) => {
  console.error(`[mail] ${error.message}`)
  if (error.code === 'EADDRINUSE') process.exit(1)
})
server.listen(port, '127.0.0.1', () => console.log(`[mail] Catching mail on 127.0.0.1:${port}; it is kept in ${folder}`))

if (process.env.TEXT_PORT) {
  createServer((request, answer) => {
    const parts = []
    request.on('data', part => parts.push(part))
    request.on('end', () => {
      const text = Buffer.concat(parts).toString('utf8')
      try {
        const message = JSON.parse(text)
        writeFileSync(join(folder, `text-${String(message.id).replace(/[^\w-]/g, '')}.json`), text)
        console.log(`[text] to ${message.to}: ${message.text}`)
        answer.writeHead(204).end()
      }
      catch {
        answer.writeHead(400).end()
      }
    })
  }).listen(Number(process.env.TEXT_PORT), '127.0.0.1')
}
