import path from 'node:path'
import { z } from 'zod'

/** Every setting of the product, all optional. The README lists them; nothing else reads the environment. */
const Settings = z.object({
  NODE_ENV: z.enum(['development', 'production', 'test']).default('development'),
  PORT: z.coerce.number().int().min(1).max(65_535).default(3000),
  SHEAFMARK_HOST: z.string().min(1).default('127.0.0.1'),
  SHEAFMARK_URL: z.url().optional(),
  SHEAFMARK_DATA: z.string().min(1).default('./data'),
  SHEAFMARK_DEMO: z.enum(['0', '1']).default('1'),
  SHEAFMARK_SCHOOL: z.string().min(1).max(80).optional(),
  SHEAFMARK_SMTP_URL: z.url({ protocol: /^smtps?$/ }).optional(),
  SHEAFMARK_MAIL_FROM: z.string().min(3).default('Sheafmark <sheafmark@localhost>'),
  SHEAFMARK_FAKE_SMTP_PORT: z.coerce.number().int().min(1).max(65_535).default(3025),
  SHEAFMARK_LOG: z.enum(['debug', 'info', 'warn', 'error', 'silent']).default('info'),
  SHEAFMARK_UPLOAD_LIMIT_MB: z.coerce.number().int().min(1).max(4096).default(2048),
  SHEAFMARK_THREADS: z.coerce.number().int().min(1).max(32).default(2),
  SHEAFMARK_KEEP_MONTHS: z.coerce.number().int().min(1).max(240).default(14),
})

export type Env = Readonly<z.output<typeof Settings> & { dataFolder: string; demo: boolean; url: string; schoolName: string; production: boolean }>

/** Reads settings from a plain object; the error names each faulty variable and what it may be. */
export function readEnv(raw: Record<string, string | undefined>): Env {
  const given = Object.fromEntries(Object.entries(raw).filter(([, value]) => value !== undefined && value !== ''))
  const parsed = Settings.safeParse(given)
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`)
    throw new Error(`These settings cannot be used:\n${lines.join('\n')}\nThe README lists every setting and what it may be.`)
  }
  const value = parsed.data
  const demo = value.SHEAFMARK_DEMO === '1'
  return {
    ...value,
    dataFolder: path.resolve(/* turbopackIgnore: true */ value.SHEAFMARK_DATA),
    demo,
    url: value.SHEAFMARK_URL ?? `http://localhost:${value.PORT}`,
    schoolName: value.SHEAFMARK_SCHOOL ?? (demo ? 'Kestrel Bay School' : 'Our school'),
    production: value.NODE_ENV === 'production',
  }
}

export const env: Env = readEnv(process.env)
