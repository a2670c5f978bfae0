import type { GradeBoundary, GradeScale, OddHalf } from '@/lib/core/paper'
import type { Db } from './knex'

/** A paper's grade scale, highest grade first, with its title; without boundaries when there is no such paper. */
export async function getScale(db: Db, paperId: string): Promise<GradeScale & { title: string }> {
  const paper = await db('papers').where({ id: paperId }).first<{ odd_half: OddHalf; title: string } | undefined>('odd_half', 'title')
  const boundaries = await db<GradeBoundary & { paper_id: string }>('grade_boundaries').where({ paper_id: paperId }).orderBy('lowest', 'desc').select('grade', 'lowest')
  return { oddHalf: paper?.odd_half ?? 'kept', title: paper?.title ?? '', boundaries }
}
