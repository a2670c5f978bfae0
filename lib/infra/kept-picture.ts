import { mkdir, readFile, readdir, rename, rm, rmdir, stat, writeFile } from 'node:fs/promises'
import path from 'node:path'
import { newId } from '@/lib/core/ids'
import { env } from './env'
import { log } from './log'

const cuts = (): string => path.join(env.dataFolder, 'cuts')
const folderOf = (leafId: string): string => path.join(cuts(), leafId)
const inWork = new Map<string, Promise<Buffer>>()

/**
 * A picture made of a leaf, which can always be made again: kept on disk under the leaf and its own name. Asked for twice at once it is made
 * once. That it cannot be kept (a full disk, or its folder swept away at that moment) is no reason not to show it.
 */
export async function keptPicture(leafId: string, name: string, make: () => Promise<Buffer>): Promise<Buffer> {
  const place = path.join(folderOf(leafId), name)
  const there = await readFile(place).catch(() => null)
  if (there) return there
  const running = inWork.get(place)
  if (running) return running
  const work = make().then(async (bytes) => {
    await keep(place, bytes).catch((error: unknown) => log.warn({ err: error }, 'a picture could not be kept'))
    return bytes
  }).finally(() => inWork.delete(place))
  inWork.set(place, work)
  return work
}

async function keep(place: string, bytes: Buffer): Promise<void> {
  const temporary = `${place}.${newId()}`
  await mkdir(path.dirname(place), { recursive: true })
  await writeFile(temporary, bytes)
  await rename(temporary, place)
}

/** The leaves that pictures are kept of, and whatever else lies there. */
export async function leavesWithPictures(): Promise<string[]> {
  return readdir(cuts()).catch(() => [])
}

/**
 * Lets go of the pictures of a leaf that nobody can ask for any more, unless they were kept in the last `youngerThanMs`: those may be being written.
 * Readers are safe: what they have open they read to the end, and what is gone is made again. Returns how many went.
 * @param stays whether a picture of this name is still asked for
 */
export async function sweepPictures(leafId: string, stays: (name: string) => boolean, youngerThanMs: number): Promise<number> {
  const folder = folderOf(leafId)
  const before = Date.now() - youngerThanMs
  let gone = 0
  for (const name of await readdir(folder).catch(() => [])) {
    const file = path.join(folder, name)
    const kept = await stat(file).catch(() => null)
    if (stays(name) || !kept || kept.mtimeMs > before) continue
    await rm(file, { force: true })
    gone++
  }
  // Only an empty folder goes: a picture kept there meanwhile stays.
  await rmdir(folder).catch(() => undefined)
  return gone
}

/** Lets go of all pictures of a leaf that is taken away. */
export async function dropPictures(leafId: string): Promise<void> {
  await rm(folderOf(leafId), { recursive: true, force: true })
}
