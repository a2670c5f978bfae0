import { spawnSync } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import { closeSync, mkdtempSync, openSync, readSync, rmSync, statSync, writeSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { parseArgs } from 'node:util'

// npx tsx scripts/bench-large-sheaf.ts [--mb 1100] [--leaves 60] [--threads 2]
// Peak memory of a very large sheaf: sent in pieces and checked in one process, as the web process does, and its first leaves read in
// another, as the worker does. The sheaf is the everyday scan over and over, each picture with bytes of its own; it is deleted afterwards.

const { values } = parseArgs({ options: { mb: { type: 'string', default: '1100' }, leaves: { type: 'string', default: '60' }, threads: { type: 'string', default: '2' }, as: { type: 'string' }, file: { type: 'string' } } })
const everyday = join(process.cwd(), 'seeds/class-sets/everyday')
const piece = 8 << 20

/** Writes a sheaf of the least that many bytes; returns how many pages it has. */
async function makeSheaf(path: string, bytes: number): Promise<number> {
  const { openSheaf } = await import('@/lib/reading/open-sheaf')
  const source = openSheaf(join(everyday, 'scan.pdf'))
  const pages = 1900
  const each = Math.ceil(bytes / pages)
  const out = openSync(path, 'w')
  const starts: number[] = []
  let size = 0
  const write = (part: Uint8Array | string) => { size += writeSync(out, typeof part === 'string' ? Buffer.from(part, 'latin1') : part) }
  const object = (number: number, text: string, stream?: readonly Uint8Array[]) => {
    starts[number] = size
    write(`${number} 0 obj\n${text}\n`)
    if (stream) [Buffer.from('stream\n'), ...stream, Buffer.from('\nendstream\n')].forEach(write)
    write('endobj\n')
  }
  write('%PDF-1.4\n')
  for (let k = 0; k < pages; k++) {
    const page = source.page(k % source.pageCount)
    if (page.image === null) throw new Error('a page without an image')
    const { width, height, dpiX, dpiY } = page.image
    const [w, h] = [(72 * width) / dpiX, (72 * height) / dpiY]
    const picture = [page.bytes.subarray(0, 2), ...comments(each - page.bytes.length), page.bytes.subarray(2)]
    const length = picture.reduce((sum, part) => sum + part.length, 0)
    const content = Buffer.from(`q ${w} 0 0 ${h} 0 0 cm /I Do Q`)
    object(3 + 3 * k, `<</Type/Page/Parent 2 0 R/MediaBox[0 0 ${w} ${h}]/Contents ${4 + 3 * k} 0 R/Resources<</XObject<</I ${5 + 3 * k} 0 R>>>>>>`)
    object(4 + 3 * k, `<</Length ${content.length}>>`, [content])
    object(5 + 3 * k, `<</Type/XObject/Subtype/Image/Width ${width}/Height ${height}/ColorSpace/DeviceGray/BitsPerComponent 8/Filter/DCTDecode/Length ${length}>>`, picture)
  }
  object(1, '<</Type/Catalog/Pages 2 0 R>>')
  object(2, `<</Type/Pages/Count ${pages}/Kids[${Array.from({ length: pages }, (_, k) => `${3 + 3 * k} 0 R`).join(' ')}]>>`)
  const table = size
  write(`xref\n0 ${starts.length}\n0000000000 65535 f \n${starts.slice(1).map((at) => `${String(at).padStart(10, '0')} 00000 n \n`).join('')}trailer\n<</Size ${starts.length}/Root 1 0 R>>\nstartxref\n${table}\n%%EOF\n`)
  closeSync(out)
  source.close()
  return pages
}

/** Comment segments of noise, so that no two pictures are the same bytes. */
function comments(bytes: number): Buffer[] {
  const parts: Buffer[] = []
  for (let left = Math.max(bytes, 64); left > 0; left -= 65_000) {
    const part = randomBytes(Math.min(65_000, Math.max(left, 16)))
    part.writeUInt16BE(0xfffe, 0)
    part.writeUInt16BE(part.length - 2, 2)
    parts.push(part)
  }
  return parts
}

/** Runs `work` and prints the most memory the process held meanwhile. */
async function measured(what: string, work: () => Promise<string>): Promise<void> {
  const before = process.memoryUsage().rss
  let most = before
  const timer = setInterval(() => { most = Math.max(most, process.memoryUsage().rss) }, 50)
  const started = performance.now()
  const said = await work().finally(() => clearInterval(timer))
  console.log(`${what.padEnd(34)} ${((performance.now() - started) / 1000).toFixed(1).padStart(7)} s   resident ${Math.round(before / 1e6)} MB before, ${Math.round(most / 1e6)} MB at most   ${said}`)
}

async function asWeb(file: string): Promise<void> {
  const { anActor, closeSchool, openSchool } = await import('@/tests/make/school')
  const { aClassSetPaper } = await import('@/tests/make/class-set')
  const { takeUpload } = await import('@/lib/tasks/take-upload')
  const { receiveSheaf } = await import('@/lib/tasks/receive-sheaf')
  await openSchool()
  const teacher = await anActor('teacher')
  const { paperId } = await aClassSetPaper(teacher.userId, 'everyday')
  const { size } = statSync(file)
  const send = (method: string, uploadId: string | null, headers: Record<string, string>, body?: Uint8Array) =>
    takeUpload(teacher, { paperId, uploadId, request: new Request(`http://localhost/api/papers/${paperId}/sheaves/upload${uploadId ? `/${uploadId}` : ''}`, { method, headers: { 'tus-resumable': '1.0.0', ...headers }, body, duplex: 'half' } as RequestInit) })
  const begun = await send('POST', null, { 'upload-length': String(size) })
  const uploadId = begun.headers.get('location')!.split('/').pop()!
  await measured('web: sent in pieces of 8 MB', async () => {
    const handle = openSync(file, 'r')
    for (let at = 0; at < size; ) {
      const part = Buffer.alloc(Math.min(piece, size - at))
      readSync(handle, part, 0, part.length, at)
      const { status } = await send('PATCH', uploadId, { 'upload-offset': String(at), 'content-type': 'application/offset+octet-stream' }, part)
      if (status !== 204) throw new Error(`a piece was answered ${status}`)
      at += part.length
    }
    closeSync(handle)
    return `${(size / 2 ** 30).toFixed(2)} GB`
  })
  await measured('web: checked, hashed, kept', async () => JSON.stringify(await receiveSheaf(teacher, { paperId, uploadId, classSetIds: [] })))
  await closeSchool()
}

async function asWorker(file: string): Promise<void> {
  const { readFile } = await import('node:fs/promises')
  const { openBlankPaper } = await import('@/lib/reading/open-blank-paper')
  const { openLeaves, readLeaves } = await import('@/lib/tasks/read-leaves')
  const paper = await openBlankPaper(await readFile(join(everyday, 'paper.pdf')))
  const threads = Number(values.threads)
  await measured(`worker: ${values.leaves} leaves, ${threads} threads`, async () => {
    const reader = await openLeaves(file, paper, threads)
    let read = 0
    try {
      // the first half from the front of the file, the rest from its end
      const leaves = Number(values.leaves)
      const wanted = (index: number) => index < leaves / 2 || index >= reader.pageCount - leaves / 2
      await readLeaves(reader, (index) => !wanted(index), () => { read++ }, threads)
      return `${read} of ${reader.pageCount} leaves`
    } finally {
      await reader.close()
    }
  })
}

async function main(): Promise<void> {
  if (values.as === 'web') return asWeb(values.file!)
  if (values.as === 'worker') return asWorker(values.file!)
  const folder = mkdtempSync(join(tmpdir(), 'sheafmark-large-'))
  try {
    const file = join(folder, 'sheaf.pdf')
    console.log(`${await makeSheaf(file, Number(values.mb) * 2 ** 20)} pages, ${(statSync(file).size / 2 ** 30).toFixed(2)} GB`)
    for (const as of ['web', 'worker']) {
      const env = { ...process.env, SHEAFMARK_DATA: join(folder, 'data'), SHEAFMARK_LOG: 'warn' }
      spawnSync(process.execPath, ['--import', 'tsx', 'scripts/bench-large-sheaf.ts', '--as', as, '--file', file, '--leaves', values.leaves, '--threads', values.threads], { stdio: 'inherit', env })
    }
  } finally {
    rmSync(folder, { recursive: true })
  }
}

await main()
