import { readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import { readEnv } from './env'

describe('settings', () => {
  it('are all optional', () => {
    expect(readEnv({})).toMatchObject({ PORT: 3000, demo: true, schoolName: 'Kestrel Bay School', url: 'http://localhost:3000' })
  })

  it('take an empty value as not set', () => {
    expect(readEnv({ SHEAFMARK_SMTP_URL: '', PORT: '' }).PORT).toBe(3000)
  })

  it('name each faulty variable at once', () => {
    const read = () => readEnv({ PORT: 'many', SHEAFMARK_DEMO: 'yes', SHEAFMARK_SMTP_URL: 'http://mail' })
    expect(read).toThrow(/PORT: .*\n.*SHEAFMARK_DEMO: .*\n.*SHEAFMARK_SMTP_URL: /s)
  })

  it('stand in the README, every one', () => {
    const source = readFileSync(path.join(import.meta.dirname, 'env.ts'), 'utf8')
    const names = [...source.matchAll(/^ {2}(PORT|SHEAFMARK_[A-Z_]+):/gm)].map((match) => match[1])
    const readme = readFileSync(path.join(import.meta.dirname, '../../README.md'), 'utf8')
    expect(names.length).toBeGreaterThan(10)
    expect(names.filter((name) => !readme.includes(`\`${name}\``))).toEqual([])
  })
})
