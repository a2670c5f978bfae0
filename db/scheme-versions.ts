import type { Db } from './knex'

/** Keeps how the scheme stands now as the paper's next version, and returns its number. */
export async function addSchemeVersion(db: Db, paperId: string, scheme: unknown, madeBy: string): Promise<number> {
  const [paper] = (await db('papers').where({ id: paperId }).increment('scheme_version', 1).returning('scheme_version')) as { scheme_version: number }[]
  const version = paper!.scheme_version
  await db('scheme_versions').insert({ paper_id: paperId, version, scheme: JSON.stringify(scheme), made_by: madeBy, made_at: Date.now() })
  return version
}
