import { describe, expect, it } from 'vitest'
import { RefusedError } from '@/components/ui/ask'
import { halves } from '@/lib/core/marks'
import type { Save } from './desk-state'
import { StampQueue } from './stamp-queue'

const stamp = (id: string, version = 1): Save => ({
  kind: 'stamp',
  stamp: { id, version, responseId: 'r', round: 'first', kind: 'tick', worth: halves(2), markPointId: null, scriptPageId: 'p', x: 0, y: 0, w: 0, h: 0, text: '', path: [], removed: false },
})
const settle: Save = { kind: 'settle', responseId: 'r', round: 'first' }
const nameOf = (save: Save): string => (save.kind === 'stamp' ? `${save.stamp.id} ${save.stamp.version}` : save.kind)
const idle = async (queue: StampQueue): Promise<void> => { while (queue.state().waiting > 0) await new Promise((go) => setTimeout(go, 1)) }

/** A queue onto a server that answers with `answers`, one a request, and well once they are used up. */
function aQueue(answers: (number | null)[] = []) {
  const sent: string[] = []
  const refused: string[] = []
  const queue = new StampQueue({
    send: async (save) => {
      const status = answers.shift() ?? null
      sent.push(nameOf(save))
      await new Promise((go) => setTimeout(go, 1))
      if (status !== null) throw new RefusedError(status, status === 422 ? 'over_maximum' : 'failed', {})
    },
    onRefused: (save) => refused.push(nameOf(save)),
    now: () => 42,
    wait: () => new Promise((go) => setTimeout(go, 1)),
  })
  return { queue, sent, refused }
}

describe('the queue of what is to be saved', () => {
  it('sends in order, one after another, and says when it was saved', async () => {
    const { queue, sent } = aQueue()
    queue.put([stamp('a'), stamp('b')])
    queue.put([settle])
    expect(queue.state()).toMatchObject({ waiting: 3, savedAt: null })
    await idle(queue)
    expect(sent).toEqual(['a 1', 'b 1', 'settle'])
    expect(queue.state()).toEqual({ waiting: 0, trouble: null, savedAt: 42 })
  })

  it('keeps everything while the network is away and sends it in order afterwards', async () => {
    const { queue, sent } = aQueue([0, 0, 503])
    const troubles = new Set<string | null>()
    queue.subscribe(() => troubles.add(queue.state().trouble))
    queue.put([stamp('a'), stamp('b'), settle])
    await idle(queue)
    expect(sent).toEqual(['a 1', 'a 1', 'a 1', 'a 1', 'b 1', 'settle'])
    expect(troubles).toContain('no-network')
    expect(queue.state().trouble).toBeNull()
  })

  it('waits for a person who was signed out, and loses nothing', async () => {
    const { queue, sent } = aQueue([401])
    queue.put([stamp('a')])
    await new Promise((go) => setTimeout(go, 2))
    await idle(queue)
    expect(sent).toEqual(['a 1', 'a 1'])
  })

  it('drops what the server refuses, says so, and goes on with the rest', async () => {
    const { queue, sent, refused } = aQueue([422])
    queue.put([stamp('a'), stamp('b')])
    await idle(queue)
    expect(refused).toEqual(['a 1'])
    expect(sent).toEqual(['a 1', 'b 1'])
  })

  it('lets a later version take the place of one that still waits, but not of one on its way or before a settling', async () => {
    const { queue, sent } = aQueue()
    queue.put([stamp('a', 1)])
    queue.put([stamp('a', 2)])
    queue.put([stamp('a', 3)])
    queue.put([settle])
    queue.put([stamp('a', 4)])
    await idle(queue)
    expect(sent).toEqual(['a 1', 'a 3', 'settle', 'a 4'])
  })
})
