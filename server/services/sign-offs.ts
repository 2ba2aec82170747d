import { randomUUID } from 'node:crypto'
import { moduleBySlug } from '#shared/domain/curriculum'
import type { Language } from '#shared/domain/states'
import type { SignOffBody, SignOffMade, SignOffRequestList, SignOffRequestView } from '#shared/schemas/learning'
import { listUnusedPasses } from '../data/attempts'
import { appendAudit } from '../data/audit'
import type { Db } from '../data/database'
import { closeRequest, findOpenRequest, insertRequest, insertSignOff, listOpenRequests, type OpenRequest } from '../data/sign-offs'
import { assessedModules, isReached, requireAssessable } from './assessing'
import { issueWhenComplete } from './issuing'
import { progressOf } from './learning-progress'
import { notFound, Refusal } from './refusal'
import type { TaughtModule, Teaching } from './teaching'
import { countHandsOn } from './training-minutes'
import type { Work } from './work'

function requireChecklist(teaching: Teaching, slug: string): TaughtModule {
  if (!moduleBySlug(slug)) throw notFound('module')
  const taught = teaching.get(slug)
  if (!taught) throw new Refusal('conflict', 'notOpen', { message: 'This module is not written yet', data: { state: 'unwritten' } })
  if (taught.text.en.checklist.length === 0) throw new Refusal('unprocessable', 'noHandsOn', { message: 'This module has no hands-on', fields: { module: 'has no hands-on' } })
  return taught
}

async function requireGround(db: Db, work: Work, teaching: Teaching, personId: string, slug: string): Promise<void> {
  const state = (await progressOf(db, work, teaching, personId)).states.get(slug)
  if (state === 'waiting') throw new Refusal('conflict', 'notOpen', { message: 'The blocks under it are not laid yet', data: { state } })
}

/**
 * Asks for the hands-on of a module; asking again answers the request that is open. It may come before the quiz
 * (an experienced hand). 404 for no such module, 409 `notOpen` while the block waits, 422 `noHandsOn`.
 */
export async function askForSignOff(work: Work, teaching: Teaching, slug: string) {
  const { db, actor: { personId }, now } = work
  requireChecklist(teaching, slug)
  return db.transaction(async (trx) => {
    const open = await findOpenRequest(trx, { personId, module: slug })
    if (open) return { id: open.id, module: slug, requestedAt: open.requestedAt }
    await requireGround(trx, work, teaching, personId, slug)
    const request = { id: randomUUID(), personId, module: slug, requestedAt: now }
    await insertRequest(trx, request)
    return { id: request.id, module: slug, requestedAt: now }
  })
}

async function toRequestLine(work: Work, request: OpenRequest, language: Language) {
  const passes = await listUnusedPasses(work.db, [request.personId], request.module)
  return { ...request, title: moduleBySlug(request.module)?.title[language] ?? request.module, quizPassed: passes.length > 0 }
}

/** The open requests of people whom the actor may assess, oldest first; never their own. */
export async function listSignOffRequests(work: Work, teaching: Teaching, language: Language): Promise<SignOffRequestList> {
  const { db, actor, today } = work
  const assessed = await assessedModules(db, work, teaching)
  const items = []
  for (const request of await listOpenRequests(db, [...assessed.keys()])) {
    if (request.personId === actor.personId || !await isReached(db, assessed.get(request.module), request.personId, today)) continue
    items.push(await toRequestLine(work, request, language))
  }
  return { items }
}

/** One open request with the steps to go through; 404 when it is closed or not the actor's to assess. */
export async function readSignOffRequest(work: Work, teaching: Teaching, { id, language }: { id: string, language: Language }): Promise<SignOffRequestView> {
  const { db, actor, today } = work
  const request = await findOpenRequest(db, { id })
  const taught = request && teaching.get(request.module)
  if (!taught || request.personId === actor.personId) throw notFound('request')
  const assessed = await assessedModules(db, work, teaching)
  if (!await isReached(db, assessed.get(request.module), request.personId, today)) throw notFound('request')
  const { cautions, checklist } = taught.text[language]
  return { ...await toRequestLine(work, request, language), cautions, checklist }
}

function refuseWrongSteps(taught: TaughtModule, steps: SignOffBody['steps']): void {
  const asked = taught.text.en.checklist.map(step => step.id)
  const given = steps.map(step => step.id)
  const fields: Record<string, string> = {}
  for (const id of asked) if (!given.includes(id)) fields[`steps.${id}`] = 'is not answered'
  for (const [index, id] of given.entries()) {
    if (!asked.includes(id)) fields[`steps.${id}`] = 'is no step of this module'
    else if (given.indexOf(id) !== index) fields[`steps.${id}`] = 'is answered twice'
  }
  if (Object.keys(fields).length > 0) throw new Refusal('unprocessable', 'stepsMissing', { message: 'Every step is answered once', fields })
}

/**
 * Signs off a module's hands-on for somebody else: passed when every step was done. Issues the credential when the
 * quiz is passed too, otherwise waits for it. 404 for no such person or module, 403 `ownSignOff` and `notAssessor`,
 * 422 `stepsMissing`. A witness is no assessor: the mark is the assessor's own.
 */
export async function signOff(work: Work, teaching: Teaching, body: SignOffBody): Promise<SignOffMade> {
  const { db, actor, now } = work
  const taught = requireChecklist(teaching, body.module)
  const learner = await requireAssessable(db, work, teaching, body)
  if (body.mark.kind === 'witnessed') throw new Refusal('unprocessable', 'wrongMark', { message: 'The mark is the assessor\'s own', fields: { mark: 'must be a tap, typed or drawn' } })
  refuseWrongSteps(taught, body.steps)
  const passed = body.steps.every(step => step.ok)
  return db.transaction(async (trx) => {
    await requireGround(trx, work, teaching, learner.id, taught.slug)
    const signed = { id: randomUUID(), personId: learner.id, assessorId: actor.personId, module: taught.slug, steps: body.steps, mark: body.mark, passed, signedAt: now }
    await insertSignOff(trx, signed)
    await closeRequest(trx, learner.id, taught.slug, now)
    await countHandsOn(trx, work, { personId: learner.id, module: taught.slug, steps: body.steps.length })
    const { mark: _strokes, ...after } = signed
    await appendAudit(trx, { at: now, actorId: actor.personId, action: 'signOff.given', subject: { kind: 'signOff', id: signed.id }, after })
    const credentialId = passed ? await issueWhenComplete(trx, work, { personId: learner.id, module: taught }) : null
    return { id: signed.id, passed, ...(credentialId && { credentialId }) }
  })
}
