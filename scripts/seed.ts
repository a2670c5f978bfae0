// Fills an empty demo school. npm start runs it once, on the first start.
import { db, putDb } from '@/db/knex'
import { countUsers } from '@/db/users'
import { fillDemoSchool } from '@/seeds/fill-demo-school'

if ((await countUsers(db())) > 0) console.log('There are people here already; nothing was added.')
else await fillDemoSchool((line) => console.log(line))
await putDb(null)
process.exit(0)
