import type { BlankPage } from '@/lib/core/grey-picture'
import type { LeafFinding, LeafReading } from '@/lib/core/leaf'
import type { PrintedCodes } from '@/lib/core/printed-code'
import { placePapers } from '@/lib/placing/place-papers'
import { openLeaves, readLeaves } from './read-leaves'

export type SheafInput = Readonly<{
  /** The path of its file. */
  sheaf: string
  /** The pages of the blank paper, or of several, each page with the number of its paper (from 0). */
  paper: readonly BlankPage[]
  threads?: number
  /** Printed codes that may lie in the sheaf. */
  codes?: PrintedCodes
  /** Readings stored before: those leaves are not read again. */
  stored?: readonly LeafReading[]
  /** Called with what each page of the sheaf shows (two leaves where it shows two pages), and how many of how many are done; what it returns is waited for, so it may store. */
  onLeaf?: (readings: readonly LeafReading[], done: number, of: number) => Promise<void> | void
}>
export type SheafResult = Readonly<{ readings: readonly LeafReading[]; findings: readonly LeafFinding[]; startupSeconds: number; leavesSeconds: number; leavesCpuSeconds: number }>

/**
 * The whole way from a sheaf to scripts: every leaf read and registered by itself, then one decision over all of them.
 * The command and the worker use this one engine; the worker stores each reading and may stop and go on at any leaf.
 * Throws the file errors of openLeaves.
 */
export async function ingestSheaf({ sheaf, paper, threads = 1, codes, stored = [], onLeaf }: SheafInput): Promise<SheafResult> {
  const called = performance.now()
  const reader = await openLeaves(sheaf, paper, threads, codes)
  try {
    await reader.ready()
    const started = performance.now()
    const before = process.cpuUsage()
    const readings = new Map<number, readonly LeafReading[]>()
    for (const reading of stored) readings.set(reading.index, [...(readings.get(reading.index) ?? []), reading])
    const take = async (leaves: readonly LeafReading[]): Promise<void> => {
      for (const { index } of leaves.slice(0, 1)) readings.set(index, leaves)
      await onLeaf?.(leaves, readings.size, reader.pageCount)
    }
    await readLeaves(reader, (index) => readings.has(index), take, threads)
    const inOrder = [...readings.values()].flat().sort((a, b) => a.index - b.index || (a.half ?? 0) - (b.half ?? 0))
    const findings = placePapers(inOrder, pagesOf(paper))
    const { user, system } = process.cpuUsage(before)
    return { readings: inOrder, findings, startupSeconds: (started - called) / 1000, leavesSeconds: (performance.now() - started) / 1000, leavesCpuSeconds: (user + system) / 1e6 }
  } finally {
    await reader.close()
  }
}

/** How many pages each paper has. */
function pagesOf(paper: readonly BlankPage[]): number[] {
  const papers = 1 + Math.max(0, ...paper.map((page) => page.paper ?? 0))
  return Array.from({ length: papers }, (_, k) => paper.filter((page) => (page.paper ?? 0) === k).length)
}
