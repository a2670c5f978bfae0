import { execFile } from 'node:child_process'
import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { promisify } from 'node:util'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { ingestSheaf } from '@/lib/tasks/ingest-sheaf'

const run = promisify(execFile)
const lengths = [100, 400, 1600]
const sampleMs = 50

/** Reads ever longer sheaves, made of a set's scan over and over with qpdf, and prints what a leaf costs and the most memory held (the whole process, threads and all). */
export async function benchLong(folder: string, threads: number): Promise<void> {
  const paper = await openBlankPaper(await readFile(join(folder, 'paper.pdf')))
  const scan = join(folder, 'scan.pdf')
  const there = Number((await run('qpdf', ['--show-npages', scan])).stdout)
  const place = await mkdtemp(join(tmpdir(), 'bench-long-'))
  try {
    for (const pages of lengths) {
      const sheaf = join(place, `${pages}.pdf`)
      const whole = Array.from({ length: Math.floor(pages / there) }, () => [scan, '1-z']).flat()
      const rest = pages % there ? [scan, `1-${pages % there}`] : []
      await run('qpdf', ['--empty', '--pages', ...whole, ...rest, '--', sheaf])
      let peak = 0
      const watch = setInterval(() => { peak = Math.max(peak, process.memoryUsage.rss()) }, sampleMs)
      const { leavesSeconds, leavesCpuSeconds } = await ingestSheaf({ sheaf, paper, threads }).finally(() => clearInterval(watch))
      console.log(`${pages} pages, ${threads} thread(s): ${((1000 * leavesCpuSeconds) / pages).toFixed(1)} ms cpu a leaf, ${((1000 * leavesSeconds) / pages).toFixed(1)} ms wall, at most ${(peak / 2 ** 20).toFixed(0)} MB`)
      await rm(sheaf)
    }
  } finally {
    await rm(place, { recursive: true })
  }
}
