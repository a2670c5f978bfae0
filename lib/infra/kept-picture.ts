import { mkdir, readFile, rename, writeFile } from 'node:fs/promises'
import path from 'node:path'
import { newId } from '@/lib/core/ids'
import { env } from './env'

const placeOf = (name: string): string => path.join(env.dataFolder, 'cuts', name.slice(0, 2), name)
const inWork = new Map<string, Promise<Buffer>>()

/** A picture that can always be made again, kept on disk under its name. Asked for twice at once it is made once. */
export async function keptPicture(name: string, make: () => Promise<Buffer>): Promise<Buffer> {
  const there = await readFile(placeOf(name)).catch(() => null)
  if (there) return there
  const running = inWork.get(name)
  if (running) return running
  const work = make().then(async (bytes) => {
    const temporary = `${placeOf(name)}.${newId()}`
    await mkdir(path.dirname(temporary), { recursive: true })
    await writeFile(temporary, bytes)
    await rename(temporary, placeOf(name))
    return bytes
  }).finally(() => inWork.delete(name))
  inWork.set(name, work)
  return work
}
