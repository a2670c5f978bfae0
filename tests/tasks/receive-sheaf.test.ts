import { createHash } from 'node:crypto'
import { readFileSync, readdirSync } from 'node:fs'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { PDFDocument } from 'pdf-lib'
import sharp from 'sharp'
import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'
import type { Actor } from '@/lib/core/actor'
import { env } from '@/lib/infra/env'
import { keptPath } from '@/lib/infra/file-store'
import { receiveSheaf } from '@/lib/tasks/receive-sheaf'
import { takeUpload } from '@/lib/tasks/take-upload'
import { aClassSetPaper, classSetFile } from '@/tests/make/class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

let teacher: Actor
let paperId: string
const scan = readFileSync(classSetFile('bitonal', 'scan.pdf'))

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  ;({ paperId } = await aClassSetPaper(teacher.userId, 'bitonal'))
})
afterEach(closeSchool)

/** One request of the upload protocol, as a browser sends it. */
function send(actor: Actor, method: string, uploadId: string | null, headers: Record<string, string>, body?: Uint8Array): Promise<Response> {
  const url = `http://localhost/api/papers/${paperId}/sheaves/upload${uploadId ? `/${uploadId}` : ''}`
  const bytes = body && new Uint8Array(body)
  return takeUpload(actor, { paperId, uploadId, request: new Request(url, { method, headers: { 'tus-resumable': '1.0.0', ...headers }, body: bytes, duplex: 'half' } as RequestInit) })
}
async function begin(actor: Actor, length: number, name = 'pile.pdf'): Promise<string> {
  const response = await send(actor, 'POST', null, { 'upload-length': String(length), 'upload-metadata': `filename ${Buffer.from(name).toString('base64')},userId ${Buffer.from('someone-else').toString('base64')}` })
  expect(response.status).toBe(201)
  expect(response.headers.get('location')).toMatch(new RegExp(`^/api/papers/${paperId}/sheaves/upload/[0-9a-f]{32}$`))
  return response.headers.get('location')!.split('/').pop()!
}
const patch = (actor: Actor, id: string, offset: number, bytes: Uint8Array) => send(actor, 'PATCH', id, { 'upload-offset': String(offset), 'content-type': 'application/offset+octet-stream' }, bytes)
async function uploaded(bytes: Uint8Array, name?: string): Promise<string> {
  const id = await begin(teacher, bytes.length, name)
  if (bytes.length > 0) expect((await patch(teacher, id, 0, bytes)).status).toBe(204)
  return id
}
const receive = (uploadId: string, actor = teacher, classSetIds: readonly string[] = []) => receiveSheaf(actor, { paperId, uploadId, classSetIds })

describe('an upload', () => {
  it('goes on where it broke off and is kept byte for byte, with its job', async () => {
    const id = await begin(teacher, scan.length, 'C:\\scans\\9B.pdf')
    await patch(teacher, id, 0, scan.subarray(0, 300_000))
    await expect(receive(id)).rejects.toMatchObject({ code: 'out_of_date' })
    const head = await send(teacher, 'HEAD', id, {})
    expect(head.headers.get('upload-offset')).toBe('300000')
    expect((await patch(teacher, id, 0, scan.subarray(0, 10))).status).toBe(409)
    await patch(teacher, id, 300_000, scan.subarray(300_000))
    const { sheafId } = await receive(id)
    const row = await db()('sheaves').join('stored_files', 'stored_files.id', 'file_id').where('sheaves.id', sheafId).first<{ sha256: string; original_name: string; leaf_count: number }>()
    expect(row).toMatchObject({ sha256: createHash('sha256').update(scan).digest('hex'), original_name: '9B.pdf', leaf_count: 40 })
    expect(readFileSync(keptPath(row.sha256)).equals(scan)).toBe(true)
    expect(await db()('jobs').pluck('subject_id')).toEqual([sheafId])
    expect(readdirSync(path.join(env.dataFolder, 'uploads'))).toEqual([])
  })

  it('larger than the school allows is refused before a byte is sent', async () => {
    const response = await send(teacher, 'POST', null, { 'upload-length': String(env.SHEAFMARK_UPLOAD_LIMIT_MB * 1024 * 1024 + 1) })
    expect(response.status).toBe(413)
  })

  it('of another person is not there, for any verb, even for another owner of the paper', async () => {
    const id = await begin(teacher, scan.length)
    const colleague = await anActor('teacher')
    await db()('paper_owners').insert({ paper_id: paperId, user_id: colleague.userId })
    const acts = await Promise.allSettled([patch(colleague, id, 0, scan), send(colleague, 'HEAD', id, {}), send(colleague, 'DELETE', id, {}), receive(id, colleague)])
    for (const act of acts) expect(act).toMatchObject({ status: 'rejected', reason: { code: 'not_found' } })
    for (const name of ['../sheafmark.sqlite', `${id}.json`, 'x']) await expect(send(teacher, 'HEAD', name, {})).rejects.toMatchObject({ code: 'not_found' })
    expect((await send(teacher, 'DELETE', id, {})).status).toBe(204)
  })

  it('is for the owner of the paper only', async () => {
    const marker = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId, question_id: null })
    await expect(send(marker, 'POST', null, { 'upload-length': '10' })).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(send(await anActor('teacher'), 'POST', null, { 'upload-length': '10' })).rejects.toMatchObject({ code: 'not_found' })
    await expect(send(await anActor('student'), 'POST', null, { 'upload-length': '10' })).rejects.toMatchObject({ code: 'not_found' })
  })
})

describe('what arrived', () => {
  it('is judged by its content, whatever it is called', async () => {
    const none = await PDFDocument.create()
    const faults: [Uint8Array, string][] = [[Buffer.from('PK\u0003\u0004 a word file'), 'file_kind_unknown'], [Buffer.from('\0\0\0\u0018ftypheic and so on'), 'file_heic'], [Buffer.from('%PDF-1.7\nnothing of one follows'), 'file_damaged'], [await none.save({ addDefaultPage: false }), 'file_no_pages']]
    for (const [bytes, code] of faults) await expect(receive(await uploaded(bytes, 'pile.pdf'))).rejects.toMatchObject({ code })
    expect(await db()('sheaves')).toEqual([])
    expect(await db()('jobs')).toEqual([])
    expect(readdirSync(path.join(env.dataFolder, 'uploads'))).toEqual([])
  })

  it('may be pictures: they are kept as a PDF that holds them, under the name they came with', async () => {
    const picture = await sharp({ create: { width: 827, height: 1169, channels: 3, background: 'white' } }).jpeg().toBuffer()
    const { sheafId } = await receive(await uploaded(picture, 'page.jpg'))
    const row = await db()('sheaves').join('stored_files', 'stored_files.id', 'file_id').where('sheaves.id', sheafId).first<{ sha256: string; original_name: string; leaf_count: number }>()
    expect(row).toMatchObject({ original_name: 'page.jpg', leaf_count: 1 })
    const kept = readFileSync(keptPath(row.sha256))
    expect(kept.subarray(0, 5).toString()).toBe('%PDF-')
    expect(kept.includes(picture.subarray(picture.lastIndexOf(Buffer.from([0xff, 0xda]))))).toBe(true)
    expect(readdirSync(path.join(env.dataFolder, 'uploads'))).toEqual([])
    await expect(receive(await uploaded(picture, 'again.jpg'))).rejects.toMatchObject({ code: 'file_same' })
  })

  it('is noticed when this paper has the same bytes already, under any name', async () => {
    await receive(await uploaded(scan))
    await expect(receive(await uploaded(scan, 'again.pdf'))).rejects.toMatchObject({ code: 'file_same' })
    expect(await db()('sheaves').count({ n: '*' }).first()).toEqual({ n: 1 })
  })

  it('needs to know whose scripts it holds when several classes sit the paper', async () => {
    const classId = newId()
    const second = newId()
    await db()('classes').insert({ id: classId, name: 'second', created_at: 1 })
    await db()('class_sets').insert({ id: second, paper_id: paperId, class_id: classId, sat_on: '2026-11-13', created_at: 1 })
    const id = await uploaded(scan)
    await expect(receive(id)).rejects.toMatchObject({ code: 'bad_input' })
    await expect(receive(id, teacher, [newId()])).rejects.toMatchObject({ code: 'bad_input' })
    // asked again the upload is still there
    const { sheafId } = await receive(id, teacher, [second])
    expect(await db()('sheaf_class_sets').where({ sheaf_id: sheafId }).pluck('class_set_id')).toEqual([second])
  })
})
