import pino from 'pino'
import { env } from './env'

/** Plain JSON lines. Ids and codes only: no name, no comment, no password. */
export const log = pino({ level: env.SHEAFMARK_LOG, base: undefined })
