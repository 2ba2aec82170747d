import { mkdirSync } from 'node:fs'
import { dirname, resolve } from 'node:path'
import { knexConfigFor } from './server/data/knex-config'

const filename = resolve(process.env.NUXT_DATABASE_PATH || '.data/pourwright.sqlite')
mkdirSync(dirname(filename), { recursive: true })

/** For the Knex command line (`npm run knex -- migrate:status`); the server reads the same settings. */
export default {
  ...knexConfigFor(filename),
  migrations: { directory: './migrations', extension: 'ts' },
  seeds: { directory: './seeds', extension: 'ts' },
}
