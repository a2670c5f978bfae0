import { expect, type APIRequestContext } from '@playwright/test'
import { newId } from '@/lib/core/ids'
import { halves } from '@/lib/core/marks'
import type { Run, Strip } from '@/lib/core/run'
import type { Round } from '@/lib/core/stamp'

type Wanted = Readonly<{ address: string; paperId: string; questionId: string; round: Round; /** What the n-th unmarked strip deserves, in halves; null nothing written. */ mark: (n: number, maximum: number) => number | null }>

/** Marks what is not settled yet of a run through the API that the desk itself uses. Returns how many. */
export async function markByApi(request: APIRequestContext, { address, paperId, questionId, round, mark }: Wanted): Promise<number> {
  const answer = await request.get(`${address}/api/papers/${paperId}/runs/${questionId}?round=${round}`)
  expect(answer.status()).toBe(200)
  const run = (await answer.json()) as Run
  const open = run.strips.filter((strip) => strip.marking?.state !== 'settled' && strip.pictures.every(({ src }) => src !== null))
  for (const [n, strip] of open.entries()) {
    const deserved = mark(n, run.question.maximum)
    for (const stamp of stampsOf(run, strip, deserved)) {
      const put = await request.put(`${address}/api/stamps/${stamp.id}`, { data: stamp })
      expect(put.status(), await put.text()).toBe(200)
    }
    const settled = await request.post(`${address}/api/markings/settle`, { data: { responseId: strip.responseId, round } })
    expect(settled.status(), await settled.text()).toBe(200)
  }
  return open.length
}

function stampsOf(run: Run, strip: Strip, deserved: number | null) {
  const { rect, scriptPageId } = strip.pictures[0]!
  const base = { version: 1, markPointId: null as string | null, scriptPageId, worth: halves(0), x: rect.x + rect.w * 0.6, y: rect.y + rect.h * 0.6, responseId: strip.responseId, round: run.round }
  if (deserved === null) return [{ ...base, id: newId(), kind: 'nothing-written' }]
  if (deserved === 0) return [{ ...base, id: newId(), kind: 'nought' }]
  let left = deserved
  return run.question.points.flatMap((point, k) => {
    const worth = Math.min(left, point.worth)
    left -= worth
    return worth === 0 ? [] : [{ ...base, id: newId(), kind: worth === 1 ? 'half' : 'tick', worth: halves(worth), markPointId: point.id, x: base.x + 24 * k }]
  })
}
