// Before the servers start: settings checked, database up to date, the demo school filled on its first start.
import { spawnSync } from 'node:child_process'

async function prepare(): Promise<void> {
  const { env } = await import('@/lib/infra/env')
  const { db, putDb } = await import('@/db/knex')
  const { migrate } = await import('@/db/migrate')
  const { claimSchoolKind } = await import('./school-kind')
  const ran = await migrate(db())
  if (ran.length > 0) console.log(`Database brought up to date (${ran.length} steps).`)
  const first = await claimSchoolKind(db(), env.demo ? 'demo' : 'real')
  await putDb(null)
  if (!first || !env.demo) return
  console.log('Filling the demo school: reading its scanned class sets ...')
  const { status } = spawnSync(process.execPath, ['--import', 'tsx', 'scripts/seed.ts'], { stdio: 'inherit' })
  if (status !== 0) throw new Error('The demo school could not be filled. Delete the data folder and start again.')
}

try {
  await prepare()
} catch (error) {
  console.error(error instanceof Error ? error.message : error)
  process.exit(1)
}
