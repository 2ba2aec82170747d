import type { Language } from '#shared/domain/states'
import type { Db } from './database'

export interface RoundRow { id: string, typeId: string, siteId: string, place: string, trainer: string, startsAt: string, minutes: number, seats: number, state: 'planned' | 'held' | 'cancelled', note: string | null, version: number, createdBy: string, createdAt: string }
export type SeatState = 'invited' | 'waiting' | 'present' | 'absent'
export interface SeatRow { roundId: string, personId: string, state: SeatState, addedAt: string, credentialId: string | null }
export type NamedSeat = SeatRow & { name: string, email: string | null, language: Language, crew: string | null, expiresOn: string | null }

/** Keeps a booked session. */
export const insertRound = (db: Db, row: Omit<RoundRow, 'version' | 'state' | 'note'>): Promise<unknown> => db('renewalRounds').insert({ ...row, state: 'planned', version: 1 })

/** Changes a session that still has this version and counts it up; false when somebody was first. */
export async function updateRound(db: Db, { id, version }: { id: string, version: number }, changes: Partial<RoundRow>): Promise<boolean> {
  return await db('renewalRounds').where({ id, version }).update({ ...changes, version: version + 1 }) === 1
}

/** Sessions, the next first: all, one, or those that somebody has a seat in from an instant on. */
export async function listRounds(db: Db, match: { id?: string, personId?: string, from?: string } = {}): Promise<RoundRow[]> {
  return db('renewalRounds').modify((query) => {
    if (match.id !== undefined) query.where({ id: match.id })
    if (match.from !== undefined) query.where('startsAt', '>=', match.from)
    if (match.personId !== undefined) query.whereIn('id', db('renewalSeats').where({ personId: match.personId }).select('roundId'))
  }).orderBy([{ column: 'startsAt', order: 'desc' }, { column: 'id' }]).limit(200)
}

/** Everybody with a seat in these sessions, in the order of coming; `expiresOn` is when their latest card of the session's type ends. */
export async function listSeats(db: Db, roundIds: readonly string[]): Promise<NamedSeat[]> {
  return db('renewalSeats as s').join('people as p', 'p.id', 's.personId').join('renewalRounds as r', 'r.id', 's.roundId').leftJoin('crews as w', 'w.id', 'p.crewId')
    .whereIn('s.roundId', roundIds).orderBy(['s.addedAt', 'p.sortName', 'p.id'])
    .select('s.*', 'p.name', 'p.email', 'p.language', 'w.name as crew')
    .select({ expiresOn: db('credentials as c').whereRaw('c.person_id = s.person_id and c.type_id = r.type_id and c.verification = \'verified\' and c.withdrawn_on is null').max('expiresOn') })
}

/** Adds a person to a session; nothing when they are in it. */
export const insertSeat = (db: Db, seat: Omit<SeatRow, 'credentialId'>): Promise<unknown> => db('renewalSeats').insert({ ...seat, credentialId: null }).onConflict(['roundId', 'personId']).ignore()

/** Changes a seat. */
export const updateSeat = (db: Db, { roundId, personId }: { roundId: string, personId: string }, changes: Partial<Pick<SeatRow, 'state' | 'credentialId'>>): Promise<unknown> => db('renewalSeats').where({ roundId, personId }).update(changes)

/** Takes a person out of a session. */
export const deleteSeat = (db: Db, roundId: string, personId: string): Promise<unknown> => db('renewalSeats').where({ roundId, personId }).del()

/** Who has a seat in a planned session from an instant on, as `personId/type code`. */
export async function listSeated(db: Db, from: string): Promise<Set<string>> {
  const rows: { personId: string, code: string }[] = await db('renewalSeats').join('renewalRounds', 'renewalRounds.id', 'renewalSeats.roundId').join('credentialTypes', 'credentialTypes.id', 'renewalRounds.typeId')
    .where({ 'renewalRounds.state': 'planned' }).where('startsAt', '>=', from).select('personId', 'code')
  return new Set(rows.map(row => `${row.personId}/${row.code}`))
}
