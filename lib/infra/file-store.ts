import { createHash } from 'node:crypto'
import { closeSync, createReadStream, fstatSync, openSync, readSync } from 'node:fs'
import { mkdir, readFile, rename, rm, stat, writeFile } from 'node:fs/promises'
import path from 'node:path'
import { newId } from '@/lib/core/ids'
import { env } from './env'

/** Files are kept byte for byte under their SHA-256 and never rewritten: the scan is evidence. */
function placeOf(sha256: string): string {
  return path.join(env.dataFolder, 'files', sha256.slice(0, 2), sha256)
}

/** Keeps bytes; the same bytes twice are one file. */
export async function keepBytes(bytes: Uint8Array): Promise<{ sha256: string; size: number }> {
  const sha256 = createHash('sha256').update(bytes).digest('hex')
  const temporary = path.join(env.dataFolder, 'files', `.${newId()}`)
  await mkdir(path.dirname(placeOf(sha256)), { recursive: true })
  await writeFile(temporary, bytes)
  await rename(temporary, placeOf(sha256))
  return { sha256, size: bytes.byteLength }
}

/** Takes over a file already on this disk (an upload that is complete) without reading it into memory. */
export async function keepFile(from: string): Promise<{ sha256: string; size: number }> {
  const hash = createHash('sha256')
  for await (const chunk of createReadStream(from)) hash.update(chunk as Buffer)
  const sha256 = hash.digest('hex')
  const { size } = await stat(from)
  await mkdir(path.dirname(placeOf(sha256)), { recursive: true })
  await rename(from, placeOf(sha256))
  return { sha256, size }
}

export async function readKept(sha256: string): Promise<Buffer> {
  return readFile(placeOf(sha256))
}

/** The path of a kept file, for readers that open files themselves. */
export function keptPath(sha256: string): string {
  return placeOf(sha256)
}

/** Takes a file out of the store that no row names any more. */
export async function dropKept(sha256: string): Promise<void> {
  await rm(placeOf(sha256), { force: true })
}

export async function isKept(sha256: string): Promise<boolean> {
  return stat(placeOf(sha256)).then(() => true, () => false)
}

/** A kept file opened for reading in pieces. Close it after use. Throws when it is not there. */
export function openKept(sha256: string): { size: number; read: (offset: number, length: number) => Buffer; close: () => void } {
  const file = openSync(placeOf(sha256), 'r')
  return {
    size: fstatSync(file).size,
    read: (offset, length) => {
      const bytes = Buffer.allocUnsafe(length)
      return bytes.subarray(0, readSync(file, bytes, 0, length, offset))
    },
    close: () => closeSync(file),
  }
}
