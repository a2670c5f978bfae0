import type { ReleaseLine } from '@/lib/core/hand-back'
import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

export type ReleaseState = ReleaseLine['state']
type ReleaseRow = {
  id: string; class_set_id: string; state: ReleaseState; problem: string | null; created_by: string; created_at: number
  released_at: number | null; due_at: number | null; withdrawn_by: string | null; withdrawn_at: number | null
}
export type Release = Readonly<{ id: string; classSetId: string; state: ReleaseState; createdBy: string; createdAt: number; dueAt: number | null }>

export async function addRelease(db: Db, release: Readonly<{ classSetId: string; createdBy: string; at: number; dueAt: number | null }>): Promise<string> {
  const id = newId()
  await db<ReleaseRow>('releases').insert({ id, class_set_id: release.classSetId, state: 'building', created_by: release.createdBy, created_at: release.at, due_at: release.dueAt })
  return id
}

export async function getRelease(db: Db, id: string): Promise<Release | null> {
  const row = await db<ReleaseRow>('releases').where({ id }).first()
  return row ? { id: row.id, classSetId: row.class_set_id, state: row.state, createdBy: row.created_by, createdAt: row.created_at, dueAt: row.due_at } : null
}

/** Whether a release of the class set is being built now. */
export async function isBuilding(db: Db, classSetId: string): Promise<boolean> {
  return Boolean(await db<ReleaseRow>('releases').where({ class_set_id: classSetId, state: 'building' }).first('id'))
}

const lines = `
  select releases.id, releases.state, substr(maker.given_name, 1, 1) || '. ' || maker.family_name as "by", releases.created_at as createdAt, releases.released_at as releasedAt, releases.due_at as dueAt,
    releases.withdrawn_at as withdrawnAt, substr(taker.given_name, 1, 1) || '. ' || taker.family_name as withdrawnBy, releases.problem,
    count(returned_scripts.id) as scripts, count(returned_scripts.built_at) + count(returned_scripts.problem) as built, coalesce(max(returned_scripts.revision), 1) as revision
  from releases join users maker on maker.id = releases.created_by left join users taker on taker.id = releases.withdrawn_by
  left join returned_scripts on returned_scripts.release_id = releases.id
  where releases.class_set_id = ? group by releases.id order by releases.created_at desc, releases.rowid desc`

/** Every release of a class set, the newest first, with how far it is built. */
export async function listReleases(db: Db, classSetId: string): Promise<ReleaseLine[]> {
  return db.raw(lines, [classSetId]) as unknown as Promise<ReleaseLine[]>
}

/** Hands back what was built. False when somebody ended this release meanwhile. */
export async function markReleased(db: Db, id: string, at: number): Promise<boolean> {
  return (await db<ReleaseRow>('releases').where({ id, state: 'building' }).update({ state: 'released', released_at: at })) === 1
}

export async function markReleaseFailed(db: Db, id: string, problem: string): Promise<void> {
  await db<ReleaseRow>('releases').where({ id, state: 'building' }).update({ state: 'failed', problem })
}

/** Takes back all that stands handed back of a class set. Returns the releases it changed. */
export async function withdrawReleases(db: Db, classSetId: string, by: string, at: number): Promise<string[]> {
  const rows = (await db<ReleaseRow>('releases').where({ class_set_id: classSetId, state: 'released' }).update({ state: 'withdrawn', withdrawn_by: by, withdrawn_at: at }).returning('id')) as { id: string }[]
  return rows.map(({ id }) => id)
}

/** Ends a release that still waits for its day; its id, or null when none does. */
export async function callOffWaiting(db: Db, classSetId: string, by: string, at: number): Promise<string | null> {
  const rows = (await db<ReleaseRow>('releases').where({ class_set_id: classSetId, state: 'building' }).where('due_at', '>', at).update({ state: 'withdrawn', withdrawn_by: by, withdrawn_at: at }).returning('id')) as { id: string }[]
  return rows[0]?.id ?? null
}
