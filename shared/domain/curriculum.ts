import type { Bilingual } from './states'

/** One block of the training wall. Courses count from the bottom, positions from the left. */
export interface CurriculumModule {
  slug: string
  course: number
  position: number
  title: Bilingual
  /** At most two short words, for the wall drawing. */
  shortTitle: Bilingual
  /** Codes of the duties that it serves. */
  duties: readonly string[]
}

const block = (slug: string, course: number, position: number, title: [string, string], shortTitle: [string, string], duties: string[]): CurriculumModule => ({
  slug, course, position, title: { en: title[0], es: title[1] }, shortTitle: { en: shortTitle[0], es: shortTitle[1] }, duties,
})

/** The whole wall, bottom course first, left to right. */
export const modules: readonly CurriculumModule[] = [
  block('ready-for-site', 1, 0, ['Ready for site', 'Listo para la obra'], ['Ready for site', 'Listo para la obra'], []),
  block('working-at-height', 1, 1, ['Working at height', 'Trabajo en alturas'], ['Working at height', 'En alturas'], ['brace-hand', 'hose-hand', 'vibrator-hand']),
  block('what-the-wall-is-made-of', 1, 2, ['What the wall is made of', 'De qué está hecho el muro'], ['What the wall is', 'De qué es el muro'], ['stacker']),
  block('footings-and-layout', 2, 0, ['Footings and layout', 'Zapatas y trazo'], ['Footings, layout', 'Zapatas, trazo'], ['stacker']),
  block('tools-and-cutting', 2, 1, ['Tools and cutting', 'Herramientas y cortes'], ['Tools and cutting', 'Herramienta y corte'], ['stacker', 'brace-hand', 'rebar-hand']),
  block('running-bond', 3, 0, ['Running bond', 'Cuatrapeado'], ['Running bond', 'Cuatra-peado'], ['stacker']),
  block('stacking', 3, 1, ['Stacking', 'Apilar bloques'], ['Stacking', 'Apilar'], ['stacker']),
  block('steel', 3, 2, ['Steel', 'Varilla'], ['Steel', 'Varilla'], ['rebar-hand']),
  block('openings', 4, 0, ['Openings', 'Huecos y marcos'], ['Openings', 'Huecos'], ['stacker', 'brace-hand']),
  block('bracing-and-plumb', 4, 1, ['Bracing and plumb', 'Puntales y plomo'], ['Bracing', 'Puntales'], ['brace-hand']),
  block('concrete-for-walls', 5, 0, ['Concrete for walls', 'Concreto para muros'], ['Concrete for walls', 'Concreto para muros'], ['vibrator-hand', 'pour-lead']),
  block('before-the-pour', 5, 1, ['Before the pour', 'Antes del colado'], ['Before the pour', 'Antes del colado'], ['wall-watcher', 'pour-lead']),
  block('pump-and-hose', 5, 2, ['Pump and hose', 'Bomba y manguera'], ['Pump and hose', 'Bomba y manguera'], ['hose-hand', 'pump-spotter']),
  block('pour-rate', 6, 0, ['Pour rate', 'Velocidad de colado'], ['Pour rate', 'Velocidad'], ['vibrator-hand', 'hose-hand', 'pour-lead']),
  block('blowout-response', 6, 1, ['Blowout response', 'Qué hacer en un reventón'], ['Blowout response', 'Reventón'], ['hose-hand', 'wall-watcher', 'pump-spotter', 'pour-lead']),
  block('pour-lead', 7, 0, ['Pour lead', 'Encargado del colado'], ['Pour lead', 'Encargado del colado'], ['pour-lead']),
]
