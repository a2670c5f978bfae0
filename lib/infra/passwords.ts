import { hash, verify } from '@node-rs/argon2'

// Argon2id with the memory, passes and lanes of OWASP's password storage advice (19 MiB, 2, 1).
const settings = { memoryCost: 19_456, timeCost: 2, parallelism: 1 }

export async function hashPassword(password: string): Promise<string> {
  return hash(password, settings)
}

/** Takes as long for an account without a password as for a wrong one, so that accounts cannot be told apart by time. */
export async function passwordFits(stored: string | null, password: string): Promise<boolean> {
  const against = stored ?? (await blindHash())
  const fits = await verify(against, password)
  return stored !== null && fits
}

let blind: Promise<string> | undefined
function blindHash(): Promise<string> {
  blind ??= hashPassword('no account has this password')
  return blind
}
