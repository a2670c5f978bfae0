import { RefusedError } from '@/components/ui/ask'
import type { Save } from './desk-state'

/** How saving stands. `trouble`: no answer from the server, or signed out; what waits is kept here until it is through. */
export type Saving = Readonly<{ waiting: number; trouble: 'no-network' | 'signed-out' | null; savedAt: number | null }>

type QueueOptions = Readonly<{
  send: (save: Save) => Promise<unknown>
  /** The server said no, for good: it will not be asked again. */
  onRefused: (save: Save, error: RefusedError) => void
  now: () => number
  /** Waits some milliseconds before another try; tests make it short. */
  wait: (ms: number) => Promise<void>
}>

const longestWait = 10_000

/**
 * Saves in order, one at a time, each until it is through. Ids and versions make a repeat harmless, so whatever was not answered is sent again. A later version of a stamp takes the
 * place of one that still waits at the end of the line.
 */
export class StampQueue {
  private readonly line: Save[] = []
  private saving: Saving = { waiting: 0, trouble: null, savedAt: null }
  private readonly listeners = new Set<() => void>()
  private busy = false
  private wake: (() => void) | null = null

  constructor(private readonly options: QueueOptions) {}

  readonly state = (): Saving => this.saving

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener)
    return () => this.listeners.delete(listener)
  }

  put(saves: readonly Save[]): void {
    for (const save of saves) {
      const last = this.line.at(-1)
      const replaces = this.line.length > 1 && last?.kind === 'stamp' && save.kind === 'stamp' && last.stamp.id === save.stamp.id
      if (replaces) this.line[this.line.length - 1] = save
      else this.line.push(save)
    }
    if (saves.length === 0) return
    this.tell({ waiting: this.line.length })
    void this.run()
  }

  /** Tries at once what waits: the network came back, or the person signed in again. */
  readonly retry = (): void => this.wake?.()

  private async run(): Promise<void> {
    if (this.busy) return
    this.busy = true
    let tries = 0
    while (this.line.length > 0) {
      const save = this.line[0]!
      try {
        await this.options.send(save)
        tries = 0
        this.through({ trouble: null, savedAt: this.options.now() })
      } catch (error) {
        const refused = error instanceof RefusedError ? error : new RefusedError(0, 'failed', {})
        if (forGood(refused)) {
          tries = 0
          this.through({ trouble: null })
          this.options.onRefused(save, refused)
        } else {
          this.tell({ trouble: refused.status === 401 ? 'signed-out' : 'no-network' })
          await this.pause(Math.min(longestWait, 500 * 2 ** tries++))
        }
      }
    }
    this.busy = false
  }

  private through(news: Partial<Saving>): void {
    this.line.shift()
    this.tell({ ...news, waiting: this.line.length })
  }

  private async pause(ms: number): Promise<void> {
    await Promise.race([this.options.wait(ms), new Promise<void>((resolve) => { this.wake = resolve })])
    this.wake = null
  }

  private tell(news: Partial<Saving>): void {
    this.saving = { ...this.saving, ...news }
    this.listeners.forEach((listener) => listener())
  }
}

/** A dead network, a server in trouble or a session that ended pass; anything else the server says holds. */
function forGood(error: RefusedError): boolean {
  return error.status >= 400 && error.status < 500 && error.status !== 401 && error.status !== 408 && error.status !== 429
}
