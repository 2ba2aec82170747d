import type { Bilingual, ModuleState, SeededDutyCode } from './states'

/** One taught topic and its place on the training wall. */
export interface Module {
  /** Also the code of the credential type that passing the module issues. */
  slug: string
  title: Bilingual
  /** For the block on the wall: two short lines at most on a phone. */
  shortTitle: Bilingual
  /** Course of blocks, 1 at the bottom to 7 at the top. */
  course: number
  /** Place in its course, from the left, 0 first. */
  position: number
  /** Left edge in half blocks from the left end of the wall; a block is two half blocks long. */
  left: number
  /** Duties that the module serves. */
  duties: readonly SeededDutyCode[]
  /** Slugs of the blocks that touch this one from below. */
  restsOn: readonly string[]
}

/** Whole blocks in each course, from the bottom. In courses of two, half blocks fill both ends. */
export const blocksInCourse = [3, 2, 3, 2, 3, 2, 1] as const

/** Length of the wall in half blocks. */
export const wallLength = 6

const BLOCK_LENGTH = 2

type Topic = Pick<Module, 'slug' | 'title' | 'shortTitle' | 'duties'>

function topic(slug: string, [en, es]: [string, string], [shortEn, shortEs]: [string, string], duties: readonly SeededDutyCode[]): Topic {
  return { slug, title: { en, es }, shortTitle: { en: shortEn, es: shortEs }, duties }
}

const everyDuty: readonly SeededDutyCode[] = [
  'stacker', 'brace-hand', 'rebar-hand', 'hose-hand', 'vibrator-hand', 'wall-watcher', 'pump-spotter', 'telehandler-operator', 'pour-lead',
]

/** The topics from the left end of the bottom course to the top of the wall. */
const topics: readonly Topic[] = [
  topic('ready-for-site', ['Ready for site', 'Listo para la obra'], ['Ready for site', 'Listo para la obra'], everyDuty),
  topic('working-at-height', ['Working at height', 'Trabajo en altura'], ['Working at height', 'Trabajo en altura'],
    ['stacker', 'brace-hand', 'rebar-hand', 'hose-hand', 'vibrator-hand', 'pour-lead']),
  topic('what-the-wall-is-made-of', ['What the wall is made of', 'De qué está hecho el muro'], ['What the wall is', 'Qué lleva el muro'], everyDuty),
  topic('footings-and-layout', ['Footings and layout', 'Zapatas y trazo'], ['Footings, layout', 'Zapatas y trazo'], ['stacker', 'rebar-hand']),
  topic('tools-and-cutting', ['Tools and cutting', 'Herramienta y cortes'], ['Tools and cutting', 'Herramienta y cortes'], ['stacker', 'brace-hand', 'rebar-hand']),
  topic('running-bond', ['Running bond', 'Cuatrapeado'], ['Running bond', 'Cuatrapeado'], ['stacker']),
  topic('stacking', ['Stacking', 'Apilar bloques'], ['Stacking', 'Apilar bloques'], ['stacker']),
  topic('steel', ['Steel', 'Varilla'], ['Steel', 'Varilla'], ['rebar-hand']),
  topic('openings', ['Openings', 'Puertas y ventanas'], ['Openings', 'Puertas y ventanas'], ['stacker', 'brace-hand']),
  topic('bracing-and-plumb', ['Bracing and plumb', 'Puntales y plomo'], ['Bracing', 'Puntales y plomo'], ['brace-hand', 'wall-watcher']),
  topic('concrete-for-walls', ['Concrete for walls', 'Concreto para muros'], ['Concrete for walls', 'Concreto para muros'], ['vibrator-hand', 'pour-lead']),
  topic('before-the-pour', ['Before the pour', 'Antes del colado'], ['Before the pour', 'Antes del colado'], ['wall-watcher', 'pour-lead']),
  topic('pump-and-hose', ['Pump and hose', 'Bomba y manguera'], ['Pump and hose', 'Bomba y manguera'], ['hose-hand', 'pump-spotter']),
  topic('pour-rate', ['Pour rate', 'Ritmo del colado'], ['Pour rate', 'Ritmo del colado'], ['vibrator-hand', 'hose-hand', 'pour-lead']),
  topic('blowout-response', ['Blowout response', 'Qué hacer en un reventón'], ['Blowout response', 'En un reventón'],
    ['hose-hand', 'wall-watcher', 'pump-spotter', 'pour-lead']),
  topic('pour-lead', ['Pour lead', 'Encargado del colado'], ['Pour lead', 'Encargado del colado'], ['pour-lead']),
]

/**
 * The slugs of the blocks that touch a block from below: those in the course under it that share some of its
 * length. A corner alone is no touch.
 */
export function blocksBelow(block: Pick<Module, 'course' | 'left'>, all: readonly Pick<Module, 'slug' | 'course' | 'left'>[]): string[] {
  return all
    .filter(other => other.course === block.course - 1 && Math.abs(other.left - block.left) < BLOCK_LENGTH)
    .map(other => other.slug)
}

function layOut(): Module[] {
  const blocks = blocksInCourse.flatMap((count, index) =>
    Array.from({ length: count }, (_, position) => ({
      course: index + 1, position, left: (wallLength - count * BLOCK_LENGTH) / 2 + position * BLOCK_LENGTH,
    })))
  const placed = topics.flatMap((one, index) => {
    const block = blocks[index]
    return block ? [{ ...one, ...block }] : []
  })
  return placed.map(block => ({ ...block, restsOn: blocksBelow(block, placed) }))
}

/** The 16 modules in running bond, from the left end of the bottom course to the top. */
export const modules: readonly Module[] = layOut()

/** The module with a slug, or undefined. */
export function moduleBySlug(slug: string): Module | undefined {
  return modules.find(module => module.slug === slug)
}

/** What is known of one person and one module. */
export interface ModuleProgress {
  /** The module has content. */
  isWritten: boolean
  /** A hands-on checklist stands between the quiz and the credential. */
  hasChecklist: boolean
  /** A lesson was read or the quiz was tried. */
  isStarted: boolean
  /** The quiz was passed, and what it led to has not run out since. */
  isQuizPassed: boolean
  /** The person's credential of the module counts today. */
  isHeld: boolean
}

const NOTHING: ModuleProgress = { isWritten: false, hasChecklist: false, isStarted: false, isQuizPassed: false, isHeld: false }

/**
 * The state of every block for one person, by slug; a module that `progressOf` does not know is unwritten.
 * Laid: the credential is held, or the quiz is passed where there is no checklist. Passed: the hands-on is
 * awaited. A block opens when the written ones it rests on are laid; unwritten ones block nothing. One that was
 * started and whose ground has run out since waits again.
 */
export function wallStates(progressOf: (slug: string) => ModuleProgress | undefined): Map<string, ModuleState> {
  const progress = new Map(modules.map(module => [module.slug, progressOf(module.slug) ?? NOTHING]))
  return new Map(modules.map(module => [module.slug, stateOf(module, progress)]))
}

/** The block to go on with: the first one started, otherwise the first open one, from the bottom; null when there is none. */
export function nextBlock(states: ReadonlyMap<string, ModuleState>): Module | null {
  const first = (wanted: ModuleState) => modules.find(module => states.get(module.slug) === wanted)
  return first('started') ?? first('open') ?? null
}

function stateOf(module: Module, progress: ReadonlyMap<string, ModuleProgress>): ModuleState {
  const own = progress.get(module.slug) ?? NOTHING
  if (isLaid(own)) return 'laid'
  if (!own.isWritten) return 'unwritten'
  if (own.isQuizPassed) return 'passed'
  const isOnGround = module.restsOn.every((slug) => {
    const below = progress.get(slug) ?? NOTHING
    return !below.isWritten || isLaid(below)
  })
  if (!isOnGround) return 'waiting'
  return own.isStarted ? 'started' : 'open'
}

function isLaid(progress: ModuleProgress): boolean {
  return progress.isHeld || (progress.isWritten && progress.isQuizPassed && !progress.hasChecklist)
}
