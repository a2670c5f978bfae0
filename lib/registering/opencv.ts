import { createRequire } from 'node:module'
import type * as OpenCv from '@techstark/opencv-js'

export type Cv = typeof OpenCv
let loading: Promise<{ cv: Cv }> | null = null

/**
 * The vision engine, loaded once a thread. It comes in a box: the module has a `then` of its own, and a promise of the bare
 * module would never settle. The listeners that it hangs on the process for errors are taken off again.
 */
export function opencv(): Promise<{ cv: Cv }> {
  loading ??= load()
  return loading
}

async function load(): Promise<{ cv: Cv }> {
  const names = ['uncaughtException', 'unhandledRejection'] as const
  const before = names.map((name) => process.listeners(name as 'uncaughtException'))
  const cv = createRequire(import.meta.url)('@techstark/opencv-js') as Cv & { then?: unknown; onRuntimeInitialized?: () => void }
  if (!cv.Mat) await new Promise<void>((ready) => { cv.onRuntimeInitialized = ready })
  delete cv.then
  names.forEach((name, k) => {
    for (const listener of process.listeners(name as 'uncaughtException')) if (!before[k]!.includes(listener)) process.removeListener(name, listener)
  })
  return { cv }
}

/** Runs `work` with a pen for Mats: whatever it is handed is deleted afterwards. C++ errors, which come as bare numbers, get their text. */
export function withMats<T>(cv: Cv, work: (keep: <M extends { delete(): void }>(mat: M) => M) => T): T {
  const kept: { delete(): void }[] = []
  try {
    return work((mat) => {
      kept.push(mat)
      return mat
    })
  } catch (error) {
    if (typeof error === 'number') throw new Error((cv as unknown as { exceptionFromPtr(e: number): { msg: string } }).exceptionFromPtr(error).msg)
    throw error
  } finally {
    for (const mat of kept) mat.delete()
  }
}
