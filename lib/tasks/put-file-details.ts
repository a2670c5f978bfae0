import type { Db } from '@/db/knex'
import { getPaper, putPaperDetails, setGradeScale } from '@/db/papers'
import type { ReadPaper } from '@/lib/setting/read-paper-file'

/** Takes over what a paper.json says beside the scheme; what it leaves out stays. */
export async function putFileDetails(trx: Db, paperId: string, file: ReadPaper): Promise<void> {
  const paper = (await getPaper(trx, paperId))!
  await putPaperDetails(trx, paperId, {
    title: paper.title, keepUntil: paper.keepUntil,
    namesHidden: file.namesHidden ?? paper.namesHidden,
    sampleSize: file.sampleSize === undefined ? paper.sampleSize : file.sampleSize,
    solutionsReleased: file.solutionsReleased ?? paper.solutionsReleased,
  })
  if (file.scale) await setGradeScale(trx, paperId, file.scale.oddHalf, file.scale.boundaries)
}
