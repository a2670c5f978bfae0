import type { Actor } from '@/lib/core/actor'
import type { PaperDetailsView } from '@/lib/core/paper-details-view'
import { listClassSets } from '@/db/class-sets'
import { listClassRows } from '@/db/classes'
import { listClassSetStudents } from '@/db/class-set-students'
import { db } from '@/db/knex'
import { listMarkers, listOwners, listPeopleWith } from '@/db/paper-people'
import { getPaper } from '@/db/papers'
import { getStoredFile } from '@/db/stored-files'
import { gatePaper } from './gate-paper'
import { detailsOf } from './save-paper-details'

/** All about a paper that is not drawn on it. */
export async function readPaperDetails(actor: Actor, paperId: string): Promise<PaperDetailsView> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = (await getPaper(db(), paperId))!
  const file = paper.blankFileId && (await getStoredFile(db(), paper.blankFileId))
  const classSets = await listClassSets(db(), paperId)
  const list = await listClassSetStudents(db(), classSets.map(({ id }) => id))
  return {
    paperId, version: paper.schemeVersion, details: detailsOf(paper),
    blank: file ? { name: file.originalName, size: file.size, pages: paper.pages.length } : null,
    questions: paper.questions.map(({ id, label }) => ({ id, label })),
    classSets: classSets.map((set) => ({ ...set, list: list.filter((student) => student.classSetId === set.id) })),
    classes: await listClassRows(db(), actor.userId),
    owners: await listOwners(db(), paperId), markers: await listMarkers(db(), paperId),
    teachers: await listPeopleWith(db(), 'teacher'), allMarkers: await listPeopleWith(db(), 'marker'),
  }
}
