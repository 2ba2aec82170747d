import type { Language } from '#shared/domain/states'

/** The words of the printed sheet, in the reader's language. */
export const sheetWords = {
  en: {
    title: 'Toolbox talk: sign-in sheet', sheet: 'Sheet', addendum: 'Addendum',
    site: 'Site', address: 'Address', date: 'Date', time: 'Time', minutes: (count: number) => `${count} min`, topic: 'Topic', reference: 'Text', speaker: 'Given by', languages: 'Languages', interpreter: 'Interpreter', none: 'none',
    work: 'Planned work', weather: 'Weather', notes: 'Notes, questions, what is to be done',
    columns: ['No.', 'Name', 'Employer, trade', 'How', 'Time', 'Mark'],
    absent: 'Expected and not on this sheet', nobodyAbsent: 'Everybody expected is on this sheet.', host: 'visits', lang: { en: 'English', es: 'Spanish' },
    method: { ownPhone: 'own phone', foremanDevice: 'foreman\'s phone', addedByForeman: 'added by the foreman', paper: 'paper', siteTablet: 'site tablet', makeUp: 'make-up' },
    reason: { noPhone: 'no phone', deadPhone: 'dead phone', noSignal: 'no signal', late: 'late', cannotRead: 'can\'t read or write' },
    late: (by: string) => `late, briefed by ${by}`, withoutSignal: 'recorded without signal', presence: 'code scanned', enteredBy: (by: string) => `entered by ${by}`,
    heard: 'heard it (tap)', witnessed: (by: string) => `mark, witness ${by}`, checkRight: 'check question right', explained: (by: string) => `explained again by ${by}`, explainedHere: 'explained again on the screen',
    sealed: (at: string, by: string) => `Sealed ${at} by ${by}.`, sealedByDay: (at: string) => `Sealed ${at} by the end of the site's day; nobody had sealed it.`, clock: 'The server\'s clock was set by hand: test or demo.',
    allowance: (person: string, type: string, by: string) => `For this shift only: ${person}'s card "${type}", not verified yet, looked at and allowed by ${by}.`,
    hash: 'SHA-256 of this sheet', previous: 'Sheet before it', first: 'first sheet of this site', recheck: 'Recheck it at', sources: 'Company record. It does not replace an outside licence or certificate.', correction: 'Correction', lateSignIn: 'Sign-in after the seal',
    tags: { stack: 'stack', steel: 'steel', brace: 'brace', pour: 'pour', unbrace: 'unbrace', cut: 'cut', lift: 'lift', drive: 'drive' },
    role: { worker: 'worker', foreman: 'foreman', superintendent: 'superintendent', safety: 'safety manager', admin: 'office admin' },
    sky: { dry: 'dry', wet: 'rain or mud', snow: 'snow', dark: 'dark' }, wind: (mph: number) => `wind ${mph} mph`, humidity: (share: number) => `humidity ${share} %`, concrete: (degrees: number) => `concrete ${degrees} °F`,
  },
  es: {
    title: 'Plática de seguridad: hoja de firmas', sheet: 'Hoja', addendum: 'Anexo',
    site: 'Obra', address: 'Dirección', date: 'Fecha', time: 'Hora', minutes: (count: number) => `${count} min`, topic: 'Tema', reference: 'Texto', speaker: 'La dio', languages: 'Idiomas', interpreter: 'Intérprete', none: 'ninguno',
    work: 'Trabajo del día', weather: 'Clima', notes: 'Notas, preguntas, lo que hay que hacer',
    columns: ['N.º', 'Nombre', 'Empresa, oficio', 'Cómo', 'Hora', 'Marca'],
    absent: 'Se esperaban y no están en esta hoja', nobodyAbsent: 'Todos los que se esperaban están en esta hoja.', host: 'visita a', lang: { en: 'inglés', es: 'español' },
    method: { ownPhone: 'teléfono propio', foremanDevice: 'teléfono del mayordomo', addedByForeman: 'anotado por el mayordomo', paper: 'papel', siteTablet: 'tableta de la obra', makeUp: 'reposición' },
    reason: { noPhone: 'no tiene teléfono', deadPhone: 'teléfono sin pila', noSignal: 'sin señal', late: 'llegó tarde', cannotRead: 'no lee o no escribe' },
    late: (by: string) => `tarde, se la dio ${by}`, withoutSignal: 'registrado sin señal', presence: 'código escaneado', enteredBy: (by: string) => `lo anotó ${by}`,
    heard: 'la escuchó (toque)', witnessed: (by: string) => `marca, testigo ${by}`, checkRight: 'pregunta de repaso correcta', explained: (by: string) => `explicado otra vez por ${by}`, explainedHere: 'explicado otra vez en la pantalla',
    sealed: (at: string, by: string) => `Sellada el ${at} por ${by}.`, sealedByDay: (at: string) => `Sellada el ${at} al terminar el día de la obra; nadie la había sellado.`, clock: 'El reloj del servidor se puso a mano: prueba o demostración.',
    allowance: (person: string, type: string, by: string) => `Solo por este turno: la credencial "${type}" de ${person}, sin verificar, la revisó y la permitió ${by}.`,
    hash: 'SHA-256 de esta hoja', previous: 'Hoja anterior', first: 'primera hoja de esta obra', recheck: 'Revísela en', sources: 'Registro de la empresa. No reemplaza una licencia ni un certificado de afuera.', correction: 'Corrección', lateSignIn: 'Firma después del sello',
    tags: { stack: 'poner bloques', steel: 'varilla', brace: 'puntales', pour: 'colado', unbrace: 'quitar puntales', cut: 'cortar', lift: 'izar carga', drive: 'manejar equipo' },
    role: { worker: 'trabajador', foreman: 'mayordomo', superintendent: 'superintendente', safety: 'encargado de seguridad', admin: 'administración' },
    sky: { dry: 'seco', wet: 'lluvia o lodo', snow: 'nieve', dark: 'poca luz' }, wind: (mph: number) => `viento ${mph} mph`, humidity: (share: number) => `humedad ${share} %`, concrete: (degrees: number) => `concreto ${degrees} °F`,
  },
} as const satisfies Record<Language, unknown>

export type SheetWords = (typeof sheetWords)[Language]
