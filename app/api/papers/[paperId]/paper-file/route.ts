import { z } from 'zod'
import { readJsonFile } from '@/app/_door/read-json-file'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { exportPaper } from '@/lib/tasks/export-paper'
import { importPaper } from '@/lib/tasks/import-paper'

type Context = { params: Promise<{ paperId: string }> }

/** The paper as a paper.json to save. */
export async function GET(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => {
    const { text, name } = await exportPaper(await requireActor(), (await params).paperId)
    return new Response(text, { headers: { 'content-type': 'application/json; charset=utf-8', 'content-disposition': `attachment; filename="${name}"`, 'cache-control': 'private, no-store' } })
  })
}

/** Lays a paper.json (the body) over the paper as it was at `?version=`. */
export async function POST(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    const version = z.coerce.number().int().min(1).parse(new URL(request.url).searchParams.get('version'))
    return { version: await importPaper(actor, { paperId: (await params).paperId, version, paperFile: readJsonFile(await request.text()) }) }
  })
}
