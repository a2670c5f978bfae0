import { randomBytes } from 'node:crypto'
import { mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { env } from './env'

type Secrets = Readonly<{
  session: string
  /** What the first admin of a new school has to know: the start command prints it. */
  setUpCode: string
}>
let held: Secrets | undefined

/** The school's secrets, made once and kept in the data folder, readable by its owner alone. */
export function secrets(): Secrets {
  held ??= readOrMake(path.join(env.dataFolder, 'secrets.json'))
  return held
}

const fresh = (): Secrets => ({ session: randomBytes(48).toString('base64url'), setUpCode: randomBytes(6).toString('hex').replace(/(....)(?=.)/g, '$1-') })

function readOrMake(file: string): Secrets {
  mkdirSync(env.dataFolder, { recursive: true })
  try {
    // "wx" lets only one of two starting processes make the file; the other reads it.
    writeFileSync(file, JSON.stringify(fresh()), { flag: 'wx', mode: 0o600 })
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error
  }
  const kept = JSON.parse(readFileSync(file, 'utf8')) as Partial<Secrets>
  return kept.session && kept.setUpCode ? (kept as Secrets) : complete(file, kept)
}

/** A file without one of the secrets gets it; those it has stay. */
function complete(file: string, kept: Partial<Secrets>): Secrets {
  const whole = { ...fresh(), ...kept }
  writeFileSync(`${file}.new`, JSON.stringify(whole), { mode: 0o600 })
  renameSync(`${file}.new`, file)
  return whole
}
