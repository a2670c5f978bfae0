// Says where the school is open and, in the demo school, who can sign in; in an empty one, how its first admin is made.
import { putDb } from '@/db/knex'
import { env } from '@/lib/infra/env'
import { secrets } from '@/lib/infra/secrets'
import { schoolIsEmpty } from '@/lib/tasks/school-is-empty'
import { demoPassword, demoStaff, demoStudents } from '@/seeds/demo-people'

const address = process.argv[2] ?? env.url
const lines = [`Sheafmark is open at ${address}`, '']
if (env.demo) {
  lines.push(`Demo school ${env.schoolName}; everyone's password is ${demoPassword}:`)
  for (const { userName, says } of [...demoStaff, ...demoStudents]) lines.push(`  ${userName.padEnd(14)}${says}`)
}
if (await schoolIsEmpty()) lines.push(`Nobody has an account yet. Make the first admin at ${address}/first-admin`, `with this set-up code: ${secrets().setUpCode}`)
await putDb(null)
lines.push('', 'Ctrl-C stops it.')
console.log(`\n${lines.join('\n')}\n`)
