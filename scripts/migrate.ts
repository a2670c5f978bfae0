import { db, putDb } from '@/db/knex'
import { migrate } from '@/db/migrate'

const ran = await migrate(db())
console.log(ran.length > 0 ? `Database brought up to date: ${ran.join(', ')}` : 'Database is up to date.')
await putDb(null)
