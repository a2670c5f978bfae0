import path from 'node:path'
import { knexConfig } from '@/db/knex-config'
import { env } from '@/lib/infra/env'

// For the Knex command line; the product itself migrates through scripts/migrate.ts.
export default knexConfig(path.join(env.dataFolder, 'sheafmark.sqlite'))
