// Says where the school is open and, in the demo school, who can sign in.
import { env } from '@/lib/infra/env'
import { demoPassword, demoStaff, demoStudent } from '@/seeds/demo-people'

const address = process.argv[2] ?? env.url
const lines = [`Sheafmark is open at ${address}`, '']
if (env.demo) {
  lines.push(`Demo school ${env.schoolName}; everyone's password is ${demoPassword}:`)
  for (const { userName, says } of [...demoStaff, demoStudent]) lines.push(`  ${userName.padEnd(14)}${says}`)
}
lines.push('', 'Ctrl-C stops it.')
console.log(`\n${lines.join('\n')}\n`)
