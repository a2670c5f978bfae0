import type { APIRequestContext, APIResponse } from '@playwright/test'
import { errorStatus, type ErrorCode } from '@/lib/core/errors'
import { ListFile } from './actions'
import type { Answer } from './expectation'
import type { Carried } from './routes'

/** Asks for a page as an address typed by hand: redirections are told, not followed. */
export async function askPage(session: APIRequestContext, at: string): Promise<Answer> {
  const response = await session.get(at, { maxRedirects: 0 })
  return answerOf(response, leadsTo(response))
}

/**
 * The page alone, as the browser asks for it when it holds the layouts around it already. The answer is a stream, so what the page
 * refuses stands inside it.
 */
export async function askPagePart(session: APIRequestContext, at: string, tree: unknown): Promise<Answer> {
  const response = await session.get(at, { maxRedirects: 1, headers: { rsc: '1', 'next-router-state-tree': encodeURIComponent(JSON.stringify(tree)) } })
  const answer = await answerOf(response, '')
  const [, refused, to] = /"digest":"(?:NEXT_HTTP_ERROR_FALLBACK;(\d+)|NEXT_REDIRECT;\w+;([^;]+);)/.exec(answer.body) ?? []
  return { ...answer, status: refused ? Number(refused) : to ? 307 : answer.status, code: to ? pathWord(to) : '' }
}

/** Asks a route with its verb. */
export async function askRoute(session: APIRequestContext, verb: string, at: string, carried: Carried = {}): Promise<Answer> {
  const response = await session.fetch(at, { method: verb, maxRedirects: 0, ...carried })
  const answer = await answerOf(response, '')
  const code = response.headers()['content-type']?.startsWith('application/json') ? ((JSON.parse(answer.body || 'null') as { code?: string } | null)?.code ?? '') : ''
  return { ...answer, code }
}

/** Calls an action as the browser does: by its id, to a page that carries it, with its arguments. */
export async function askAction(session: APIRequestContext, id: string, at: string, args: readonly unknown[]): Promise<Answer> {
  const response = await session.post(at, { maxRedirects: 0, headers: { 'next-action': id, accept: 'text/x-component', ...typeOf(args) }, ...bodyOf(args) })
  const answer = await answerOf(response, '')
  const outcome = outcomeIn(answer.body)
  if (!outcome) return { ...answer, status: response.status(), code: `no outcome (${response.status()})` }
  return { ...answer, status: outcome.ok ? 200 : errorStatus[outcome.code!], code: outcome.code ?? 'ok' }
}

const typeOf = (args: readonly unknown[]): Record<string, string> => (args.some((arg) => arg instanceof ListFile) ? {} : { 'content-type': 'text/plain;charset=UTF-8' })

/** Plain values go as JSON; a form's own fields come first, then the arguments, which point at them. */
function bodyOf(args: readonly unknown[]): { data: string } | { multipart: FormData } {
  const file = args.find((arg) => arg instanceof ListFile)
  if (!file) return { data: JSON.stringify(args) }
  const form = new FormData()
  form.append('_1_file', new File([file.text], 'list.csv', { type: 'text/csv' }))
  form.append('0', JSON.stringify(args.map((arg) => (arg === file ? '$K1' : arg))))
  return { multipart: form }
}

/** The answer is a stream of lines; the first says which of them holds what the action gave back. */
function outcomeIn(body: string): { ok: boolean; code?: ErrorCode } | null {
  const at = /^0:\{.*?"a":"\$@([0-9a-f]+)"/m.exec(body)?.[1]
  const line = at === undefined ? undefined : new RegExp(`^${at}:(\\{.*)$`, 'm').exec(body)?.[1]
  return line === undefined ? null : (JSON.parse(line) as { ok: boolean; code?: ErrorCode })
}

function leadsTo(response: APIResponse): string {
  const to = response.headers()['location']
  return to === undefined ? '' : pathWord(new URL(to, response.url()).pathname)
}

function pathWord(pathname: string): string {
  return { '/sign-in': 'in', '/my-scripts': 'my', '/': 'home' }[pathname] ?? pathname
}

async function answerOf(response: APIResponse, code: string): Promise<Answer> {
  const type = response.headers()['content-type'] ?? ''
  const { 'cache-control': kept = '', vary = '' } = response.headers()
  const forOneOnly = kept.includes('no-store') || (kept.includes('private') && (kept.includes('no-cache') || /\bcookie\b/i.test(vary)))
  return { status: response.status(), code, forOneOnly, body: /^(text|application\/json)/.test(type) ? await response.text() : '' }
}
