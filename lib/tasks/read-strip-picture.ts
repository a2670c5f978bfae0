import type { Actor, PaperStanding } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Paper } from '@/lib/core/paper'
import { cutKey, type Cut } from '@/lib/cutting/cut-key'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { getResponse, getScriptPage, listScriptPages, placeOfScript } from '@/db/runs'
import { drawCut, type Picture } from './draw-cut'
import { gateScript } from './gate-script'
import { cutOf, hidesNames, masksOf, wholePage } from './pictures-of-script'

type Asked = Readonly<{ dpi: number; key: string | null }>

/** The picture of one answer space of a response, names covered where they are hidden from this person. Throws not_found or not_allowed. */
export async function readStripPicture(actor: Actor, { responseId, spaceId, ...asked }: Asked & Readonly<{ responseId: string; spaceId: string }>): Promise<Picture> {
  const response = await getResponse(db(), responseId)
  const paper = response && (await getPaper(db(), response.paperId))
  if (!response || !paper) throw new AppError('not_found')
  const standing = await gateScript(db(), actor, { paperId: paper.id, scriptId: response.scriptId, questionId: response.questionId })
  const space = paper.questions.find((question) => question.id === response.questionId)?.spaces.find((candidate) => candidate.id === spaceId)
  const page = space && (await listScriptPages(db(), response.scriptId)).find((candidate) => candidate.paperPage === space.page)
  if (!space || !page) throw new AppError('not_found')
  return draw(paper, standing, asked, (masked) => cutOf(page, space.rect, masked ? masksOf(paper, space.page) : []))
}

/** A whole page of a script in paper space, under the same rules. */
export async function readScriptPagePicture(actor: Actor, { scriptPageId, ...asked }: Asked & Readonly<{ scriptPageId: string }>): Promise<Picture> {
  const page = await getScriptPage(db(), scriptPageId)
  const place = page && (await placeOfScript(db(), page.scriptId))
  const paper = place && (await getPaper(db(), place.paperId))
  if (!page || !paper) throw new AppError('not_found')
  const standing = await gateScript(db(), actor, { paperId: paper.id, scriptId: page.scriptId })
  const rect = wholePage(page, paper)
  if (!rect) throw new AppError('not_found')
  return draw(paper, standing, asked, (masked) => cutOf(page, rect, masked ? masksOf(paper, page.paperPage) : []))
}

/** The covered picture is sent unless the address asks for the open one and this person may see it. */
async function draw(paper: Paper, standing: PaperStanding, { dpi, key }: Asked, cut: (masked: boolean) => Cut | null): Promise<Picture> {
  const open = hidesNames(paper, standing) ? null : cut(false)
  const covered = cut(true)
  const chosen = open && (key === null || key === cutKey(open)) ? open : covered
  if (!chosen) throw new AppError('not_found')
  return drawCut(db(), chosen, dpi)
}
