import { randomBytes } from 'node:crypto'
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { env } from './env'

type Secrets = Readonly<{ session: string }>
let held: Secrets | undefined

/** The school's secrets, made once and kept in the data folder, readable by its owner alone. */
export function secrets(): Secrets {
  held ??= readOrMake(path.join(env.dataFolder, 'secrets.json'))
  return held
}

function readOrMake(file: string): Secrets {
  mkdirSync(env.dataFolder, { recursive: true })
  try {
    // "wx" lets only one of two starting processes make the file; the other reads it.
    writeFileSync(file, JSON.stringify({ session: randomBytes(48).toString('base64url') }), { flag: 'wx', mode: 0o600 })
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error
  }
  return JSON.parse(readFileSync(file, 'utf8')) as Secrets
}
