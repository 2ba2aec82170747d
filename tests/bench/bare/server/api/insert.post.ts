import Database from 'better-sqlite3'

const db = new Database(process.env.BARE_DATABASE ?? '/tmp/bare.sqlite')
db.pragma('journal_mode = WAL')
db.pragma('synchronous = FULL')
db.exec('create table if not exists rows (id integer primary key, body text not null)')
const insert = db.prepare('insert into rows (body) values (?)')

/** One durable INSERT and nothing else. */
export default defineEventHandler(async (event) => {
  const body: unknown = await readBody(event)
  const { lastInsertRowid } = insert.run(JSON.stringify(body))
  setResponseStatus(event, 201)
  return { id: Number(lastInsertRowid) }
})
