import type { Language } from '#shared/domain/states'

export type ListName = 'people' | 'crews' | 'sites' | 'briefings' | 'nearMisses' | 'board' | 'lookAhead' | 'audit' | 'mail' | 'renewals' | 'packets' | 'designations' | 'rules' | 'questions' | 'talks'

export interface ListWords { title: string, fileName: string, columns: readonly string[] }

/** How wide each list's columns are, in letters. */
export const listWidths: Record<ListName, readonly number[]> = {
  people: [24, 22, 10, 18, 18, 22, 16, 14, 13, 13, 32, 20],
  crews: [20, 24, 8, 60],
  sites: [24, 16, 20, 40],
  briefings: [13, 24, 34, 10, 22, 22, 10, 8, 68],
  nearMisses: [22, 24, 26, 60, 24, 50, 24],
  board: [24, 18, 26, 16, 13, 60],
  lookAhead: [13, 24, 18, 34],
  audit: [8, 24, 24, 26, 16, 30, 60],
  mail: [24, 30, 40, 12, 8, 24, 40],
  renewals: [34, 24, 24, 20, 24, 10, 24, 18, 16, 13],
  packets: [24, 24, 24, 13, 14, 10, 10, 68],
  designations: [26, 20, 26, 24, 50, 13, 13],
  rules: [40, 80],
  questions: [20, 24, 24, 30, 60, 60, 24],
  talks: [40, 10, 40, 20, 12],
}

export const listWords: Record<Language, Record<ListName, ListWords>> = {
  en: {
    people: { title: 'People', fileName: 'people', columns: ['Name', 'Sorted as', 'Badge', 'Role', 'Crew', 'Employer', 'Trade', 'Language', 'Hired on', 'Left on', 'E-mail', 'Phone'] },
    crews: { title: 'Crews', fileName: 'crews', columns: ['Crew', 'Foreman', 'People', 'Usual slots'] },
    sites: { title: 'Sites', fileName: 'sites', columns: ['Site', 'Code', 'Time zone', 'Address'] },
    briefings: { title: 'Briefings', fileName: 'briefings', columns: ['Date', 'Site', 'Talk', 'State', 'Opened', 'Run by', 'Signed', 'Late', 'SHA-256'] },
    nearMisses: { title: 'Reports', fileName: 'reports', columns: ['When', 'Site', 'Kind', 'What happened', 'Reported by', 'What was done', 'By'] },
    board: { title: 'Who may do what', fileName: 'board', columns: ['Person', 'Crew', 'Duty', 'Clearance', 'Until', 'What is missing'] },
    lookAhead: { title: 'Cards that end', fileName: 'look-ahead', columns: ['Last good day', 'Person', 'Crew', 'Credential'] },
    audit: { title: 'Audit', fileName: 'audit', columns: ['No.', 'When', 'Who', 'What', 'About', 'Name', 'SHA-256'] },
    mail: { title: 'Messages', fileName: 'messages', columns: ['Written', 'To', 'Subject', 'State', 'Tries', 'Sent', 'Last error'] },
    renewals: { title: 'Renewal sessions', fileName: 'renewals', columns: ['Credential', 'When', 'Site', 'Place', 'Trainer', 'State', 'Person', 'Crew', 'Attendance', 'Card ends'] },
    designations: { title: 'Named in writing', fileName: 'named', columns: ['Person', 'As', 'For', 'Site', 'Authority', 'From', 'To'] },
    rules: { title: 'Rules', fileName: 'rules', columns: ['Who', 'Asks for'] },
    questions: { title: 'Questions to trainers', fileName: 'questions', columns: ['Asked', 'Who', 'Trainer', 'Module', 'Question', 'Answer', 'Answered by'] },
    talks: { title: 'Talks', fileName: 'talks', columns: ['Talk', 'Minutes', 'Tags', 'Seasons', 'Company'] },
    packets: { title: 'Site packets', fileName: 'packets', columns: ['Site', 'Made by', 'Made', 'Works until', 'State', 'People', 'Looks', 'SHA-256'] },
  },
  es: {
    people: { title: 'Personas', fileName: 'personas', columns: ['Nombre', 'Ordenado como', 'Gafete', 'Rol', 'Cuadrilla', 'Empleador', 'Oficio', 'Idioma', 'Entró', 'Salió', 'Correo', 'Teléfono'] },
    crews: { title: 'Cuadrillas', fileName: 'cuadrillas', columns: ['Cuadrilla', 'Mayordomo', 'Personas', 'Puestos de costumbre'] },
    sites: { title: 'Obras', fileName: 'obras', columns: ['Obra', 'Código', 'Zona horaria', 'Dirección'] },
    briefings: { title: 'Pláticas del día', fileName: 'platicas', columns: ['Fecha', 'Obra', 'Plática', 'Estado', 'Abierta', 'La dio', 'Firmas', 'Tarde', 'SHA-256'] },
    nearMisses: { title: 'Reportes', fileName: 'reportes', columns: ['Cuándo', 'Obra', 'Clase', 'Qué pasó', 'Quién reportó', 'Qué se hizo', 'Por'] },
    board: { title: 'Quién puede hacer qué', fileName: 'tablero', columns: ['Persona', 'Cuadrilla', 'Puesto', 'Autorización', 'Hasta', 'Qué falta'] },
    lookAhead: { title: 'Tarjetas que vencen', fileName: 'proximas-semanas', columns: ['Último día bueno', 'Persona', 'Cuadrilla', 'Credencial'] },
    audit: { title: 'Registro de cambios', fileName: 'registro', columns: ['N.º', 'Cuándo', 'Quién', 'Qué', 'Sobre', 'Nombre', 'SHA-256'] },
    mail: { title: 'Mensajes', fileName: 'mensajes', columns: ['Escrito', 'Para', 'Asunto', 'Estado', 'Intentos', 'Enviado', 'Último error'] },
    renewals: { title: 'Sesiones de renovación', fileName: 'renovaciones', columns: ['Credencial', 'Cuándo', 'Obra', 'Lugar', 'Instructor', 'Estado', 'Persona', 'Cuadrilla', 'Asistencia', 'Vence'] },
    designations: { title: 'Nombramientos por escrito', fileName: 'nombramientos', columns: ['Persona', 'Como', 'Para', 'Obra', 'Autoridad', 'Desde', 'Hasta'] },
    rules: { title: 'Reglas', fileName: 'reglas', columns: ['Quién', 'Pide'] },
    questions: { title: 'Preguntas a instructores', fileName: 'preguntas', columns: ['Cuándo', 'Quién', 'Instructor', 'Módulo', 'Pregunta', 'Respuesta', 'Respondió'] },
    talks: { title: 'Pláticas', fileName: 'platicas-biblioteca', columns: ['Plática', 'Minutos', 'Temas', 'Temporadas', 'De la empresa'] },
    packets: { title: 'Expedientes de obra', fileName: 'expedientes', columns: ['Obra', 'Hecho por', 'Hecho', 'Sirve hasta', 'Estado', 'Personas', 'Vistas', 'SHA-256'] },
  },
}
